import { checkBoolean, checkNumber, checkObject } from './check.ts';
import { cutLimits } from './limits.ts';
import { arithmetic, put, type WorkingStep } from './working.ts';
import { wholeUp } from './rounding.ts';

export interface StitchInput {
  readonly lengthIn: number;
  readonly bitDiameterIn: number;
  readonly overlapIn: number;
  readonly closed: boolean;
  readonly depthIn: number;
}

export interface StitchHoles {
  readonly holes: number;
  /** Centre to centre, the holes evenly spread; 0 for a single hole. */
  readonly pitchIn: number;
  readonly coreInches: number;
  /** Height of the cusp left between two holes on the finished face. */
  readonly cuspIn: number;
  readonly working: readonly WorkingStep[];
}

/**
 * Bits, overlaps and runs are given to the hundredth of an inch at best. A hole more is not drilled for less
 * pitch than half of that: 384 in of perimeter with a 3.25-in bit lapping 0.13 in is 123 holes, as drilled on a
 * published job, not 124.
 */
export const stitchPitchToleranceIn = 0.005;

/**
 * Overlapping cores along a line. Closed run: ⌈P ÷ (Ø − o)⌉ holes; open run: ⌈(L − Ø) ÷ (Ø − o)⌉ + 1. The length
 * is along the hole-centre line.
 * @throws CuttingInputError also when the overlap is not less than the bit, or the run is shorter than one bit
 */
export function stitchHoles(input: StitchInput): StitchHoles {
  const run = checkStitch(input);
  const layout = layOutStitch(run);
  return { ...layout, working: stitchWorking(run, layout) };
}

/** The run, its fields checked. */
export function checkStitch(input: StitchInput): StitchInput {
  const fields = checkObject(input, 'input');
  const limits = cutLimits.stitch;
  const bitDiameterIn = checkNumber(fields.bitDiameterIn, 'bitDiameterIn', limits.bitDiameterIn);
  return {
    bitDiameterIn,
    // Above that the holes would barely move on.
    overlapIn: checkNumber(fields.overlapIn, 'overlapIn', { min: 0, max: bitDiameterIn * 0.95, unit: 'in' }),
    closed: checkBoolean(fields.closed, 'closed'),
    lengthIn: checkNumber(fields.lengthIn, 'lengthIn', {
      min: bitDiameterIn,
      max: limits.lengthIn.max,
      unit: 'in',
    }),
    depthIn: checkNumber(fields.depthIn, 'depthIn', limits.depthIn),
  };
}

/** `stitchHoles` without its working, for a run already checked. */
export function layOutStitch(run: StitchInput): Omit<StitchHoles, 'working'> {
  const { lengthIn, bitDiameterIn, overlapIn, closed, depthIn } = run;
  // Never wider than the bit: touching holes leave no web, parted ones do.
  const widestPitchIn = Math.min(bitDiameterIn, bitDiameterIn - overlapIn + stitchPitchToleranceIn);
  const runIn = closed ? lengthIn : lengthIn - bitDiameterIn;
  const gaps = wholeUp(runIn / widestPitchIn);
  const holes = closed ? gaps : gaps + 1;
  const pitchIn = gaps === 0 ? 0 : runIn / gaps;
  const radiusIn = bitDiameterIn / 2;
  const cuspIn = radiusIn - Math.sqrt(Math.max(0, radiusIn * radiusIn - (pitchIn * pitchIn) / 4));
  return { holes, pitchIn, coreInches: holes * depthIn, cuspIn };
}

/** The working of a stitch-drilled run, step by step, as the layout was found. */
export function stitchWorking(
  run: StitchInput,
  layout: Omit<StitchHoles, 'working'>,
): readonly WorkingStep[] {
  const { lengthIn, bitDiameterIn, overlapIn, closed, depthIn } = run;
  const { holes, pitchIn, coreInches, cuspIn } = layout;
  return [
    {
      label: 'Holes',
      formula: closed ? '⌈P ÷ (Ø − overlap)⌉' : '⌈(L − Ø) ÷ (Ø − overlap)⌉ + 1',
      inputs: [
        put(closed ? 'P' : 'L', lengthIn, 'in'),
        put('Ø', bitDiameterIn, 'in'),
        put('overlap', overlapIn, 'in'),
        put('pitch tolerance', stitchPitchToleranceIn, 'in'),
      ],
      value: holes,
      unit: 'holes',
      source: arithmetic,
    },
    {
      label: 'Core-inches',
      formula: 'holes × depth',
      inputs: [put('holes', holes, ''), put('depth', depthIn, 'in')],
      value: coreInches,
      unit: 'core-in',
      source: arithmetic,
    },
    {
      label: 'Cusp between holes',
      formula: 'R − √(R² − (pitch ÷ 2)²)',
      inputs: [put('R', bitDiameterIn / 2, 'in'), put('pitch', pitchIn, 'in')],
      value: cuspIn,
      unit: 'in',
      source: arithmetic,
    },
  ];
}
