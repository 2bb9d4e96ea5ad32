import { checkNumber, checkNumberOr, checkObject } from './check.ts';
import { densityPcfRange } from './limits.ts';
import { wholeUp } from './rounding.ts';
import { reinforcedConcretePcf } from './tables/unit-weights.ts';
import { arithmetic, commonPractice, put, type WorkingStep } from './working.ts';

const cuInPerGal = 231;
const cuInPerCuFt = 1_728;
const waterLbPerGal = 8.34;
const drumGal = 55;
const cuFtPerCuYd = 27;
const lbPerTon = 2_000;

export interface Slurry {
  readonly waterGal: number;
  readonly solidsCuIn: number;
  readonly slurryGal: number;
  /** Of 55 gallons, filled to the brim. */
  readonly drums: number;
  readonly weightLb: number;
  readonly working: readonly WorkingStep[];
}

export interface Spoil {
  readonly tons: number;
  readonly bankCuYd: number;
  readonly looseCuYd: number;
  readonly working: readonly WorkingStep[];
}

/**
 * Slurry of a sawing job: all the water, and the kerf as solids at 150 pcf. Caustic; keep out of drains.
 * @throws CuttingInputError
 */
export function slurry(input: {
  readonly inchFeet: number;
  readonly kerfIn: number;
  readonly gallonsPerMinute: number;
  readonly minutes: number;
}): Slurry {
  const fields = checkObject(input, 'input');
  const inchFeet = checkNumber(fields.inchFeet, 'inchFeet', { min: 0, max: 100_000_000, unit: 'in-ft' });
  const kerfIn = checkNumber(fields.kerfIn, 'kerfIn', { above: 0, max: 4, unit: 'in' });
  const gallonsPerMinute = checkNumber(fields.gallonsPerMinute, 'gallonsPerMinute', {
    min: 0,
    max: 100,
    unit: 'gpm',
  });
  const minutes = checkNumber(fields.minutes, 'minutes', { min: 0, max: 1_000_000, unit: 'min' });
  const waterGal = gallonsPerMinute * minutes;
  const solidsCuIn = 12 * inchFeet * kerfIn;
  const slurryGal = waterGal + solidsCuIn / cuInPerGal;
  const drums = wholeUp(slurryGal / drumGal);
  const weightLb = waterGal * waterLbPerGal + (solidsCuIn / cuInPerCuFt) * reinforcedConcretePcf;
  const water = put('water', waterGal, 'gal');
  const solids = put('solids', solidsCuIn, 'cu in');
  return {
    waterGal,
    solidsCuIn,
    slurryGal,
    drums,
    weightLb,
    working: [
      step(
        'Water',
        'flow × minutes',
        [put('flow', gallonsPerMinute, 'gpm'), put('minutes', minutes, 'min')],
        [waterGal, 'gal'],
      ),
      step(
        'Solids',
        '12 × inch-feet × kerf',
        [put('inch-feet', inchFeet, 'in-ft'), put('kerf', kerfIn, 'in')],
        [solidsCuIn, 'cu in'],
      ),
      step('Slurry', 'water + solids ÷ 231', [water, solids], [slurryGal, 'gal']),
      step('Drums', '⌈slurry ÷ 55⌉', [put('slurry', slurryGal, 'gal')], [drums, 'drums']),
      step('Weight', 'water × 8.34 + solids ÷ 1,728 × 150', [water, solids], [weightLb, 'lb']),
    ],
  };
}

/**
 * Broken concrete to haul: tons, and yards in place and loose.
 * @throws CuttingInputError
 */
export function spoil(input: {
  readonly cuFt: number;
  readonly densityPcf?: number | undefined;
  /** Loose over solid volume. */
  readonly bulking?: number | undefined;
}): Spoil {
  const fields = checkObject(input, 'input');
  const cuFt = checkNumber(fields.cuFt, 'cuFt', { min: 0, max: 1_000_000_000, unit: 'cu ft' });
  const densityPcf = checkNumberOr(fields.densityPcf, 'densityPcf', densityPcfRange, reinforcedConcretePcf);
  const bulking = checkNumberOr(fields.bulking, 'bulking', { min: 1, max: 3, unit: 'times' }, 1.5);
  const tons = (cuFt * densityPcf) / lbPerTon;
  const bankCuYd = cuFt / cuFtPerCuYd;
  const looseCuYd = bankCuYd * bulking;
  const volume = put('volume', cuFt, 'cu ft');
  return {
    tons,
    bankCuYd,
    looseCuYd,
    working: [
      step('Tons', 'volume × density ÷ 2,000', [volume, put('density', densityPcf, 'pcf')], [tons, 'tons']),
      step('In place', 'volume ÷ 27', [volume], [bankCuYd, 'cu yd']),
      {
        ...step(
          'Loose',
          'in place × bulking',
          [put('in place', bankCuYd, 'cu yd'), put('bulking', bulking, 'times')],
          [looseCuYd, 'cu yd'],
        ),
        source: fields.bulking === undefined ? commonPractice : arithmetic,
      },
    ],
  };
}

function step(
  label: string,
  formula: string,
  inputs: WorkingStep['inputs'],
  [value, unit]: readonly [number, string],
): WorkingStep {
  return { label, formula, inputs, value, unit, source: arithmetic };
}
