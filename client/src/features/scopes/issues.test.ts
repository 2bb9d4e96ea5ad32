import { expect, it } from 'vitest';
import { sortIssues } from './issues.ts';

const issue = (path: string, message = 'Needed') => ({ path, message });

it('says a missing ZIP code once and not all that would come from it', () => {
  const sorted = sortIssues(
    ['site.city', 'site.state', 'site.zip', 'site.lat', 'site.lon', 'site.timeZone'].map((path) =>
      issue(path),
    ),
  );
  expect(sorted.all.map(({ path }) => path)).toEqual(['site.zip']);
});

it('leads to the ZIP code when only the position is missing', () => {
  expect(sortIssues([issue('site.lat'), issue('site.lon')]).fields).toEqual([issue('site.zip')]);
});

it('sorts to cut lines, the list, the sheet and the fields, in the order of the page', () => {
  const sorted = sortIssues([
    issue('bidding.dueAt'),
    issue('responsibilities.3.name', 'Name who has it'),
    issue('cuts.2.cut.removal.maxPieceLb'),
    issue('cuts.2.mark', 'Write something here'),
    issue('cuts', 'Two cuts share a mark'),
    issue('title'),
  ]);
  expect(sorted.all.map(({ path }) => path)).toEqual([
    'title',
    'cuts.2.cut.removal.maxPieceLb',
    'cuts.2.mark',
    'cuts',
    'responsibilities.3.name',
    'bidding.dueAt',
  ]);
  expect(sorted.cuts.get(2)).toEqual({ 'removal.maxPieceLb': 'Needed', mark: 'Write something here' });
  expect(sorted.cutList).toBe('Two cuts share a mark');
  expect(sorted.sheet.get(3)).toBe('Name who has it');
  expect(sorted.fields.map(({ path }) => path)).toEqual(['title', 'bidding.dueAt']);
});
