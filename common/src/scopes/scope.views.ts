import type { CompanyView } from '../api/index.ts';
import type { FileView } from '../files/index.ts';
import type { Method } from '../people/people.schema.ts';
import type { CutLine } from './cut.schema.ts';
import type { BiddingMode, ScopeBody, ScopeDraft } from './scope.schema.ts';
import type { ScopeStatus } from './scope.state.ts';

/** Sums of a cut list as the engine takes them off; unrounded. */
export interface ScopeTotals {
  sawFt: number;
  overcutFt: number;
  inchFeet: number;
  sawSqFt: number;
  coreHoles: number;
  coreInches: number;
  crossCutFt: number;
  pieces: number;
  /** Blocks, pipes and bars cut one by one. */
  pieceCuts: number;
  removedCuFt: number;
  removedLb: number;
}

/** A scope on a list: its face is the sketch drawn from `cuts` (the first 60 lines). */
export interface ScopeCardView {
  id: string;
  /** "K-1042": the platform-wide human number. */
  number: string;
  title: string;
  status: ScopeStatus;
  mode: BiddingMode;
  dueAt: string;
  timeZone: string;
  city: string;
  state: string;
  /** Miles from the reading crew's yard, or null when there is no yard. */
  distanceMi: number | null;
  methods: Method[];
  indoors: boolean;
  totals: ScopeTotals;
  cuts: CutLine[];
  cutCount: number;
  gc: CompanyView;
  /** Awards over scopes come due, of this general contractor: whether bidding here leads anywhere. */
  gcRecord: { due: number; awarded: number };
  publishedAt: string;
  revision: number;
  /** What the reading crew has in; null when nothing. */
  ownBid: { status: 'draft' | 'in' | 'withdrawn'; rank: number | null; of: number | null } | null;
  /** How many bids are in: for the general contractor only, otherwise null. */
  bidCount: number | null;
}

/** A general contractor's own scope on its list; drafts have only what has been typed. */
export interface OwnScopeView {
  id: string;
  number: string;
  title: string;
  status: ScopeStatus;
  mode: BiddingMode | null;
  dueAt: string | null;
  timeZone: string | null;
  city: string;
  state: string;
  cuts: CutLine[];
  cutCount: number;
  totals: ScopeTotals | null;
  bidCount: number;
  subcontractId: string | null;
  updatedAt: string;
}

/** `GET /api/scopes/:id`. `seq` grows by one with each change that people hear of; a gap means refetch. */
export interface ScopeDetailView {
  id: string;
  number: string;
  status: ScopeStatus;
  seq: number;
  gc: CompanyView;
  isOwn: boolean;
  /** The published body, or null while it is a draft. */
  body: ScopeBody | null;
  /**
   * True for a crew whose service radius does not reach the site and that has no bid, thread or subcontract here:
   * address, contact, access, exact position, photos and drawings are left out of the answer.
   */
  isSiteHeldBack: boolean;
  revision: number | null;
  totals: ScopeTotals | null;
  methods: Method[];
  /** The draft and its version, for its own company while it is one. */
  draft: { version: number; body: ScopeDraft } | null;
  files: FileView[];
  publishedAt: string | null;
  dueAt: string | null;
  closedReason: string | null;
  distanceMi: number | null;
  gcRecord: { due: number; awarded: number };
  /** General contractor only. */
  bidCount: number | null;
  subcontractId: string | null;
}
