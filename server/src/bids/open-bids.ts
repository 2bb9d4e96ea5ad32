import { Injectable, Logger } from '@nestjs/common';
import { Audit } from '../platform/audit/audit.ts';
import { Clock } from '../platform/clock/clock.ts';
import { KeyVault } from '../platform/crypto/key-vault.ts';
import { toNumber } from '../platform/database/codecs.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { ScopeEvents } from '../scopes/scope-events.ts';
import { scopeKeyContext } from '../scopes/scope-key-context.ts';
import { ScopeReader } from '../scopes/scope-reader.ts';
import type { ScopeRow } from '../scopes/scope.rows.ts';
import {
  COME_DUE,
  MARK_RANKED_OPENED,
  MARK_SEALED_OPENED,
  OVERDUE,
  SCOPE_KEY,
  STANDING_SEALED_BIDS,
} from './bid-core.queries.ts';
import { openBid } from './bid-envelope.ts';
import { BidStore } from './bid-store.ts';
import { BidderList } from './bidder-list.ts';
import type { ScopeKeyPair } from './scope-keys.ts';

interface SealedRow {
  id: string;
  scope_id: string;
  company_id: string;
  revision: number;
  ciphertext: Buffer;
  key_for_scope: Buffer;
  submitted_by: string;
  submitted_at: Date;
  version: number;
}

/**
 * The one path on which bids become readable to the general contractor. It locks the scope, then asks the database's
 * clock in a statement of its own and refuses before due; then every standing sealed bid is decrypted and written with
 * its lines, the audit row and the scope's new state in the same transaction. Without the key nothing is opened.
 */
@Injectable()
export class OpenBids {
  private readonly logger = new Logger(OpenBids.name);

  constructor(
    private readonly uow: UnitOfWork,
    private readonly clock: Clock,
    private readonly keys: KeyVault,
    private readonly reader: ScopeReader,
    private readonly store: BidStore,
    private readonly bidders: BidderList,
    private readonly events: ScopeEvents,
    private readonly audit: Audit,
    private readonly mailer: Mailer,
  ) {}

  /**
   * Bring a scope to due. One that is due already, or ended, is left as it is.
   * @returns whether this call did it
   * @throws AppError not_due_yet before due by the clock after the lock; Error when the scope's key cannot be had
   */
  async open(scopeId: string): Promise<boolean> {
    const opened = await this.uow.run(async (tx) => {
      const scope = await this.reader.lock(tx, scopeId);
      if (scope.status !== 'open') return null;
      // A statement after the lock: one that waited for the lock would still see the time before the wait.
      const now = await this.clock.now(tx);
      if (scope.due_at === null || now < scope.due_at) throw new AppError('not_due_yet');
      const count =
        scope.mode === 'sealed' ? await this.unseal(tx, scope) : await this.closeRanked(tx, scope);
      const row = await this.uow.row<{ seq: string; bid_seq: string }>(tx, COME_DUE, [scopeId, now]);
      if (row === null) throw new Error('A locked scope changed its state');
      await this.audit.write(tx, {
        actor: null,
        action: 'bids.opened',
        subject: { type: 'scope', id: scopeId },
        detail: { mode: scope.mode, bids: count, dueAt: scope.due_at.toISOString() },
      });
      await this.mailer.toCompany(tx, 'bids_due', scope.company_id, 'bid.tabulate', { scopeId });
      return { scope, ...row, bidders: await this.bidders.of(tx, scopeId) };
    });
    if (opened === null) return false;
    const scope = { id: scopeId, companyId: opened.scope.company_id };
    this.events.changed(scope, toNumber(opened.seq));
    this.events.bidsChanged(scope, toNumber(opened.bid_seq));
    this.events.ownBidsChanged(scopeId, opened.bidders);
    this.events.listChanged();
    return true;
  }

  /** Open a scope whose time has passed though its job has not run yet; before due nothing happens. */
  async openIfOverdue(scopeId: string): Promise<void> {
    const overdue = await this.uow.row(null, OVERDUE, [scopeId]);
    if (overdue !== null) await this.open(scopeId).catch(ignoreTooEarly);
  }

  /** Open every scope whose time has passed; one that cannot be opened does not stop the others. */
  async openAllOverdue(): Promise<void> {
    for (const { id } of await this.uow.rows<{ id: string }>(null, OVERDUE, [null])) {
      await this.open(id)
        .catch(ignoreTooEarly)
        .catch((error: unknown) =>
          this.logger.error(
            `scope ${id} cannot be opened: ${error instanceof Error ? error.message : 'unknown'}`,
          ),
        );
    }
  }

  private async unseal(tx: Tx, scope: ScopeRow): Promise<number> {
    const pair = await this.keyPair(tx, scope.id);
    const sealed = await this.uow.rows<SealedRow>(tx, STANDING_SEALED_BIDS, [scope.id]);
    for (const row of sealed) {
      const identity = { bidId: row.id, scopeId: row.scope_id, companyId: row.company_id };
      const parts = { ciphertext: row.ciphertext, keyForScope: row.key_for_scope };
      await this.store.insert(tx, {
        ...identity,
        revision: row.revision,
        status: 'opened',
        content: openBid(parts, identity, pair),
        submittedBy: row.submitted_by,
        submittedAt: row.submitted_at,
        version: row.version,
      });
    }
    await this.uow.rows(tx, MARK_SEALED_OPENED, [scope.id]);
    return sealed.length;
  }

  private async closeRanked(tx: Tx, scope: ScopeRow): Promise<number> {
    const rows = await this.uow.rows(tx, MARK_RANKED_OPENED, [scope.id]);
    return rows.length;
  }

  private async keyPair(tx: Tx, scopeId: string): Promise<ScopeKeyPair> {
    const row = await this.uow.row<{ public_key: Buffer; wrapped_private_key: Buffer }>(tx, SCOPE_KEY, [
      scopeId,
    ]);
    if (row === null) throw new Error('The key of this scope is missing');
    const privateKey = this.keys.unwrapKey(row.wrapped_private_key, scopeKeyContext(scopeId));
    return { publicKey: row.public_key, privateKey };
  }
}

function ignoreTooEarly(error: unknown): void {
  if (!(error instanceof AppError) || error.code !== 'not_due_yet') throw error;
}
