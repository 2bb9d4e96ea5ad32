import type { AsCut, SubmitCompletion } from '@kerfyard/common/completions';
import type { FieldIssue } from '@kerfyard/common/errors';

interface Line {
  id: string;
  cutIds: readonly string[];
}

/**
 * What is wrong with the lines and as-cuts of a completion: lines must be of the visit, each once, and the as-cuts
 * must name every cut of those lines, each once, and no other.
 */
export function checkAsCut(
  input: Pick<SubmitCompletion, 'sovLineIds' | 'asCut'>,
  visit: { lines: readonly Line[] },
): FieldIssue[] {
  const listed = new Set(input.sovLineIds);
  const lines = visit.lines.filter((line) => listed.has(line.id));
  if (lines.length !== input.sovLineIds.length) {
    return [{ path: 'sovLineIds', message: 'Lines of this visit, each once' }];
  }
  const wanted = new Set(lines.flatMap((line) => line.cutIds));
  const seen = new Set<string>();
  const fields = input.asCut.flatMap(({ cutId }: AsCut, index): FieldIssue[] => {
    const isFine = wanted.has(cutId) && !seen.has(cutId);
    seen.add(cutId);
    return isFine ? [] : [{ path: `asCut.${index}.cutId`, message: 'A cut of these lines, each once' }];
  });
  if ([...wanted].some((cutId) => !seen.has(cutId))) {
    fields.push({ path: 'asCut', message: 'Say for every cut of these lines what was cut' });
  }
  return fields;
}
