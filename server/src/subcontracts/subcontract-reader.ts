import { Injectable } from '@nestjs/common';
import type { Actor } from '@kerfyard/common/people';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { LOCK_SUBCONTRACT, SOV_OF, SUBCONTRACT_BY_ID } from './subcontract.queries.ts';
import {
  toSovLine,
  toSubcontract,
  type SovLine,
  type SovRow,
  type Subcontract,
  type SubcontractRow,
} from './subcontract-row.ts';

export type Side = 'gc' | 'crew';

/** A subcontract with the reader's side of it and its schedule of values. */
export type OwnSubcontract = Subcontract & { side: Side; sov: SovLine[] };

/** Reads subcontracts for those who are a side of them; to everyone else they do not exist. */
@Injectable()
export class SubcontractReader {
  constructor(private readonly uow: UnitOfWork) {}

  /** @throws AppError 404 when the actor's company is neither side */
  async forActor(tx: Tx | null, actor: Actor, id: string): Promise<OwnSubcontract> {
    return this.own(tx, actor, await this.uow.row<SubcontractRow>(tx, SUBCONTRACT_BY_ID, [id]));
  }

  /** The same under the row's lock, so that its state and what hangs on it cannot move until the transaction ends. */
  async lockForActor(tx: Tx, actor: Actor, id: string): Promise<OwnSubcontract> {
    return this.own(tx, actor, await this.uow.row<SubcontractRow>(tx, LOCK_SUBCONTRACT, [id]));
  }

  /** For mails and jobs, which act for nobody. */
  async find(id: string): Promise<Subcontract | null> {
    const row = await this.uow.row<SubcontractRow>(null, SUBCONTRACT_BY_ID, [id]);
    return row === null ? null : toSubcontract(row);
  }

  /** The schedule of values in its order. */
  async sov(tx: Tx | null, id: string): Promise<SovLine[]> {
    return (await this.uow.rows<SovRow>(tx, SOV_OF, [id])).map(toSovLine);
  }

  private async own(tx: Tx | null, actor: Actor, row: SubcontractRow | null): Promise<OwnSubcontract> {
    const side = row === null ? null : sideOf(actor, row);
    if (row === null || side === null) throw new AppError('not_found');
    return { ...toSubcontract(row), side, sov: await this.sov(tx, row.id) };
  }
}

function sideOf(actor: Actor, row: { gc_company_id: string; crew_company_id: string }): Side | null {
  const companyId = actor.company?.id;
  if (companyId === row.gc_company_id) return 'gc';
  return companyId === row.crew_company_id ? 'crew' : null;
}
