import type { FieldIssue } from '@kerfyard/common/errors';
import { fieldOfPath } from './cut-lines.ts';

/** What is wrong with a draft, sorted to where it is shown. */
export interface SortedIssues {
  /** Of fields that the form binds by name. */
  fields: FieldIssue[];
  /** By place in the cut list, then by field of the line. */
  cuts: ReadonlyMap<number, Readonly<Record<string, string>>>;
  cutList: string | undefined;
  /** By place in the responsibility sheet. */
  sheet: ReadonlyMap<number, string>;
  /** All of them in the order of the page, without those that follow from another. */
  all: readonly FieldIssue[];
}

const pageOrder = ['title', 'summary', 'site', 'cuts', 'conditions', 'responsibilities', 'terms', 'bidding'];
const fromZip = ['site.city', 'site.state', 'site.lat', 'site.lon', 'site.timeZone'];

/** Sort complaints to their fields. A missing ZIP code is said once, not five times for all that comes from it. */
export function sortIssues(issues: readonly FieldIssue[]): SortedIssues {
  const isZipMissing = issues.some(({ path }) => path === 'site.zip');
  const kept = issues.filter(({ path }) => !(isZipMissing && fromZip.includes(path)));
  const place = ({ path }: FieldIssue) => pageOrder.indexOf(path.split('.')[0] ?? '');
  const all = uniquePaths(kept.map(toShownField)).sort((left, right) => place(left) - place(right));
  const cuts = new Map<number, Record<string, string>>();
  const sheet = new Map<number, string>();
  const fields: FieldIssue[] = [];
  let cutList: string | undefined;
  for (const issue of all) {
    const ofCut = /^cuts\.(\d+)\.(?:cut\.)?(.+)$/.exec(issue.path);
    const ofSheet = /^responsibilities\.(\d+)\./.exec(issue.path);
    if (ofCut !== null) {
      const at = Number(ofCut[1]);
      cuts.set(at, { ...cuts.get(at), [ofCut[2] ?? '']: issue.message });
    } else if (ofSheet !== null) sheet.set(Number(ofSheet[1]), issue.message);
    else if (issue.path === 'cuts') cutList = issue.message;
    else fields.push(issue);
  }
  return { fields, cuts, cutList, sheet, all };
}

/** Position and zone have no fields of their own until they are moved by hand: the ZIP code leads to them. */
function toShownField(issue: FieldIssue): FieldIssue {
  const isPlace = ['site.lat', 'site.lon', 'site.timeZone'].includes(issue.path);
  return { ...issue, path: isPlace ? 'site.zip' : fieldOfPath(issue.path) };
}

function uniquePaths(issues: readonly FieldIssue[]): FieldIssue[] {
  const seen = new Set<string>();
  return issues.filter(({ path }) => !seen.has(path) && seen.add(path) !== undefined);
}

export const noIssues = sortIssues([]);
