import { checkChoice, checkList } from '../check.ts';
import {
  cornerTreatments,
  openingSides,
  type CoreGroup,
  type CutTakeoff,
  type OpeningCut,
  type OpeningSide,
} from '../types.ts';
import { arithmetic, put, type WorkingStep } from '../working.ts';
import { cornerOvercut, overcutFeet, overcutFeetStep } from './corner-overcuts.ts';
import { panelPieces } from './panel-pieces.ts';
import { inchFeetStep, takeoffOf, weightStep } from './quantities.ts';

/** Perimeter, cross cuts and corners of an opening. */
export function takeoffOpening(cut: OpeningCut): CutTakeoff {
  const { lengthFt, widthFt, thicknessIn, count } = cut;
  const uncut = checkUncutSides(cut.uncutSides);
  const panel = panelPieces(cut, cut.removal);
  const perimeterFt = cutPerimeterFt(cut, uncut);
  const crossCutFt = panel.crossCutFt * count;
  const sawFt = perimeterFt * count + crossCutFt;
  const removedCuFt = ((lengthFt * widthFt * thicknessIn) / 12) * count;
  const corners = takeoffCorners(cut, cutCorners(uncut));
  const sawStep: WorkingStep = {
    label: 'Saw feet',
    formula: '(perimeter of the cut sides + cross cuts) × count',
    inputs: [
      put('perimeter', perimeterFt, 'ft'),
      put('cross cuts', panel.crossCutFt, 'ft'),
      put('count', count, ''),
    ],
    value: sawFt,
    unit: 'ft',
    source: arithmetic,
  };
  return takeoffOf(cut, {
    sawFt,
    depthIn: thicknessIn,
    crossCutFt,
    pieces: panel.pieces,
    removedCuFt,
    densityPcf: panel.densityPcf,
    overcutFt: corners.overcutFt,
    core: corners.core,
    cautions: [...corners.cautions, ...panel.cautions],
    working: [
      ...panel.working,
      sawStep,
      inchFeetStep(sawFt, thicknessIn),
      ...corners.working,
      weightStep(removedCuFt, panel.densityPcf),
    ],
  });
}

/** The cut sides of an opening: all but those named. Repeats do no harm. */
export function checkUncutSides(value: unknown): ReadonlySet<OpeningSide> {
  if (value === undefined) return new Set();
  const sides = checkList(value, 'uncutSides', openingSides.length);
  return new Set(sides.map((side, index) => checkChoice(side, `uncutSides[${index}]`, openingSides)));
}

/** Corners where two cut sides meet; only there does a blade run past. */
export function cutCorners(uncut: ReadonlySet<OpeningSide>): number {
  const levels = ['top', 'bottom'] as const;
  const uprights = ['left', 'right'] as const;
  return (
    levels.filter((side) => !uncut.has(side)).length * uprights.filter((side) => !uncut.has(side)).length
  );
}

function cutPerimeterFt(cut: OpeningCut, uncut: ReadonlySet<OpeningSide>): number {
  return openingSides.reduce((perimeterFt, side) => {
    if (uncut.has(side)) return perimeterFt;
    return perimeterFt + (side === 'top' || side === 'bottom' ? cut.lengthFt : cut.widthFt);
  }, 0);
}

interface TreatedCorners {
  readonly overcutFt: number;
  readonly core: CoreGroup | undefined;
  readonly cautions: readonly string[];
  readonly working: readonly WorkingStep[];
}

/** Overcuts or corner cores, by the corner treatment; a square finish has neither. */
function takeoffCorners(cut: OpeningCut, corners: number): TreatedCorners {
  const treatment = checkChoice(cut.corners, 'corners', cornerTreatments);
  const { overcutIn, cautions, working } = cornerOvercut(cut);
  if (corners === 0 || treatment === 'square') {
    return { ...untreated, cautions: overcutIn === undefined ? [] : cautions };
  }
  if (treatment === 'overcut') {
    if (overcutIn === undefined) return { ...untreated, cautions };
    const ends = { overcutIn, ends: 2 * corners, count: cut.count };
    return {
      overcutFt: overcutFeet(ends),
      core: undefined,
      cautions,
      working: [...working, overcutFeetStep(ends)],
    };
  }
  const core = cornerCores(cut, corners, overcutIn);
  return {
    overcutFt: 0,
    core,
    cautions: overcutIn === undefined ? [noCornerCoreSize] : cautions,
    working: [...working, cornerCoreStep(core, overcutIn)],
  };
}

const untreated = { overcutFt: 0, core: undefined, working: [] };

export const noCornerCoreSize = 'The size of the corner cores is not known: no blade is named.';

function cornerCores(cut: OpeningCut, corners: number, overcutIn: number | undefined): CoreGroup {
  const holes = corners * cut.count;
  return {
    diameterIn: overcutIn === undefined ? null : 2 * overcutIn,
    holes,
    coreInches: holes * cut.thicknessIn,
  };
}

function cornerCoreStep(group: CoreGroup, overcutIn: number | undefined): WorkingStep {
  return {
    label: 'Corner cores',
    formula: 'one a corner, Ø = 2 × overcut, tangent to both lines; core-inches = holes × thickness',
    inputs: [
      put('holes', group.holes, ''),
      ...(overcutIn === undefined ? [] : [put('overcut', overcutIn, 'in'), put('Ø', 2 * overcutIn, 'in')]),
    ],
    value: group.coreInches,
    unit: 'core-in',
    source: arithmetic,
  };
}
