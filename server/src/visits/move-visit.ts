import { Injectable } from '@nestjs/common';
import { may, type Actor, type PermissionName } from '@kerfyard/common/people';
import type { VisitView } from '@kerfyard/common/visits';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { SubcontractEvents } from '../subcontracts/subcontract-events.ts';
import { SubcontractReader, type OwnSubcontract } from '../subcontracts/subcontract-reader.ts';
import { LOCK_VISIT, SUBCONTRACT_OF_VISIT } from './visit.queries.ts';
import type { VisitRow } from './visit.presenter.ts';
import { VisitReader } from './visit-reader.ts';

/** A visit under its lock, with the subcontract it belongs to, locked before it. */
export interface LockedVisit {
  visit: VisitRow;
  subcontract: OwnSubcontract;
}

interface Move {
  actor: Actor;
  origin: Origin;
  visitId: string;
  /** What is said in the audit row: "visit.confirmed". */
  action: string;
  /** One of these must be the actor's: which side moves a visit is decided by it. */
  permissions: readonly PermissionName[];
}

/** The frame of every move of a visit: access, locks, the move itself, audit, hints. */
@Injectable()
export class MoveVisit {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly subcontracts: SubcontractReader,
    private readonly events: SubcontractEvents,
    private readonly visits: VisitReader,
    private readonly audit: Audit,
  ) {}

  /**
   * Run one move of a visit in a transaction that holds the subcontract's and the visit's lock.
   * @param work makes the move; its answer stands in the audit row
   * @throws AppError 404 for a visit of others, 403 for a role that may not
   */
  async run(
    { actor, origin, visitId, action, permissions }: Move,
    work: (tx: Tx, locked: LockedVisit) => Promise<Record<string, unknown>>,
  ): Promise<VisitView> {
    const change = await this.uow.run(async (tx) => {
      const locked = await this.lock(tx, actor, visitId);
      if (!permissions.some((name) => may(actor, name))) throw new AppError('forbidden');
      const detail = await work(tx, locked);
      await this.audit.write(tx, { actor, origin, action, subject: { type: 'visit', id: visitId }, detail });
      return this.events.bump(tx, locked.subcontract.id);
    });
    this.events.tell(change, { visits: true });
    return this.visits.one(visitId);
  }

  private async lock(tx: Tx, actor: Actor, visitId: string): Promise<LockedVisit> {
    const parent = await this.uow.row<{ subcontract_id: string }>(tx, SUBCONTRACT_OF_VISIT, [visitId]);
    if (parent === null) throw new AppError('not_found');
    const subcontract = await this.subcontracts.lockForActor(tx, actor, parent.subcontract_id);
    const visit = await this.uow.row<VisitRow>(tx, LOCK_VISIT, [visitId]);
    if (visit === null) throw new AppError('not_found');
    return { visit, subcontract };
  }
}
