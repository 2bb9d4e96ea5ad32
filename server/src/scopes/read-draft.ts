import { IANAZone } from 'luxon';
import type { FieldIssue } from '@kerfyard/common/errors';
import {
  biddingSchema,
  cutLineSchema,
  readCutList,
  scopeBodySchema,
  type ScopeBody,
  type ScopeDraft,
  type ScopeTotals,
} from '@kerfyard/common/scopes';
import { toFieldIssues } from '../platform/http/validation.pipe.ts';

const DAY_MS = 86_400_000;
const MAX_DAYS_AHEAD = 366;

export type DraftReading =
  { ok: true; body: ScopeBody; totals: ScopeTotals } | { ok: false; issues: FieldIssue[] };

/**
 * Read a draft as a body to publish. Every fault comes at once: what a schema finds, and what only the clock, the
 * time zones or the engine know, even while other parts are still blank.
 */
export function readDraft(draft: ScopeDraft, now: Date): DraftReading {
  const parsed = scopeBodySchema.safeParse(withoutBlanks(draft));
  const issues = [
    ...(parsed.success ? [] : toFieldIssues(parsed.error.issues)),
    ...dueIssues(draft, now),
    ...zoneIssues(draft),
    ...cutIssues(draft),
  ];
  if (!parsed.success || issues.length > 0) return { ok: false, issues };
  const list = readCutList(parsed.data.cuts);
  if (!list.ok) return list;
  const dueAt = new Date(parsed.data.bidding.dueAt).toISOString();
  const body = { ...parsed.data, bidding: { ...parsed.data.bidding, dueAt } };
  return { ok: true, body, totals: list.totals };
}

/** A field emptied again is kept in a draft as null and means the same as one never typed. */
function withoutBlanks(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(withoutBlanks);
  if (typeof value !== 'object' || value === null) return value;
  const kept = Object.entries(value).filter(([, field]) => field !== null);
  return Object.fromEntries(kept.map(([name, field]) => [name, withoutBlanks(field)]));
}

function dueIssues(draft: ScopeDraft, now: Date): FieldIssue[] {
  const dueAt = biddingSchema.shape.dueAt.safeParse(draft.bidding.dueAt).data;
  if (dueAt === undefined) return [];
  const aheadMs = Date.parse(dueAt) - now.getTime();
  const path = 'bidding.dueAt';
  if (aheadMs <= 0) return [{ path, message: 'Bids must be due in the future' }];
  return aheadMs > MAX_DAYS_AHEAD * DAY_MS ? [{ path, message: 'Bids must be due within a year' }] : [];
}

function zoneIssues(draft: ScopeDraft): FieldIssue[] {
  const { timeZone } = draft.site;
  if (typeof timeZone !== 'string' || timeZone.length < 3 || IANAZone.isValidZone(timeZone)) return [];
  return [{ path: 'site.timeZone', message: 'A time zone such as America/Chicago' }];
}

/** What the engine says of the lines that obey their schema, each at its own place in the draft. */
function cutIssues(draft: ScopeDraft): FieldIssue[] {
  return draft.cuts.flatMap((line, index) => {
    const parsed = cutLineSchema.safeParse(withoutBlanks(line));
    if (!parsed.success) return [];
    const reading = readCutList([parsed.data]);
    if (reading.ok) return [];
    return reading.issues.map(({ path, message }) => ({
      path: path.replace(/^cuts\.0\./, `cuts.${index}.`),
      message,
    }));
  });
}
