import { checkList, checkObject } from '../check.ts';
import { CuttingInputError } from '../input-error.ts';
import { maxCuts } from '../limits.ts';
import type {
  CoreGroup,
  Cut,
  CutListTakeoff,
  CutListTotals,
  CutQuantities,
  CutTakeoff,
  SawAtDepth,
} from '../types.ts';
import { takeoffCut } from './takeoff-cut.ts';

/**
 * Takeoff of a whole cut list: every cut, and totals with cores grouped by diameter and saw feet by depth.
 * @throws CuttingInputError with the cut's place in `field`, as in `cuts[3].depthIn`
 */
export function takeoffCutList(input: { readonly cuts: readonly Cut[] }): CutListTakeoff {
  const list = checkList(checkObject(input, 'input').cuts, 'cuts', maxCuts);
  const cuts = list.map(takeoffListed);
  return { totals: totalsOf(cuts), cuts };
}

/** `takeoffCut` checks the shape itself, so an item read from outside may go in as it is. */
function takeoffListed(cut: unknown, index: number): CutTakeoff {
  try {
    return takeoffCut(cut as Cut);
  } catch (error) {
    if (!(error instanceof CuttingInputError)) throw error;
    if (error.field === 'cut') {
      throw new CuttingInputError({ field: `cuts[${index}]`, allowed: error.allowed, given: error.given });
    }
    throw error.within(`cuts[${index}]`);
  }
}

function totalsOf(cuts: readonly CutTakeoff[]): CutListTotals {
  const sums = { ...noQuantities };
  let pieces = 0;
  let heaviestPieceLb: number | null = null;
  for (const cut of cuts) {
    addQuantities(sums, cut);
    if (cut.pieces === null) continue;
    pieces += cut.pieces.count * cut.count;
    heaviestPieceLb = Math.max(heaviestPieceLb ?? 0, cut.pieces.weightLb);
  }
  return { ...sums, cores: groupCores(cuts), sawAtDepth: groupDepths(cuts), pieces, heaviestPieceLb };
}

type Sums = { -readonly [Quantity in keyof CutQuantities]: number };

const noQuantities: CutQuantities = {
  sawFt: 0,
  overcutFt: 0,
  inchFeet: 0,
  sawSqFt: 0,
  coreHoles: 0,
  coreInches: 0,
  crossCutFt: 0,
  pieceCuts: 0,
  removedCuFt: 0,
  removedLb: 0,
};

// Field by field, because looking each up by its name takes most of the time of a long list.
function addQuantities(sums: Sums, cut: CutQuantities): void {
  sums.sawFt += cut.sawFt;
  sums.overcutFt += cut.overcutFt;
  sums.inchFeet += cut.inchFeet;
  sums.sawSqFt += cut.sawSqFt;
  sums.coreHoles += cut.coreHoles;
  sums.coreInches += cut.coreInches;
  sums.crossCutFt += cut.crossCutFt;
  sums.pieceCuts += cut.pieceCuts;
  sums.removedCuFt += cut.removedCuFt;
  sums.removedLb += cut.removedLb;
}

/** Equal diameters together, the smallest first, those not known last. */
function groupCores(cuts: readonly CutTakeoff[]): readonly CoreGroup[] {
  const groups = new Map<number | null, { holes: number; coreInches: number }>();
  for (const core of cuts.flatMap((cut) => cut.cores)) {
    const group = groups.get(core.diameterIn) ?? { holes: 0, coreInches: 0 };
    group.holes += core.holes;
    group.coreInches += core.coreInches;
    groups.set(core.diameterIn, group);
  }
  return [...groups]
    .map(([diameterIn, group]) => ({ diameterIn, ...group }))
    .sort((left, right) => (left.diameterIn ?? Infinity) - (right.diameterIn ?? Infinity));
}

/** Saw feet at each depth, the shallowest first. */
function groupDepths(cuts: readonly CutTakeoff[]): readonly SawAtDepth[] {
  const groups = new Map<number, { sawFt: number; inchFeet: number }>();
  for (const cut of cuts) {
    if (cut.depthIn === null || cut.sawFt === 0) continue;
    const group = groups.get(cut.depthIn) ?? { sawFt: 0, inchFeet: 0 };
    group.sawFt += cut.sawFt;
    group.inchFeet += cut.inchFeet;
    groups.set(cut.depthIn, group);
  }
  return [...groups]
    .map(([depthIn, group]) => ({ depthIn, ...group }))
    .sort((left, right) => left.depthIn - right.depthIn);
}
