import { Injectable } from '@nestjs/common';
import type { Award } from '@kerfyard/common/bids';
import { CREW_FEE_BASIS_POINTS } from '@kerfyard/common/money';
import type { Actor } from '@kerfyard/common/people';
import { OpenBids } from '../bids/open-bids.ts';
import { FilesService } from '../files/files.service.ts';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { toNumber } from '../platform/database/codecs.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { newId } from '../platform/ids/ids.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { MOVE_SCOPE } from '../scopes/scope-core.queries.ts';
import { ScopeEvents } from '../scopes/scope-events.ts';
import { ScopeReader } from '../scopes/scope-reader.ts';
import type { PublishedScope, ScopeRow } from '../scopes/scope.rows.ts';
import { SubcontractEvents, type SubcontractChange } from '../subcontracts/subcontract-events.ts';
import { subcontractNumber } from '../subcontracts/subcontract-row.ts';
import {
  ATTACH_THREAD,
  INSERT_AWARD,
  INSERT_OUTCOMES,
  INSERT_SOV_LINES,
  INSERT_SUBCONTRACT,
  LOCK_OPENED_BIDS,
  OPENED_BIDS,
} from './award.queries.ts';
import { AwardPaper, type OpenedBidRow, type PreparedPaper } from './award-paper.ts';
import { outcomesOf, type Outcome } from './outcomes.ts';

interface Deed {
  actor: Actor;
  origin: Origin;
  input: Award;
  published: PublishedScope;
  paper: PreparedPaper;
}

interface Awarded {
  subcontract: SubcontractChange;
  scopeSeq: number;
  bidSeq: number;
  bidderIds: string[];
}

/** One bid wins a due scope; its subcontract is drawn up, and every bidder hears how its bid came out. */
@Injectable()
export class AwardBid {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly scopes: ScopeReader,
    private readonly scopeEvents: ScopeEvents,
    private readonly opening: OpenBids,
    private readonly papers: AwardPaper,
    private readonly files: FilesService,
    private readonly events: SubcontractEvents,
    private readonly audit: Audit,
    private readonly mailer: Mailer,
  ) {}

  /**
   * @throws AppError `already_awarded`, `illegal_move` for a scope that is not due, `stale_version` when the bid
   *   changed while the paper was drawn up
   */
  async award(
    actor: Actor,
    origin: Origin,
    scopeId: string,
    input: Award,
  ): Promise<{ subcontractId: string }> {
    await this.requireOwnDue(actor, scopeId);
    const bids = await this.uow.rows<OpenedBidRow>(null, OPENED_BIDS, [scopeId]);
    const bid = bids.find((row) => row.id === input.bidId);
    if (bid === undefined) throw AppError.field('bidId', 'Not a standing bid on this scope');
    const published = await this.scopes.published(scopeId, bid.revision);
    const paper = await this.papers.prepare(published, bid);
    const awarded = await this.uow.run((tx) =>
      this.post(tx, { actor, origin, input, published, paper }, bid),
    );
    this.tell(published.scope, awarded);
    return { subcontractId: paper.subcontractId };
  }

  /** Before anything is drawn up: own, and due (brought to due when only its job is late). */
  private async requireOwnDue(actor: Actor, scopeId: string): Promise<void> {
    const { scope } = await this.scopes.published(scopeId);
    if (scope.company_id !== actor.company?.id) throw new AppError('not_found');
    if (scope.status !== 'open') return requireDue(scope);
    await this.opening.openIfOverdue(scopeId);
    requireDue((await this.scopes.published(scopeId)).scope);
  }

  private async post(tx: Tx, deed: Deed, seen: OpenedBidRow): Promise<Awarded> {
    const scope = await this.scopes.lock(tx, deed.published.scope.id);
    requireDue(scope);
    const bids = await this.uow.rows<OpenedBidRow>(tx, LOCK_OPENED_BIDS, [scope.id]);
    const bid = bids.find((row) => row.id === seen.id);
    if (bid === undefined || bid.version !== seen.version) throw new AppError('stale_version');
    const moved = await this.uow.row<{ seq: string }>(tx, MOVE_SCOPE, [scope.id, 'due', 'awarded', null]);
    if (moved === null) throw new AppError('already_awarded');
    const awardId = newId();
    const { actor, origin, input, paper } = deed;
    await this.uow.rows(tx, INSERT_AWARD, [
      awardId,
      scope.id,
      bid.id,
      actor.userId,
      input.reason,
      input.note,
      paper.awardedAt,
    ]);
    await this.insertSubcontract(tx, deed, { awardId, bid });
    const outcomes = outcomesOf(bids.map(toRankedBid), input);
    await this.insertOutcomes(tx, awardId, outcomes);
    await this.sendMails(tx, awardId, { outcomes, subcontractId: paper.subcontractId });
    await this.audit.write(tx, {
      actor,
      origin,
      action: 'scope.awarded',
      subject: { type: 'scope', id: scope.id },
      detail: {
        bidId: bid.id,
        subcontractId: paper.subcontractId,
        number: subcontractNumber(paper.number),
        documentSha256: paper.sha256,
        bids: bids.length,
        reason: input.reason,
      },
    });
    return {
      subcontract: await this.events.bump(tx, paper.subcontractId),
      scopeSeq: toNumber(moved.seq),
      bidSeq: await this.scopeEvents.bumpBids(tx, scope.id),
      bidderIds: bids.map((row) => row.company_id),
    };
  }

  private async insertSubcontract(
    tx: Tx,
    { actor, published, paper }: Deed,
    { awardId, bid }: { awardId: string; bid: OpenedBidRow },
  ): Promise<void> {
    const { scope, revision, body } = published;
    const fileId = await this.files.register(tx, {
      companyId: scope.company_id,
      userId: actor.userId,
      kind: 'document',
      name: `Subcontract ${subcontractNumber(paper.number)}.pdf`,
      type: 'application/pdf',
      bytes: paper.bytes,
      sha256: paper.sha256,
      originalSha256: paper.sha256,
    });
    await this.uow.rows(tx, INSERT_SUBCONTRACT, [
      paper.subcontractId,
      paper.number,
      scope.id,
      revision,
      awardId,
      bid.id,
      scope.company_id,
      bid.company_id,
      toNumber(bid.total_cents),
      body.terms.retainageBasisPoints,
      CREW_FEE_BASIS_POINTS,
      body.terms.answerDays,
      fileId,
      paper.signBy,
    ]);
    const lines = paper.sov.map((row, index) => ({
      id: newId(),
      position: index + 1,
      description: row.description,
      cut_ids: row.cutIds,
      amount_cents: row.amountCents,
    }));
    await this.uow.rows(tx, INSERT_SOV_LINES, [paper.subcontractId, JSON.stringify(lines)]);
    await this.uow.rows(tx, ATTACH_THREAD, [
      newId(),
      scope.id,
      scope.company_id,
      bid.company_id,
      paper.subcontractId,
    ]);
  }

  private async insertOutcomes(tx: Tx, awardId: string, outcomes: readonly Outcome[]): Promise<void> {
    const rows = outcomes.map(({ bidId, won, rank, outOf, band, reason, note }) => ({
      bid_id: bidId,
      won,
      rank,
      out_of: outOf,
      band,
      reason,
      note,
    }));
    await this.uow.rows(tx, INSERT_OUTCOMES, [awardId, JSON.stringify(rows)]);
  }

  private async sendMails(
    tx: Tx,
    awardId: string,
    { outcomes, subcontractId }: { outcomes: readonly Outcome[]; subcontractId: string },
  ): Promise<void> {
    for (const { won, companyId, bidId } of outcomes) {
      if (won) await this.mailer.toCompany(tx, 'award_won', companyId, 'bid.read', { subcontractId });
      else await this.mailer.toCompany(tx, 'award_not_won', companyId, 'bid.read', { bidId, awardId });
    }
  }

  private tell(scope: ScopeRow, awarded: Awarded): void {
    const own = { id: scope.id, companyId: scope.company_id };
    this.scopeEvents.changed(own, awarded.scopeSeq);
    this.scopeEvents.bidsChanged(own, awarded.bidSeq);
    this.scopeEvents.ownBidsChanged(scope.id, awarded.bidderIds);
    this.events.tell(awarded.subcontract);
  }
}

function requireDue(scope: ScopeRow): void {
  if (scope.status === 'awarded') throw new AppError('already_awarded');
  if (scope.status !== 'due') throw new AppError('illegal_move');
}

function toRankedBid(row: OpenedBidRow) {
  return {
    id: row.id,
    companyId: row.company_id,
    totalCents: toNumber(row.total_cents),
    submittedAt: row.submitted_at,
  };
}
