import { Injectable } from '@nestjs/common';
import { toNumber } from '../platform/database/codecs.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { LiveHints, rooms } from '../platform/realtime/live-hints.ts';
import { BUMP_SUBCONTRACT } from './subcontract.queries.ts';

/** A change of a subcontract that people will hear of once its transaction has committed. */
export interface SubcontractChange {
  subcontractId: string;
  seq: number;
  companyIds: [gc: string, crew: string];
}

interface BumpRow {
  seq: string;
  gc_company_id: string;
  crew_company_id: string;
}

/** Counts changes under the subcontract's row lock, and tells both companies of them afterwards. */
@Injectable()
export class SubcontractEvents {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly live: LiveHints,
  ) {}

  /** One more change; takes the subcontract's row lock. */
  async bump(tx: Tx, subcontractId: string): Promise<SubcontractChange> {
    const row = await this.uow.row<BumpRow>(tx, BUMP_SUBCONTRACT, [subcontractId]);
    if (row === null) throw new Error('bumped a subcontract that is not there');
    return {
      subcontractId,
      seq: toNumber(row.seq),
      companyIds: [row.gc_company_id, row.crew_company_id],
    };
  }

  /** Call after `uow.run` has resolved, never inside. */
  tell({ subcontractId, seq, companyIds }: SubcontractChange, also: { visits?: boolean } = {}): void {
    const companies = companyIds.map((id) => rooms.company(id));
    this.live.emit([...companies, rooms.subcontract(subcontractId)], {
      topic: 'subcontract',
      subcontractId,
      seq,
    });
    if (also.visits === true) this.live.emit(companies, { topic: 'visits' });
  }
}
