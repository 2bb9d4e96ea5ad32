import { checkNumber, checkNumberOr, checkObject, within } from '../check.ts';
import { removalLimits } from '../limits.ts';
import { firstPullCaution, leastCutGrid } from '../pieces.ts';
import type { PieceSummary, Removal } from '../types.ts';
import { arithmetic, put, type WorkingStep } from '../working.ts';

export interface PanelPieces {
  /** Cross-cut feet of one panel. */
  readonly crossCutFt: number;
  readonly pieces: PieceSummary | null;
  readonly densityPcf: number | undefined;
  readonly cautions: readonly string[];
  readonly working: readonly WorkingStep[];
}

const wholePanel: PanelPieces = {
  crossCutFt: 0,
  pieces: null,
  densityPcf: undefined,
  cautions: [],
  working: [],
};

const pieceCautions = [firstPullCaution];

/** Cross cuts and pieces of one opening or trench by its removal; none without one. */
export function panelPieces(
  panel: { readonly lengthFt: number; readonly widthFt: number; readonly thicknessIn: number },
  removal: Removal | undefined,
): PanelPieces {
  if (removal === undefined) return wholePanel;
  return within('removal', () => cutPanel(panel, removal));
}

function cutPanel(
  { lengthFt, widthFt, thicknessIn }: { lengthFt: number; widthFt: number; thicknessIn: number },
  removal: Removal,
): PanelPieces {
  const fields = checkObject(removal, 'removal');
  const densityPcf = checkNumber(fields.densityPcf, 'densityPcf', removalLimits.densityPcf);
  const allowancePct = checkNumberOr(fields.allowancePct, 'allowancePct', removalLimits.allowancePct, 0);
  const panelLb = ((lengthFt * widthFt * thicknessIn) / 12) * densityPcf * (1 + allowancePct / 100);
  const { alongLength, alongWidth, crossCutFt } = leastCutGrid({
    lengthFt,
    widthFt,
    panelLb,
    maxPieceLb: checkNumber(fields.maxPieceLb, 'maxPieceLb', removalLimits.maxPieceLb),
    maxSideFt: checkNumberOr(fields.maxSideFt, 'maxSideFt', removalLimits.maxSideFt, undefined),
    maxShortSideFt: checkNumberOr(
      fields.maxShortSideFt,
      'maxShortSideFt',
      removalLimits.maxShortSideFt,
      undefined,
    ),
  });
  const count = alongLength * alongWidth;
  const pieces = {
    count,
    lengthFt: lengthFt / alongLength,
    widthFt: widthFt / alongWidth,
    weightLb: panelLb / count,
  };
  return {
    crossCutFt,
    pieces,
    densityPcf,
    cautions: pieceCautions,
    working: piecesWorking(pieces, { lengthFt, widthFt, crossCutFt }),
  };
}

function piecesWorking(
  pieces: PieceSummary,
  { lengthFt, widthFt, crossCutFt }: { lengthFt: number; widthFt: number; crossCutFt: number },
): readonly WorkingStep[] {
  return [
    {
      label: 'Cross cuts of one',
      formula: 'the grid with the least cross-cut feet whose pieces obey every limit',
      inputs: [
        put('L', lengthFt, 'ft'),
        put('W', widthFt, 'ft'),
        put('pieces', pieces.count, ''),
        put('weight to lift, each', pieces.weightLb, 'lb'),
      ],
      value: crossCutFt,
      unit: 'ft',
      source: arithmetic,
    },
  ];
}
