import type { FieldIssue } from '../errors/index.ts';
import { cutLineSchema } from './cut.schema.ts';
import {
  biddingSchema,
  scopeBodySchema,
  siteSchema,
  type ScopeBody,
  type ScopeDraft,
} from './scope.schema.ts';
import { readCutList } from './totals.ts';
import type { ScopeTotals } from './scope.views.ts';

const DAY_MS = 86_400_000;
const MAX_DAYS_AHEAD = 366;
/** An answer stays readable: a list of 500 empty cuts has thousands of faults. */
const MAX_ISSUES = 200;

export type DraftCheck =
  { ok: true; body: ScopeBody; totals: ScopeTotals } | { ok: false; issues: FieldIssue[] };

/**
 * Read a draft as a body to publish. Every fault comes at once: what a schema finds, and what only the clock, the
 * time zones or the engine know, even while other parts are still blank.
 * @param now when it would be published: bids must be due after it, within a year
 */
export function checkDraft(draft: ScopeDraft, now: Date): DraftCheck {
  const parsed = scopeBodySchema.safeParse(withoutBlanks(draft));
  const issues = [
    ...(parsed.success ? [] : parsed.error.issues.flatMap(toIssues).slice(0, MAX_ISSUES)),
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
export function withoutBlanks(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(withoutBlanks);
  if (typeof value !== 'object' || value === null) return value;
  const kept = Object.entries(value).filter(([, field]) => field !== null);
  return Object.fromEntries(kept.map(([name, field]) => [name, withoutBlanks(field)]));
}

interface SchemaIssue {
  path: readonly PropertyKey[];
  message: string;
  keys?: readonly string[];
}

function toIssues({ path, message, keys }: SchemaIssue): FieldIssue[] {
  if (keys === undefined) return [{ path: path.map(String).join('.'), message }];
  return keys.map((key) => ({ path: [...path, key].map(String).join('.'), message: 'Not a field here' }));
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
  const timeZone = siteSchema.shape.timeZone.safeParse(draft.site.timeZone).data;
  if (timeZone === undefined || isTimeZone(timeZone)) return [];
  return [{ path: 'site.timeZone', message: 'A time zone such as America/Chicago' }];
}

function isTimeZone(name: string): boolean {
  try {
    return new Intl.DateTimeFormat('en-US', { timeZone: name }).resolvedOptions().timeZone !== '';
  } catch {
    return false;
  }
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
