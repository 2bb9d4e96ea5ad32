import { checkNumber, checkNumberOr, checkObject } from './check.ts';
import { CuttingInputError } from './input-error.ts';
import { lengthFtRange, maxPieces, removalLimits, thicknessInRange } from './limits.ts';
import { compareNearly, isWithin, wholeUp } from './rounding.ts';
import { reinforcedConcretePcf } from './tables/unit-weights.ts';
import { arithmetic, put, type WorkingStep } from './working.ts';

/** Shown beside every piece that is lifted; an allowance of 10 % is what forms offer for it. */
export const firstPullCaution = 'The first pull is heavier than the piece: bond and kerf bind add to it.';

export interface PiecePlanInput {
  readonly lengthFt: number;
  readonly widthFt: number;
  readonly thicknessIn: number;
  readonly densityPcf?: number | undefined;
  readonly allowancePct?: number | undefined;
  readonly maxPieceLb: number;
  readonly maxSideFt?: number | undefined;
  readonly maxShortSideFt?: number | undefined;
}

export interface PiecePlan {
  readonly alongLength: number;
  readonly alongWidth: number;
  readonly pieces: number;
  readonly pieceLengthFt: number;
  readonly pieceWidthFt: number;
  /** Weight to lift, allowance included. */
  readonly pieceLb: number;
  readonly crossCutFt: number;
  readonly crossCutInchFeet: number;
  readonly working: readonly WorkingStep[];
}

/** A panel and its limits, numbers already checked. `panelLb` includes the allowance. */
export interface PanelLimits {
  readonly lengthFt: number;
  readonly widthFt: number;
  readonly panelLb: number;
  readonly maxPieceLb: number;
  readonly maxSideFt: number | undefined;
  readonly maxShortSideFt: number | undefined;
}

export interface PieceGrid {
  readonly alongLength: number;
  readonly alongWidth: number;
  readonly crossCutFt: number;
}

/**
 * The grid of equal pieces with the least cross-cut feet whose pieces obey every limit. Ties go to fewer pieces,
 * then the smaller longest side, then fewer cut lines. The search is exact over all grids of at most 10,000
 * pieces and of the order of the square root of the number of pieces.
 * @throws CuttingInputError also when every grid that obeys the limits has over 10,000 pieces
 */
export function piecePlan(input: PiecePlanInput): PiecePlan {
  const fields = checkObject(input, 'input');
  const lengthFt = checkNumber(fields.lengthFt, 'lengthFt', lengthFtRange);
  const widthFt = checkNumber(fields.widthFt, 'widthFt', lengthFtRange);
  const thicknessIn = checkNumber(fields.thicknessIn, 'thicknessIn', thicknessInRange);
  const densityPcf = checkNumberOr(
    fields.densityPcf,
    'densityPcf',
    removalLimits.densityPcf,
    reinforcedConcretePcf,
  );
  const allowancePct = checkNumberOr(fields.allowancePct, 'allowancePct', removalLimits.allowancePct, 0);
  const maxPieceLb = checkNumber(fields.maxPieceLb, 'maxPieceLb', removalLimits.maxPieceLb);
  const maxSideFt = checkNumberOr(fields.maxSideFt, 'maxSideFt', removalLimits.maxSideFt, undefined);
  const maxShortSideFt = checkNumberOr(
    fields.maxShortSideFt,
    'maxShortSideFt',
    removalLimits.maxShortSideFt,
    undefined,
  );
  const panelLb = ((lengthFt * widthFt * thicknessIn) / 12) * densityPcf * (1 + allowancePct / 100);
  const grid = leastCutGrid({ lengthFt, widthFt, panelLb, maxPieceLb, maxSideFt, maxShortSideFt });
  const pieces = grid.alongLength * grid.alongWidth;
  const plan = {
    alongLength: grid.alongLength,
    alongWidth: grid.alongWidth,
    pieces,
    pieceLengthFt: lengthFt / grid.alongLength,
    pieceWidthFt: widthFt / grid.alongWidth,
    pieceLb: panelLb / pieces,
    crossCutFt: grid.crossCutFt,
    crossCutInchFeet: grid.crossCutFt * thicknessIn,
  };
  return {
    ...plan,
    working: piecePlanWorking(plan, { lengthFt, widthFt, thicknessIn, densityPcf, allowancePct }),
  };
}

/** The search of `piecePlan` for numbers already checked. */
export function leastCutGrid(panel: PanelLimits): PieceGrid {
  const { lengthFt, widthFt, maxSideFt } = panel;
  const fewestAlongLength = maxSideFt === undefined ? 1 : Math.max(1, wholeUp(lengthFt / maxSideFt));
  const fewestAlongWidth = maxSideFt === undefined ? 1 : Math.max(1, wholeUp(widthFt / maxSideFt));
  let best: PieceGrid | undefined;
  for (let alongLength = fewestAlongLength; alongLength <= maxPieces; alongLength += 1) {
    const leastFeet = crossCutFeet(panel, alongLength, fewestAlongWidth);
    if (best !== undefined && compareNearly(leastFeet, best.crossCutFt) > 0) break;
    // For a given number along the length every further row only adds cutting, so the fewest rows are best.
    const alongWidth = fewestRows(panel, alongLength, fewestAlongWidth);
    if (alongLength * alongWidth > maxPieces) continue;
    const crossCutFt = crossCutFeet(panel, alongLength, alongWidth);
    const grid = { alongLength, alongWidth, crossCutFt };
    if (best === undefined || compareGrids(grid, best) < 0) best = grid;
  }
  if (best !== undefined) return best;
  throw new CuttingInputError({
    field: blamedLimit(panel),
    allowed: `large enough that at most ${maxPieces.toLocaleString('en-US')} pieces are cut`,
    given: panel[blamedLimit(panel)],
  });
}

function crossCutFeet(panel: PanelLimits, alongLength: number, alongWidth: number): number {
  return (alongLength - 1) * panel.widthFt + (alongWidth - 1) * panel.lengthFt;
}

function fewestRows(panel: PanelLimits, alongLength: number, fewestAlongWidth: number): number {
  const byWeight = wholeUp(panel.panelLb / (alongLength * panel.maxPieceLb));
  const { maxShortSideFt } = panel;
  const isNarrow = maxShortSideFt === undefined || isWithin(panel.lengthFt / alongLength, maxShortSideFt);
  const byDoorway = isNarrow ? 1 : wholeUp(panel.widthFt / maxShortSideFt);
  return Math.max(1, fewestAlongWidth, byWeight, byDoorway);
}

/**
 * Least cross-cut feet, then fewest pieces, then fewest cut lines. The smaller longest side, which ranks before cut
 * lines, never decides: with pieces of a × b the feet are L·W·(1/a + 1/b) − L − W, so grids equal in feet and in
 * number of pieces are equal in a + b and a·b, and so in both sides.
 */
function compareGrids(left: PieceGrid, right: PieceGrid): number {
  return (
    compareNearly(left.crossCutFt, right.crossCutFt) ||
    left.alongLength * left.alongWidth - right.alongLength * right.alongWidth ||
    left.alongLength + left.alongWidth - (right.alongLength + right.alongWidth)
  );
}

function blamedLimit(panel: PanelLimits): 'maxPieceLb' | 'maxSideFt' | 'maxShortSideFt' {
  if (!isWithin(panel.panelLb / panel.maxPieceLb, maxPieces)) return 'maxPieceLb';
  if (panel.maxSideFt !== undefined) return 'maxSideFt';
  return panel.maxShortSideFt === undefined ? 'maxPieceLb' : 'maxShortSideFt';
}

function piecePlanWorking(
  plan: Omit<PiecePlan, 'working'>,
  panel: { lengthFt: number; widthFt: number; thicknessIn: number; densityPcf: number; allowancePct: number },
): readonly WorkingStep[] {
  return [
    {
      label: 'Weight to lift, each piece',
      formula: 'L × W × T ÷ 12 × density × (1 + allowance) ÷ pieces',
      inputs: [
        put('L', panel.lengthFt, 'ft'),
        put('W', panel.widthFt, 'ft'),
        put('T', panel.thicknessIn, 'in'),
        put('density', panel.densityPcf, 'pcf'),
        put('allowance', panel.allowancePct, '%'),
        put('pieces', plan.pieces, ''),
      ],
      value: plan.pieceLb,
      unit: 'lb',
      source: arithmetic,
    },
    {
      label: 'Cross cuts',
      formula:
        '(pieces along length − 1) × W + (pieces along width − 1) × L, the least that obeys every limit',
      inputs: [
        put('pieces along length', plan.alongLength, ''),
        put('pieces along width', plan.alongWidth, ''),
        put('W', panel.widthFt, 'ft'),
        put('L', panel.lengthFt, 'ft'),
      ],
      value: plan.crossCutFt,
      unit: 'ft',
      source: arithmetic,
    },
    {
      label: 'Cross cuts in inch-feet',
      formula: 'cross-cut feet × T',
      inputs: [put('cross-cut feet', plan.crossCutFt, 'ft'), put('T', panel.thicknessIn, 'in')],
      value: plan.crossCutInchFeet,
      unit: 'in-ft',
      source: arithmetic,
    },
  ];
}
