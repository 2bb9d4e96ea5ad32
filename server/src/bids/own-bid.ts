import { Injectable } from '@nestjs/common';
import {
  rankedRules,
  type Award,
  type BidBand,
  type BidInput,
  type BidOutcome,
  type OwnBidView,
  type PricedBid,
} from '@kerfyard/common/bids';
import type { Actor } from '@kerfyard/common/people';
import { toInstant } from '../platform/database/codecs.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { requireCompany } from '../scopes/require-company.ts';
import { ScopeAccess } from '../scopes/scope-access.ts';
import { readOwnBid } from './bid-envelope.ts';
import { CompanyKeys } from './company-keys.ts';
import { READABLE_BID, SEALED_BID } from './own-bid.queries.ts';
import { OwnMarks, type OwnMark } from './own-marks.ts';

/** A crew's own bid in the clear, wherever it lies. */
export interface OwnBid {
  id: string;
  status: 'in' | 'withdrawn' | 'opened';
  input: BidInput;
  priced: PricedBid;
  submittedAt: Date;
  version: number;
  outcome: BidOutcome | null;
}

export interface OutcomeColumns {
  won: boolean | null;
  outcome_rank: number | null;
  outcome_of: number | null;
  band: BidBand | null;
  reason: Award['reason'] | null;
  note: string | null;
}

interface ReadableRow extends OutcomeColumns {
  id: string;
  status: OwnBid['status'];
  input: BidInput;
  priced: PricedBid;
  submitted_at: Date;
  version: number;
}

interface SealedRow {
  id: string;
  status: OwnBid['status'];
  ciphertext: Buffer;
  key_for_bidder: Buffer;
  submitted_at: Date;
  version: number;
}

/** Reads a crew's own bid back: from its row, or by the company's key while it is sealed. */
@Injectable()
export class OwnBids {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly access: ScopeAccess,
    private readonly keys: CompanyKeys,
    private readonly marks: OwnMarks,
  ) {}

  /**
   * The reading crew's own bid with its rank, or null when it has none.
   * @throws AppError not_found when this crew may not know of the scope
   */
  async view(actor: Actor, scopeId: string): Promise<OwnBidView | null> {
    const company = requireCompany(actor, 'cutting_contractor');
    if ((await this.access.sight(actor, scopeId)) === 'nothing') throw new AppError('not_found');
    return this.viewOf(company.id, scopeId);
  }

  /** The same for a company whose access has been checked. */
  async viewOf(companyId: string, scopeId: string): Promise<OwnBidView | null> {
    const [bid, marks] = await Promise.all([
      this.find(null, scopeId, companyId),
      this.marks.of(companyId, [scopeId]),
    ]);
    return bid === null ? null : toView(bid, marks.get(scopeId));
  }

  /** The bid of one company on one scope, in the clear. */
  async find(tx: Tx | null, scopeId: string, companyId: string): Promise<OwnBid | null> {
    const readable = await this.uow.row<ReadableRow>(tx, READABLE_BID, [scopeId, companyId]);
    if (readable !== null) {
      const { id, status, input, priced, submitted_at: submittedAt, version } = readable;
      return { id, status, input, priced, submittedAt, version, outcome: toOutcome(readable) };
    }
    const row = await this.uow.row<SealedRow>(tx, SEALED_BID, [scopeId, companyId]);
    if (row === null) return null;
    const key = await this.keys.of(tx, companyId);
    const parts = { ciphertext: row.ciphertext, keyForBidder: row.key_for_bidder };
    const content = readOwnBid(parts, { bidId: row.id, scopeId, companyId }, key);
    const { id, status, submitted_at: submittedAt, version } = row;
    return { id, status, ...content, submittedAt, version, outcome: null };
  }
}

/** How an award came out for one bid, or null before there is one. */
export function toOutcome(row: OutcomeColumns): BidOutcome | null {
  if (row.won === null) return null;
  const { won, outcome_rank: rank, outcome_of: of, band, reason, note } = row;
  return { won, rank, of, band, reason, note: note ?? '' };
}

function toView(bid: OwnBid, mark: OwnMark | undefined): OwnBidView {
  return {
    id: bid.id,
    status: bid.status,
    input: bid.input,
    priced: bid.priced,
    submittedAt: toInstant(bid.submittedAt),
    version: bid.version,
    rank: mark?.rank ?? null,
    of: mark?.of ?? null,
    revisionsLeft: mark?.mode === 'ranked' ? Math.max(0, rankedRules.maxRevisions - (bid.version - 1)) : null,
    outcome: bid.outcome,
  };
}
