import { Injectable, type OnModuleInit } from '@nestjs/common';
import { BidderList } from '../bids/bidder-list.ts';
import { Audit } from '../platform/audit/audit.ts';
import { toNumber } from '../platform/database/codecs.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { Sweeps } from '../platform/jobs/sweeps.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { MOVE_SCOPE } from '../scopes/scope-core.queries.ts';
import { ScopeEvents } from '../scopes/scope-events.ts';
import { ScopeReader } from '../scopes/scope-reader.ts';
import { SubcontractEvents, type SubcontractChange } from '../subcontracts/subcontract-events.ts';
import { FORGET_OUTCOMES, LAPSE_AWARD, LAPSE_SUBCONTRACT, UNSIGNED_IN_TIME } from './award.queries.ts';

interface Lapsed {
  scope: { id: string; companyId: string };
  scopeSeq: number;
  bidSeq: number;
  bidderIds: string[];
  subcontract: SubcontractChange;
}

/** An award that both sides have not signed in its days lapses: the scope is due again, with its bids. */
@Injectable()
export class LapseAwards implements OnModuleInit {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly scopes: ScopeReader,
    private readonly scopeEvents: ScopeEvents,
    private readonly bidders: BidderList,
    private readonly events: SubcontractEvents,
    private readonly audit: Audit,
    private readonly mailer: Mailer,
    private readonly sweeps: Sweeps,
  ) {}

  onModuleInit(): void {
    this.sweeps.register('awards not signed', () => this.lapseAll());
  }

  async lapseAll(): Promise<void> {
    const rows = await this.uow.rows<{ id: string; scope_id: string }>(null, UNSIGNED_IN_TIME);
    for (const row of rows) await this.lapse(row.id, row.scope_id);
  }

  /** Does nothing when the last signature came first, or another server did it. */
  async lapse(subcontractId: string, scopeId: string): Promise<void> {
    const lapsed = await this.uow.run((tx) => this.post(tx, subcontractId, scopeId));
    if (lapsed === null) return;
    this.scopeEvents.changed(lapsed.scope, lapsed.scopeSeq);
    this.scopeEvents.bidsChanged(lapsed.scope, lapsed.bidSeq);
    this.scopeEvents.ownBidsChanged(scopeId, lapsed.bidderIds);
    this.events.tell(lapsed.subcontract);
  }

  private async post(tx: Tx, subcontractId: string, scopeId: string): Promise<Lapsed | null> {
    const scope = await this.scopes.lock(tx, scopeId);
    const row = await this.uow.row<{ award_id: string; gc_company_id: string; crew_company_id: string }>(
      tx,
      LAPSE_SUBCONTRACT,
      [subcontractId],
    );
    if (row === null) return null;
    await this.uow.rows(tx, LAPSE_AWARD, [row.award_id]);
    await this.uow.rows(tx, FORGET_OUTCOMES, [row.award_id]);
    const moved = await this.uow.row<{ seq: string }>(tx, MOVE_SCOPE, [scopeId, 'awarded', 'due', null]);
    if (moved === null) throw new Error('an award stood on a scope that was not awarded');
    await this.audit.write(tx, {
      actor: null,
      action: 'award.lapsed',
      subject: { type: 'scope', id: scopeId },
      detail: { subcontractId, awardId: row.award_id },
    });
    await this.mailer.toCompany(tx, 'award_lapsed', row.gc_company_id, 'scope.award', { subcontractId });
    await this.mailer.toCompany(tx, 'award_lapsed', row.crew_company_id, 'bid.read', { subcontractId });
    return {
      scope: { id: scopeId, companyId: scope.company_id },
      scopeSeq: toNumber(moved.seq),
      bidSeq: await this.scopeEvents.bumpBids(tx, scopeId),
      bidderIds: await this.bidders.of(tx, scopeId),
      subcontract: await this.events.bump(tx, subcontractId),
    };
  }
}
