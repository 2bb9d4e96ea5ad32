import { checkNumber, checkNumberOr, checkObject } from './check.ts';
import {
  coreDiameterInRange,
  densityPcfRange,
  depthInRange,
  lengthFtRange,
  thicknessInRange,
} from './limits.ts';
import { reinforcedConcretePcf } from './tables/unit-weights.ts';

const cuInPerCuFt = 1_728;

export interface CoreWeightInput {
  readonly diameterIn: number;
  readonly lengthIn: number;
  readonly densityPcf?: number | undefined;
}

export interface SlabWeightInput {
  readonly lengthFt: number;
  readonly widthFt: number;
  readonly thicknessIn: number;
  readonly densityPcf?: number | undefined;
}

/** Volume of a solid cylinder in cubic feet from inches. */
export function cylinderCuFt(diameterIn: number, lengthIn: number): number {
  return ((Math.PI / 4) * diameterIn * diameterIn * lengthIn) / cuInPerCuFt;
}

/**
 * Weight of a core in pounds: π/4 · Ø² · L / 1728 · γ, 150 pcf unless given. The bit's outside diameter weighs
 * a little more than the core itself, on the safe side.
 * @throws CuttingInputError
 */
export function coreWeightLb(input: CoreWeightInput): number {
  const fields = checkObject(input, 'input');
  const diameterIn = checkNumber(fields.diameterIn, 'diameterIn', coreDiameterInRange);
  const lengthIn = checkNumber(fields.lengthIn, 'lengthIn', depthInRange);
  const densityPcf = checkNumberOr(fields.densityPcf, 'densityPcf', densityPcfRange, reinforcedConcretePcf);
  return cylinderCuFt(diameterIn, lengthIn) * densityPcf;
}

/**
 * Weight of a slab or wall panel in pounds, 150 pcf unless given.
 * @throws CuttingInputError
 */
export function slabWeightLb(input: SlabWeightInput): number {
  const fields = checkObject(input, 'input');
  const lengthFt = checkNumber(fields.lengthFt, 'lengthFt', lengthFtRange);
  const widthFt = checkNumber(fields.widthFt, 'widthFt', lengthFtRange);
  const thicknessIn = checkNumber(fields.thicknessIn, 'thicknessIn', thicknessInRange);
  const densityPcf = checkNumberOr(fields.densityPcf, 'densityPcf', densityPcfRange, reinforcedConcretePcf);
  return ((lengthFt * widthFt * thicknessIn) / 12) * densityPcf;
}
