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
import { cornerOvercut, overcutFeet } from './corner-overcuts.ts';
import { panelPieces } from './panel-pieces.ts';
import { coresOf, inchFeetStep, removed, sawnTo, takeoffOf, weightStep } from './quantities.ts';

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
    ...sawnTo(sawFt, thicknessIn),
    crossCutFt,
    pieces: panel.pieces,
    ...removed(removedCuFt, panel.densityPcf),
    ...corners,
    working: [
      ...panel.working,
      sawStep,
      inchFeetStep(sawFt, thicknessIn),
      ...(corners.working ?? []),
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

/** Overcuts or corner cores, by the corner treatment; a square finish has neither. */
function takeoffCorners(cut: OpeningCut, corners: number): Partial<Omit<CutTakeoff, 'kind' | 'count'>> {
  const treatment = checkChoice(cut.corners, 'corners', cornerTreatments);
  const overcut = cornerOvercut(cut);
  if (corners === 0 || treatment === 'square') {
    return { cautions: overcut.overcutIn === undefined ? [] : overcut.cautions };
  }
  if (treatment === 'overcut') {
    const { overcutFt, step } = overcutFeet({
      overcutIn: overcut.overcutIn ?? 0,
      ends: 2 * corners,
      count: cut.count,
    });
    const working = overcut.overcutIn === undefined ? [] : [...overcut.working, step];
    return { overcutFt, cautions: overcut.cautions, working };
  }
  const group = cornerCores(cut, corners, overcut.overcutIn);
  return {
    ...coresOf(group),
    cautions: overcut.overcutIn === undefined ? [noCornerCoreSize] : overcut.cautions,
    working: [...overcut.working, cornerCoreStep(group, overcut.overcutIn)],
  };
}

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
