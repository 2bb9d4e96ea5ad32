import { checkChoice } from '../check.ts';
import type { CutTakeoff, TrenchCut } from '../types.ts';
import { arithmetic, put, type WorkingStep } from '../working.ts';
import {
  brokenWebCaution,
  cornerOvercut,
  overcutFeet,
  overcutFeetStep,
  shortCrossCutCaution,
  type CornerOvercut,
} from './corner-overcuts.ts';
import { panelPieces } from './panel-pieces.ts';
import { inchFeetStep, takeoffOf, weightStep } from './quantities.ts';

/** Sides, ends and cross cuts of a trench. */
export function takeoffTrench(cut: TrenchCut): CutTakeoff {
  const { lengthFt, widthFt, thicknessIn, count } = cut;
  const sideCuts = cut.sideCuts === undefined ? 2 : checkChoice(cut.sideCuts, 'sideCuts', [1, 2]);
  const endCuts = checkChoice(cut.endCuts, 'endCuts', [0, 1, 2]);
  const panel = panelPieces(cut, cut.removal);
  const crossCutFt = panel.crossCutFt * count;
  const sawFt = (sideCuts * lengthFt + endCuts * widthFt) * count + crossCutFt;
  const cutEnds = 2 * sideCuts * endCuts;
  const corner = cornerOvercut(cut);
  const overcut = { overcutIn: corner.overcutIn ?? 0, ends: cutEnds, count };
  const removedCuFt = ((lengthFt * widthFt * thicknessIn) / 12) * count;
  const sawStep: WorkingStep = {
    label: 'Saw feet',
    formula: '(sides × L + ends × W + cross cuts) × count',
    inputs: [
      put('sides', sideCuts, ''),
      put('L', lengthFt, 'ft'),
      put('ends', endCuts, ''),
      put('W', widthFt, 'ft'),
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
    overcutFt: overcutFeet(overcut),
    crossCutFt,
    pieces: panel.pieces,
    removedCuFt,
    densityPcf: panel.densityPcf,
    cautions: [
      ...trenchCautions({ corner, cutEnds, widthFt, hasCrossCuts: crossCutFt > 0 }),
      ...panel.cautions,
    ],
    working: [
      ...panel.working,
      sawStep,
      inchFeetStep(sawFt, thicknessIn),
      ...(corner.overcutIn === undefined ? [] : [...corner.working, overcutFeetStep(overcut)]),
      weightStep(removedCuFt, panel.densityPcf),
    ],
  });
}

function trenchCautions(trench: {
  corner: CornerOvercut;
  cutEnds: number;
  widthFt: number;
  hasCrossCuts: boolean;
}): readonly string[] {
  const { corner, cutEnds, widthFt, hasCrossCuts } = trench;
  const cautions = cutEnds > 0 || corner.overcutIn !== undefined ? [...corner.cautions] : [];
  if (hasCrossCuts) {
    const isShort = corner.overcutIn !== undefined && 2 * corner.overcutIn >= widthFt * 12;
    cautions.push(isShort ? shortCrossCutCaution : brokenWebCaution);
  }
  return cautions;
}
