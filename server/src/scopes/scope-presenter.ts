import type { FileView } from '@kerfyard/common/files';
import type {
  OwnScopeView,
  ScopeBody,
  ScopeCardView,
  ScopeDetailView,
  ScopeTotals,
} from '@kerfyard/common/scopes';
import type { OwnMark } from '../bids/own-marks.ts';
import { toInstant, toNumber } from '../platform/database/codecs.ts';
import { chordToMiles, shownMiles } from './place.ts';
import type { Sight } from './scope-access.ts';
import { scopeNumber } from './scope-number.ts';
import type { GcRecord } from './scope-reader.ts';
import type { ScopeRow, ScopeRowWithDraft } from './scope.rows.ts';

const noRecord: GcRecord = { due: 0, awarded: 0 };
const noTotals: ScopeTotals = {
  sawFt: 0,
  overcutFt: 0,
  inchFeet: 0,
  sawSqFt: 0,
  coreHoles: 0,
  coreInches: 0,
  crossCutFt: 0,
  pieces: 0,
  pieceCuts: 0,
  removedCuFt: 0,
  removedLb: 0,
};

export type CardRow = ScopeRow & { company_name: string; chord: number | null };

/** A scope on a crew's list. What only its own company may know (drafts, bid counts) is not in here. */
export function toCard(
  row: CardRow,
  known: { record: GcRecord | undefined; ownBid: OwnMark | undefined },
): ScopeCardView {
  return {
    id: row.id,
    number: scopeNumber(row.number),
    title: row.title,
    status: row.status,
    mode: row.mode ?? 'sealed',
    dueAt: toInstant(row.due_at) ?? '',
    timeZone: row.time_zone ?? 'UTC',
    city: row.city,
    state: row.state,
    distanceMi: toMiles(row.chord),
    methods: row.methods,
    indoors: row.indoors,
    totals: row.totals ?? noTotals,
    cuts: row.sketch,
    cutCount: row.cut_count,
    gc: { id: row.company_id, name: row.company_name },
    gcRecord: known.record ?? noRecord,
    publishedAt: toInstant(row.published_at) ?? '',
    revision: row.revision ?? 1,
    ownBid: toCardBid(known.ownBid),
    bidCount: null,
  };
}

function toCardBid(mark: OwnMark | undefined): ScopeCardView['ownBid'] {
  if (mark === undefined) return null;
  const status = mark.status === 'opened' ? 'in' : mark.status;
  return { status, rank: mark.rank, of: mark.of };
}

export type OwnScopeRow = ScopeRow & { bid_count: string; subcontract_id: string | null };

/** A scope on its own company's list. */
export function toOwnScope(row: OwnScopeRow): OwnScopeView {
  return {
    id: row.id,
    number: scopeNumber(row.number),
    title: row.title,
    status: row.status,
    mode: row.mode,
    dueAt: toInstant(row.due_at),
    timeZone: row.time_zone,
    city: row.city,
    state: row.state,
    cuts: row.sketch,
    cutCount: row.cut_count,
    totals: row.totals,
    bidCount: toNumber(row.bid_count),
    subcontractId: row.subcontract_id,
    updatedAt: toInstant(row.updated_at),
  };
}

export type DetailRow = ScopeRowWithDraft & {
  company_name: string;
  body: ScopeBody | null;
  chord: number | null;
  bid_count: string;
  subcontract_id: string | null;
};

/** One scope whole, cut down to what this viewer may see. */
export function toDetail(
  row: DetailRow,
  sight: Exclude<Sight, 'nothing'>,
  known: { files: FileView[]; record: GcRecord | undefined },
): ScopeDetailView {
  const isOwn = sight === 'own';
  const isHeldBack = sight === 'card';
  const isDraft = row.status === 'draft';
  return {
    id: row.id,
    number: scopeNumber(row.number),
    status: row.status,
    seq: toNumber(row.seq),
    gc: { id: row.company_id, name: row.company_name },
    isOwn,
    body: row.body === null ? null : toBody(row, row.body, isHeldBack),
    isSiteHeldBack: isHeldBack,
    revision: row.revision,
    totals: row.totals,
    methods: row.methods,
    draft: isOwn && isDraft && row.draft !== null ? { version: row.draft_version, body: row.draft } : null,
    files: isHeldBack ? [] : known.files,
    publishedAt: toInstant(row.published_at),
    dueAt: isDraft ? null : toInstant(row.due_at),
    closedReason: row.closed_reason,
    distanceMi: isOwn ? null : toMiles(row.chord),
    gcRecord: known.record ?? noRecord,
    bidCount: isOwn ? toNumber(row.bid_count) : null,
    subcontractId: row.subcontract_id,
  };
}

/** The position is blurred to about seven miles, so that a held-back address is not read off a map. */
const BLUR = 10;

function toBody(row: ScopeRow, body: ScopeBody, isHeldBack: boolean): ScopeBody {
  // A ranked bid in the last minutes moves due; the row governs, the revision stays as published.
  const dueAt = toInstant(row.due_at) ?? body.bidding.dueAt;
  const shown = { ...body, bidding: { ...body.bidding, dueAt } };
  if (!isHeldBack) return shown;
  const { site, conditions } = body;
  return {
    ...shown,
    conditions: { ...conditions, access: '' },
    site: {
      ...site,
      address: '',
      contact: '',
      lat: Math.round(site.lat * BLUR) / BLUR,
      lon: Math.round(site.lon * BLUR) / BLUR,
    },
  };
}

function toMiles(chord: number | null): number | null {
  return chord === null ? null : shownMiles(chordToMiles(chord));
}
