import type { AsCut } from '@kerfyard/common/completions';
import { checkAsCut } from './as-cut.ts';

const lines = [
  { id: 'line-1', cutIds: ['cut-1', 'cut-2'] },
  { id: 'line-2', cutIds: ['cut-3'] },
  { id: 'mobilization', cutIds: [] },
];
const asListed = (...cutIds: string[]): AsCut[] =>
  cutIds.map((cutId) => ({ cutId, asListed: true, note: '' }));
const paths = (sovLineIds: string[], asCut: AsCut[]): string[] =>
  checkAsCut({ sovLineIds, asCut }, { lines }).map((issue) => issue.path);

describe('as-cuts of a completion', () => {
  it('takes exactly the cuts of the lines, in any order', () => {
    expect(paths(['line-1', 'mobilization'], asListed('cut-2', 'cut-1'))).toEqual([]);
  });

  it('refuses a line of another visit, and a line twice', () => {
    expect(paths(['line-9'], [])).toEqual(['sovLineIds']);
    expect(paths(['line-2', 'line-2'], asListed('cut-3'))).toEqual(['sovLineIds']);
  });

  it('names a cut that is missing, foreign or there twice', () => {
    expect(paths(['line-1'], asListed('cut-1'))).toEqual(['asCut']);
    expect(paths(['line-1'], asListed('cut-1', 'cut-2', 'cut-3'))).toEqual(['asCut.2.cutId']);
    expect(paths(['line-1'], asListed('cut-1', 'cut-2', 'cut-1'))).toEqual(['asCut.2.cutId']);
  });
});
