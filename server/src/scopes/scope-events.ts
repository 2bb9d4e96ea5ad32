import { Injectable } from '@nestjs/common';
import { toNumber } from '../platform/database/codecs.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { LiveHints, rooms } from '../platform/realtime/live-hints.ts';
import { BUMP_BIDS, BUMP_SCOPE } from './scope-core.queries.ts';

/**
 * Sequence numbers of scopes and the hints that carry them. `bump…` inside the transaction, the others after it has
 * been committed.
 */
@Injectable()
export class ScopeEvents {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly hints: LiveHints,
  ) {}

  /** One more change of the scope that people hear of; takes the row's lock when it is not held yet. */
  async bump(tx: Tx, scopeId: string): Promise<number> {
    const row = await this.uow.row<{ seq: string }>(tx, BUMP_SCOPE, [scopeId]);
    return toNumber(row?.seq ?? '0');
  }

  /** One more bid handed in, revised or withdrawn: counted apart, since only the general contractor may count bids. */
  async bumpBids(tx: Tx, scopeId: string): Promise<number> {
    const row = await this.uow.row<{ bid_seq: string }>(tx, BUMP_BIDS, [scopeId]);
    return toNumber(row?.bid_seq ?? '0');
  }

  /** Tell those who look at the scope, and its own company, that it changed. */
  changed(scope: { id: string; companyId: string }, seq: number): void {
    this.hints.emit([rooms.scope(scope.id), rooms.company(scope.companyId)], {
      topic: 'scope',
      scopeId: scope.id,
      seq,
    });
  }

  /** Tell every crew that the list of open scopes is another one. */
  listChanged(): void {
    this.hints.emit(rooms.crews, { topic: 'scopes' });
  }

  /** Tell the scope's own company that its bids changed. */
  bidsChanged(scope: { id: string; companyId: string }, bidSeq: number): void {
    this.hints.emit(rooms.company(scope.companyId), { topic: 'bids', scopeId: scope.id, seq: bidSeq });
  }

  /** Tell bidders that their own bid, its rank or its outcome changed. */
  ownBidsChanged(scopeId: string, bidderIds: readonly string[]): void {
    if (bidderIds.length === 0) return;
    this.hints.emit(
      bidderIds.map((id) => rooms.company(id)),
      { topic: 'own_bid', scopeId },
    );
  }
}
