import { MAX_CUT_LINES } from '@kerfyard/common/scopes';
import { useCallback, useState } from 'react';
import { duplicateCut, kindOf, newCut, withKind, type DraftCut, type DraftKind } from '../../cut-lines.ts';

/** Everything that happens to a cut list while it is typed. */
export type CutListChange =
  | { type: 'add'; kind: DraftKind; figures?: DraftCut['cut'] }
  /** The same kind again, below this line. */
  | { type: 'addBelow'; id: string }
  | { type: 'duplicate'; id: string }
  | { type: 'remove'; id: string }
  | { type: 'mark'; id: string; mark: string }
  | { type: 'note'; id: string; note: string }
  | { type: 'kind'; id: string; kind: DraftKind }
  /** `field` of the cut, or `removal.maxPieceLb` and the like. */
  | { type: 'figure'; id: string; field: string; value: DraftCut['cut'][string] }
  /** Several figures at once, as a plan has them. */
  | { type: 'figures'; id: string; figures: DraftCut['cut'] }
  | { type: 'removal'; id: string; isWanted: boolean }
  | { type: 'replace'; lines: readonly DraftCut[] };

/** A cut list in the making. Lines that do not change stay the very same objects, so that only the others are drawn again. */
export function useCutList(start: readonly DraftCut[]) {
  const [lines, setLines] = useState(start);
  const change = useCallback((wanted: CutListChange) => setLines((now) => changed(now, wanted)), []);
  return { lines, change };
}

/** @throws never: a change to a line that is gone changes nothing */
export function changed(lines: readonly DraftCut[], change: CutListChange): readonly DraftCut[] {
  switch (change.type) {
    case 'replace':
      return change.lines;
    case 'add':
      return isFull(lines) ? lines : [...lines, addedCut(change, lines)];
    case 'addBelow':
      return insertBelow(lines, change.id, (line) => newCut(kindOf(line), lines));
    case 'duplicate':
      return insertBelow(lines, change.id, (line) => duplicateCut(line, lines));
    case 'remove':
      return lines.filter((line) => line.id !== change.id);
    default:
      return lines.map((line) => (line.id === change.id ? changedLine(line, change, lines) : line));
  }
}

export function isFull(lines: readonly DraftCut[]): boolean {
  return lines.length >= MAX_CUT_LINES;
}

function addedCut(change: Extract<CutListChange, { type: 'add' }>, lines: readonly DraftCut[]): DraftCut {
  const line = newCut(change.kind, lines);
  return { ...line, cut: { ...line.cut, ...change.figures } };
}

function insertBelow(
  lines: readonly DraftCut[],
  id: string,
  make: (line: DraftCut) => DraftCut,
): readonly DraftCut[] {
  const at = lines.findIndex((line) => line.id === id);
  const line = lines[at];
  if (line === undefined || isFull(lines)) return lines;
  return [...lines.slice(0, at + 1), make(line), ...lines.slice(at + 1)];
}

type LineChange = Extract<
  CutListChange,
  { type: 'mark' | 'note' | 'kind' | 'figure' | 'figures' | 'removal' }
>;

function changedLine(line: DraftCut, change: LineChange, lines: readonly DraftCut[]): DraftCut {
  switch (change.type) {
    case 'mark':
      return { ...line, mark: change.mark };
    case 'note':
      return { ...line, note: change.note };
    case 'kind':
      return withKind(line, change.kind, lines);
    case 'removal':
      return { ...line, cut: { ...line.cut, removal: change.isWanted ? usualRemoval : null } };
    case 'figures':
      return { ...line, cut: { ...line.cut, ...change.figures } };
    case 'figure':
      return { ...line, cut: withField(line.cut, change.field, change.value) };
  }
}

// Reinforced concrete and a tenth more for bond and kerf bind at the first pull: common practice, no source.
const usualRemoval = { densityPcf: 150, allowancePct: 10, maxPieceLb: null, maxSideFt: null };

function withField(cut: DraftCut['cut'], field: string, value: DraftCut['cut'][string]): DraftCut['cut'] {
  const inRemoval = /^removal\.(\w+)$/.exec(field)?.[1];
  if (inRemoval === undefined) return { ...cut, [field]: value };
  const removal = typeof cut.removal === 'object' && !Array.isArray(cut.removal) ? cut.removal : null;
  return { ...cut, removal: { ...removal, [inRemoval]: value as number | string | null } };
}
