import { isDeepStrictEqual } from 'node:util';
import { Injectable } from '@nestjs/common';
import {
  bidIssues,
  isAllowedStepDown,
  priceBid,
  rankedRules,
  type BidInput,
  type OwnBidView,
} from '@kerfyard/common/bids';
import type { Actor } from '@kerfyard/common/people';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { toNumber } from '../platform/database/codecs.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { newId } from '../platform/ids/ids.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { ComeDueJobs } from '../scopes/come-due-jobs.ts';
import { requireCompany } from '../scopes/require-company.ts';
import { ScopeAccess } from '../scopes/scope-access.ts';
import { ScopeEvents } from '../scopes/scope-events.ts';
import { ScopeReader } from '../scopes/scope-reader.ts';
import type { BidContent } from './bid-envelope.ts';
import { BidLadder } from './bid-ladder.ts';
import { BidWindow, type LockedScope } from './bid-window.ts';
import { BidWriter } from './bid-writer.ts';
import { BidderList } from './bidder-list.ts';
import { DELETE_BID_DRAFT, EXTEND_DUE } from './own-bid.queries.ts';
import { OwnBids, type OwnBid } from './own-bid.ts';

interface Placed {
  bidSeq: number;
  /** The scope's own sequence number when its due time moved. */
  seq: number | null;
  gcId: string;
  /** Who hears that ranks changed: everyone in a ranked scope, only the bidder in a sealed one. */
  hearers: string[];
}

/** Hands in a crew's bid on a scope, or revises it. */
@Injectable()
export class SubmitBid {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly access: ScopeAccess,
    private readonly reader: ScopeReader,
    private readonly ladder: BidLadder,
    private readonly window: BidWindow,
    private readonly ownBids: OwnBids,
    private readonly writer: BidWriter,
    private readonly bidders: BidderList,
    private readonly comeDue: ComeDueJobs,
    private readonly events: ScopeEvents,
    private readonly audit: Audit,
    private readonly mailer: Mailer,
  ) {}

  /**
   * The same content again changes nothing, so a request whose answer was lost may be sent again.
   * @throws AppError 422 with everything wrong with the bid; profile_incomplete naming what is missing;
   * stale_revision; bids_closed by the clock after the lock; the ranked rules' own codes
   */
  async submit(actor: Actor, origin: Origin, scopeId: string, input: BidInput): Promise<OwnBidView> {
    const company = requireCompany(actor, 'cutting_contractor');
    if ((await this.access.sight(actor, scopeId)) === 'nothing') throw new AppError('not_found');
    await this.ladder.require(company.id);
    const content = await this.price(scopeId, input);
    const placed = await this.uow.run((tx) => this.place(tx, { actor, origin, scopeId, content }));
    if (placed !== null) this.tell(scopeId, placed);
    const view = await this.ownBids.viewOf(company.id, scopeId);
    if (view === null) throw new Error('A bid that was handed in is not there');
    return view;
  }

  /** Price before the lock, from the revision that was read: revisions never change, so the lock is held shortly. */
  private async price(scopeId: string, input: BidInput): Promise<BidContent> {
    const { scope, body } = await this.reader.published(scopeId);
    if (scope.revision !== input.revision) throw new AppError('stale_revision');
    const fields = bidIssues(body, input);
    if (fields.length > 0) throw new AppError('invalid_input', { fields });
    return { input, priced: priceBid(body, input) };
  }

  private async place(
    tx: Tx,
    bid: { actor: Actor; origin: Origin; scopeId: string; content: BidContent },
  ): Promise<Placed | null> {
    const { actor, origin, scopeId, content } = bid;
    const company = requireCompany(actor, 'cutting_contractor');
    const locked = await this.window.lock(tx, scopeId);
    const { scope, now } = locked;
    const standing = await this.ownBids.find(tx, scopeId, company.id);
    if (standing !== null && isSameBid(standing, content.input)) return null;
    this.window.requireOpen(locked);
    if (scope.revision !== content.input.revision) throw new AppError('stale_revision');
    if (scope.mode === 'ranked' && standing !== null) requireAllowedRevision(standing, content);
    const identity = { bidId: standing?.id ?? newId(), scopeId, companyId: company.id };
    await this.writer.write(tx, {
      identity,
      mode: scope.mode ?? 'sealed',
      isRevision: standing !== null,
      content,
      userId: actor.userId,
      at: now,
    });
    await this.uow.rows(tx, DELETE_BID_DRAFT, [scopeId, company.id]);
    await this.audit.write(tx, {
      actor,
      action: standing === null ? 'bid.submitted' : 'bid.revised',
      subject: { type: 'bid', id: identity.bidId },
      detail: { scopeId, revision: content.input.revision },
      origin,
    });
    if (standing === null) {
      await this.mailer.toCompany(tx, 'bid_in', scope.company_id, 'bid.tabulate', { scopeId });
    }
    const seq = scope.mode === 'ranked' ? await this.extendDue(tx, locked) : null;
    const bidSeq = await this.events.bumpBids(tx, scopeId);
    const hearers = scope.mode === 'ranked' ? await this.bidders.of(tx, scopeId) : [company.id];
    return { bidSeq, seq, gcId: scope.company_id, hearers };
  }

  /** A ranked bid in the last minutes moves due, so that the others can answer; at most so many times. */
  private async extendDue(tx: Tx, { scope, now }: LockedScope): Promise<number | null> {
    const leftMs = (scope.due_at?.getTime() ?? 0) - now.getTime();
    if (leftMs > rankedRules.extensionMs) return null;
    const dueAt = new Date(now.getTime() + rankedRules.extensionMs);
    const row = await this.uow.row<{ seq: string }>(tx, EXTEND_DUE, [
      scope.id,
      dueAt,
      rankedRules.maxExtensions,
    ]);
    if (row === null) return null;
    await this.comeDue.send(tx, { scopeId: scope.id, dueAt, now });
    return toNumber(row.seq);
  }

  private tell(scopeId: string, { gcId, bidSeq, seq, hearers }: Placed): void {
    const scope = { id: scopeId, companyId: gcId };
    this.events.bidsChanged(scope, bidSeq);
    this.events.ownBidsChanged(scopeId, hearers);
    if (seq === null) return;
    this.events.changed(scope, seq);
    this.events.listChanged();
  }
}

function isSameBid(standing: OwnBid, input: BidInput): boolean {
  return standing.status !== 'withdrawn' && isDeepStrictEqual(standing.input, input);
}

/** A ranked bid only goes down, by a real step, a few times, and stays away once withdrawn. */
function requireAllowedRevision(standing: OwnBid, { priced }: BidContent): void {
  if (standing.status === 'withdrawn') throw new AppError('bid_withdrawn');
  if (standing.version > rankedRules.maxRevisions) throw new AppError('bid_revisions_used');
  if (!isAllowedStepDown(standing.priced.totalCents, priced.totalCents))
    throw new AppError('bid_must_go_down');
}
