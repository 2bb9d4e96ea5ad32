import type { NumberRange } from './check.ts';
import type { CutKind } from './types.ts';

/** A numeric field of a cut: its range, and whether it may be left out. */
export interface FieldLimit extends NumberRange {
  readonly optional?: boolean;
}

// Bounds keep nonsense out, they do not judge the work: the longest street job, the deepest dam core and the
// largest barrel made all fit.
export const lengthFtRange = { above: 0, max: 100_000, unit: 'ft' } as const;
export const depthInRange = { above: 0, max: 1_200, unit: 'in' } as const;
export const thicknessInRange = { above: 0, max: 600, unit: 'in' } as const;
export const coreDiameterInRange = { above: 0, max: 120, unit: 'in' } as const;
export const bladeDiameterInRange = { above: 0, max: 120, unit: 'in' } as const;
export const passThroughInRange = { min: 0, max: 60, unit: 'in' } as const;
export const countRange = { min: 1, max: 100_000, integer: true, unit: '' } as const;
export const densityPcfRange = { above: 0, max: 1_000, unit: 'pcf' } as const;
export const allowancePctRange = { min: 0, max: 200, unit: '%' } as const;
export const pieceLbRange = { above: 0, max: 10_000_000, unit: 'lb' } as const;
export const spacingFactorRange = { min: 24, max: 36, unit: 'thicknesses' } as const;
export const capFtRange = { above: 0, max: 30, unit: 'ft' } as const;
export const jointThicknessInRange = { min: 2, max: 60, unit: 'in' } as const;
export const runPerRiseRange = { min: 8, max: 20, unit: 'to 1' } as const;
export const lipHeightInRange = { above: 0, max: 60, unit: 'in' } as const;
const stitchLengthInRange = { above: 0, max: 120_000, unit: 'in' } as const;
const smallDimensionInRange = { above: 0, max: 240, unit: 'in' } as const;

/** The longest cut list, and the most pieces one element may be cut into. */
export const maxCuts = 10_000;
export const maxPieces = 10_000;

/** Ranges of the fields of `removal`, the way a piece must come out. */
export const removalLimits = {
  densityPcf: densityPcfRange,
  allowancePct: { ...allowancePctRange, optional: true },
  maxPieceLb: pieceLbRange,
  maxSideFt: { ...lengthFtRange, optional: true },
  maxShortSideFt: { ...lengthFtRange, optional: true },
} as const satisfies Record<string, FieldLimit>;

/** Ranges of the numeric fields of each kind of cut; schemas elsewhere use the same ones. */
export const cutLimits = {
  line: { lengthFt: lengthFtRange, depthIn: depthInRange, count: countRange },
  trench: {
    lengthFt: lengthFtRange,
    widthFt: lengthFtRange,
    thicknessIn: thicknessInRange,
    bladeDiameterIn: { ...bladeDiameterInRange, optional: true },
    passThroughIn: { ...passThroughInRange, optional: true },
    count: countRange,
  },
  opening: {
    lengthFt: lengthFtRange,
    widthFt: lengthFtRange,
    thicknessIn: thicknessInRange,
    bladeDiameterIn: { ...bladeDiameterInRange, optional: true },
    passThroughIn: { ...passThroughInRange, optional: true },
    count: countRange,
  },
  core: { diameterIn: coreDiameterInRange, depthIn: depthInRange, count: countRange },
  stitch: {
    lengthIn: stitchLengthInRange,
    bitDiameterIn: coreDiameterInRange,
    overlapIn: { min: 0, max: 120, unit: 'in' },
    depthIn: depthInRange,
    count: countRange,
  },
  joints: {
    lengthFt: lengthFtRange,
    widthFt: lengthFtRange,
    thicknessIn: jointThicknessInRange,
    spacingFactor: spacingFactorRange,
    capFt: capFtRange,
    count: countRange,
  },
  wire: {
    areaSqFt: { above: 0, max: 1_000_000, unit: 'sq ft' },
    pilotCores: { min: 0, max: 10_000, integer: true, unit: '' },
    pilotDiameterIn: coreDiameterInRange,
    depthIn: depthInRange,
    count: countRange,
  },
  curb: { lengthFt: lengthFtRange, heightIn: smallDimensionInRange, count: countRange },
  chase: {
    lengthFt: lengthFtRange,
    widthIn: smallDimensionInRange,
    depthIn: smallDimensionInRange,
    count: countRange,
  },
  block: { cutLengthIn: smallDimensionInRange, depthIn: smallDimensionInRange, count: countRange },
  pipe: { outsideDiameterIn: smallDimensionInRange, count: countRange },
  bar: { diameterIn: { above: 0, max: 12, unit: 'in' }, count: countRange },
  lip: { widthFt: lengthFtRange, heightIn: lipHeightInRange, runPerRise: runPerRiseRange, count: countRange },
} as const satisfies Record<CutKind, Record<string, FieldLimit>>;
