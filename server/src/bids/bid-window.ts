import { Injectable } from '@nestjs/common';
import { Clock } from '../platform/clock/clock.ts';
import type { Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { ScopeReader } from '../scopes/scope-reader.ts';
import type { ScopeRow } from '../scopes/scope.rows.ts';

/** A scope whose row is locked, and the time by the clock after the lock. */
export interface LockedScope {
  scope: ScopeRow;
  now: Date;
}

/** Decides whether bids are still taken: lock first, ask the clock in a second statement. */
@Injectable()
export class BidWindow {
  constructor(
    private readonly clock: Clock,
    private readonly reader: ScopeReader,
  ) {}

  /** @throws AppError not_found for a scope that was never published */
  async lock(tx: Tx, scopeId: string): Promise<LockedScope> {
    const scope = await this.reader.lock(tx, scopeId);
    if (scope.revision === null || scope.status === 'discarded') throw new AppError('not_found');
    // A clock read in the locking statement would show the time before the wait, and late bids would pass.
    return { scope, now: await this.clock.now(tx) };
  }

  /** @throws AppError bids_closed at due and after; illegal_move when the scope was taken back */
  requireOpen({ scope, now }: LockedScope): void {
    if (scope.status === 'withdrawn') throw new AppError('illegal_move');
    if (scope.status !== 'open' || scope.due_at === null || now >= scope.due_at)
      throw new AppError('bids_closed');
  }
}
