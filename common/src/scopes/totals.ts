import { CuttingInputError, takeoffCut, type CutTakeoff } from '../cutting/index.ts';
import type { FieldIssue } from '../errors/index.ts';
import type { CutLine } from './cut.schema.ts';
import type { ScopeTotals } from './scope.views.ts';

/** What the engine makes of a cut list: sums and each cut by its id, or every complaint at its field. */
export type CutListReading =
  | { ok: true; totals: ScopeTotals; byCutId: ReadonlyMap<string, CutTakeoff> }
  | { ok: false; issues: FieldIssue[] };

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

/**
 * Take off a cut list. A cut may obey its schema and still make no sense to the engine, since some limits hold
 * between fields (a blade too small for the thickness, pieces so light that there would be tens of thousands):
 * those come back as issues, all at once, with paths like `cuts.2.cut.bladeDiameterIn`.
 */
export function readCutList(cuts: readonly CutLine[]): CutListReading {
  const issues: FieldIssue[] = [];
  const byCutId = new Map<string, CutTakeoff>();
  const totals = { ...noTotals };
  cuts.forEach((line, index) => {
    const takeoff = takeoffOrIssue(line, index);
    if ('message' in takeoff) {
      issues.push(takeoff);
      return;
    }
    byCutId.set(line.id, takeoff);
    addTakeoff(totals, takeoff);
  });
  return issues.length === 0 ? { ok: true, totals, byCutId } : { ok: false, issues };
}

function takeoffOrIssue(line: CutLine, index: number): CutTakeoff | FieldIssue {
  try {
    return takeoffCut(line.cut);
  } catch (error) {
    if (!(error instanceof CuttingInputError)) throw error;
    // The engine writes list places as `removal[0]`; paths of issues are dotted throughout.
    const field = error.field.replaceAll('[', '.').replaceAll(']', '');
    return { path: `cuts.${index}.cut.${fieldOfCut(line, field)}`, message: `Must be ${error.allowed}` };
  }
}

/** Joints too many for their panels' shape are said of `maxAspect`; where a cut has none, the slab's width is what helps. */
function fieldOfCut({ cut }: CutLine, field: string): string {
  if (cut.kind !== 'joints') return field;
  return field === 'maxAspect' && cut.maxAspect === undefined ? 'widthFt' : field;
}

/** Sums of cuts that have been taken off already. */
export function sumTakeoffs(takeoffs: readonly CutTakeoff[]): ScopeTotals {
  const totals = { ...noTotals };
  for (const takeoff of takeoffs) addTakeoff(totals, takeoff);
  return totals;
}

function addTakeoff(totals: ScopeTotals, takeoff: CutTakeoff): void {
  totals.sawFt += takeoff.sawFt;
  totals.overcutFt += takeoff.overcutFt;
  totals.inchFeet += takeoff.inchFeet;
  totals.sawSqFt += takeoff.sawSqFt;
  totals.coreHoles += takeoff.coreHoles;
  totals.coreInches += takeoff.coreInches;
  totals.crossCutFt += takeoff.crossCutFt;
  totals.pieceCuts += takeoff.pieceCuts;
  totals.removedCuFt += takeoff.removedCuFt;
  totals.removedLb += takeoff.removedLb;
  // `pieces` of a takeoff describes one opening.
  totals.pieces += (takeoff.pieces?.count ?? 0) * takeoff.count;
}
