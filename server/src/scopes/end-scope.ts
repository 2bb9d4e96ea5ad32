import { Injectable } from '@nestjs/common';
import type { Actor } from '@kerfyard/common/people';
import { scopeMachine, type ScopeAction } from '@kerfyard/common/scopes';
import { nextState } from '@kerfyard/common/state';
import { BidderList } from '../bids/bidder-list.ts';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { toNumber } from '../platform/database/codecs.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { requireCompany } from './require-company.ts';
import { MOVE_SCOPE } from './scope-core.queries.ts';
import { ScopeEvents } from './scope-events.ts';
import { ScopeReader } from './scope-reader.ts';

/** The two ways a scope ends without an award: withdrawn, or closed with a reason. */
@Injectable()
export class EndScope {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly reader: ScopeReader,
    private readonly bidders: BidderList,
    private readonly events: ScopeEvents,
    private readonly audit: Audit,
  ) {}

  /** Take an open or due scope back; sealed bids on it are never opened. */
  async withdraw(actor: Actor, origin: Origin, scopeId: string): Promise<void> {
    await this.end(actor, origin, { scopeId, action: 'withdraw', reason: null });
  }

  /** Close a due scope without an award; the reason is shown to its bidders. */
  async close(actor: Actor, origin: Origin, scopeId: string, reason: string): Promise<void> {
    await this.end(actor, origin, { scopeId, action: 'close', reason });
  }

  private async end(
    actor: Actor,
    origin: Origin,
    move: { scopeId: string; action: Extract<ScopeAction, 'withdraw' | 'close'>; reason: string | null },
  ): Promise<void> {
    const company = requireCompany(actor, 'general_contractor');
    const { scopeId, action, reason } = move;
    const { seq, bidders } = await this.uow.run(async (tx) => {
      const scope = await this.reader.lock(tx, scopeId);
      if (scope.company_id !== company.id || scope.status === 'discarded') throw new AppError('not_found');
      const next = nextState(scopeMachine, scope.status, action);
      const row =
        next === undefined
          ? null
          : await this.uow.row<{ seq: string }>(tx, MOVE_SCOPE, [scopeId, scope.status, next, reason]);
      if (row === null) throw new AppError('illegal_move');
      await this.audit.write(tx, {
        actor,
        action: `scope.${action}`,
        subject: { type: 'scope', id: scopeId },
        detail: { from: scope.status, to: next, ...(reason === null ? {} : { reason }) },
        origin,
      });
      return { seq: toNumber(row.seq), bidders: await this.bidders.of(tx, scopeId) };
    });
    this.events.changed({ id: scopeId, companyId: company.id }, seq);
    this.events.listChanged();
    this.events.ownBidsChanged(scopeId, bidders);
  }
}
