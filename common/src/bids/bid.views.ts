import type { CompanyView } from '../api/index.ts';
import type { BiddingMode } from '../scopes/scope.schema.ts';
import type { ResponsibilityItem } from '../scopes/responsibilities.ts';
import type { ScopeStatus } from '../scopes/scope.state.ts';
import type { Award, BidAnswer, BidInput, BidUnit } from './bid.schema.ts';
import type { BidBand } from './bid.rules.ts';

/** One priced line: quantity from the cut list, cents from the engine. */
export interface PricedLine {
  cutId: string;
  unit: BidUnit;
  /** In hundredths of the unit. */
  quantity: number;
  rate: number;
  factors: number[];
  cents: number;
}

/** What the engine made of a bid's price. */
export interface PricedBid {
  totalCents: number;
  lines: PricedLine[];
  computedCents: number;
  minimumCents: number;
  minimumApplied: boolean;
  mobilizationCents: number;
}

/** `GET /api/scopes/:id/own-bid`: the reading crew's own, whole. */
export interface OwnBidView {
  id: string;
  status: 'in' | 'withdrawn' | 'opened';
  input: BidInput;
  priced: PricedBid;
  submittedAt: string;
  version: number;
  /** Ranked only, from three bids on. */
  rank: number | null;
  of: number | null;
  revisionsLeft: number | null;
  /** After an award: how it came out. */
  outcome: BidOutcome | null;
}

export interface BidOutcome {
  won: boolean;
  rank: number | null;
  of: number | null;
  band: BidBand | null;
  reason: Award['reason'] | null;
  note: string;
}

/** `GET /api/bids`: a crew's own bids on a list. */
export interface BidListItem {
  id: string;
  scopeId: string;
  scopeNumber: string;
  scopeTitle: string;
  scopeStatus: ScopeStatus;
  mode: BiddingMode;
  gc: CompanyView;
  dueAt: string;
  timeZone: string;
  status: 'in' | 'withdrawn' | 'opened';
  totalCents: number;
  rank: number | null;
  of: number | null;
  outcome: BidOutcome | null;
  subcontractId: string | null;
}

/** One opened bid as the general contractor reads it. */
export interface OpenedBidView {
  id: string;
  crew: CompanyView;
  input: BidInput;
  priced: PricedBid;
  submittedAt: string;
  distanceMi: number | null;
}

/** `GET /api/scopes/:id/bids`: sealed before due gives the count only and an empty list. */
export interface BidTabulationView {
  mode: BiddingMode;
  status: ScopeStatus;
  count: number;
  openedAt: string | null;
  rows: { item: ResponsibilityItem; plugCents: number }[];
  bids: OpenedBidView[];
  /** By adjusted price; ids of `bids`. */
  tabulated: {
    bidId: string;
    baseCents: number;
    plugsCents: number;
    unclear: number;
    adjustedCents: number;
    answers: Record<string, BidAnswer['answer'] | 'unclear'>;
  }[];
  awardedBidId: string | null;
}

/** `POST /api/scopes/:id/bid-price`: the price before it is sent; nothing is stored. */
export interface BidPricePreview {
  priced: PricedBid;
}
