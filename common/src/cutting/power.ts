import { checkChoice, checkNumber, checkNumberOr, checkObject } from './check.ts';
import { CuttingInputError } from './input-error.ts';
import { wholeUp } from './rounding.ts';

const workRange = { min: 0, max: 100_000_000, unit: '' } as const;
const perPackRange = { above: 0, max: 1_000_000, unit: '' } as const;

export type BatteryPacksInput =
  | { readonly inchFeet: number; readonly inchFeetPerPack: number }
  | { readonly units: number; readonly unitsPerPack: number };

/**
 * Battery packs for a job, by inch-feet or by units (blocks, bars): ⌈work ÷ work per pack⌉.
 * @throws CuttingInputError also when neither pair of fields is given, or both
 */
export function batteryPacks(input: BatteryPacksInput): number {
  const fields = checkObject(input, 'input');
  const isByUnits = fields.units !== undefined;
  if (isByUnits === (fields.inchFeet !== undefined)) {
    throw new CuttingInputError({
      field: isByUnits ? 'units' : 'inchFeet',
      allowed: 'given alone: either inchFeet or units',
      given: isByUnits ? fields.units : undefined,
    });
  }
  const [work, perPack] = isByUnits
    ? (['units', 'unitsPerPack'] as const)
    : (['inchFeet', 'inchFeetPerPack'] as const);
  return wholeUp(
    checkNumber(fields[work], work, workRange) / checkNumber(fields[perPack], perPack, perPackRange),
  );
}

export interface GeneratorInput {
  readonly volts: number;
  readonly amps: number;
  readonly phases: 1 | 3;
  readonly powerFactor?: number | undefined;
  /** How far the generator may be loaded while running. */
  readonly loadFraction?: number | undefined;
  /** Starting over running load. */
  readonly startFactor?: number | undefined;
}

/**
 * Size of a generator in kW: the greater of the running load over the load fraction and the running load times
 * the start factor. Running load: V · A (· √3 on three phases) · power factor / 1000.
 * @throws CuttingInputError
 */
export function generatorKw(input: GeneratorInput): number {
  const fields = checkObject(input, 'input');
  const volts = checkNumber(fields.volts, 'volts', { above: 0, max: 1_000, unit: 'V' });
  const amps = checkNumber(fields.amps, 'amps', { above: 0, max: 5_000, unit: 'A' });
  const phases = checkChoice(fields.phases, 'phases', [1, 3]);
  const powerFactor = checkNumberOr(fields.powerFactor, 'powerFactor', { above: 0, max: 1, unit: '' }, 1);
  const loadFraction = checkNumberOr(
    fields.loadFraction,
    'loadFraction',
    { above: 0, max: 1, unit: '' },
    0.8,
  );
  const startFactor = checkNumberOr(fields.startFactor, 'startFactor', { min: 1, max: 10, unit: 'times' }, 1);
  const runningKw = (volts * amps * (phases === 3 ? Math.sqrt(3) : 1) * powerFactor) / 1_000;
  return Math.max(runningKw / loadFraction, runningKw * startFactor);
}
