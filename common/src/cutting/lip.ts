import { checkNumber, checkNumberOr, checkObject } from './check.ts';
import { lipHeightInRange, runPerRiseRange } from './limits.ts';
import { lipRules } from './tables/lip.ts';

export type LipTreatmentKind = 'none' | 'bevel' | 'ramp';

export interface LipTreatment {
  readonly treatment: LipTreatmentKind;
  /** How far back from the edge the surface is cut, inches. */
  readonly cutLengthIn: number;
}

/**
 * What a raised edge on a walk needs: nothing to ¼ in, a bevel of the whole lip at 1:2 to ½ in, above that a ramp
 * at `runPerRise` (8 to 20; the standard's limit is 12).
 * @throws CuttingInputError
 */
export function lipTreatment(input: {
  readonly heightIn: number;
  readonly runPerRise?: number | undefined;
}): LipTreatment {
  const fields = checkObject(input, 'input');
  const heightIn = checkNumber(fields.heightIn, 'heightIn', lipHeightInRange);
  const runPerRise = checkNumberOr(
    fields.runPerRise,
    'runPerRise',
    runPerRiseRange,
    lipRules.rows.rampRunPerRise,
  );
  return lipTreatmentOf(heightIn, runPerRise);
}

/** `lipTreatment` for numbers already checked. */
export function lipTreatmentOf(heightIn: number, runPerRise: number): LipTreatment {
  const { verticalIn, bevelIn, bevelRunPerRise } = lipRules.rows;
  if (heightIn <= verticalIn) return { treatment: 'none', cutLengthIn: 0 };
  if (heightIn <= bevelIn) return { treatment: 'bevel', cutLengthIn: heightIn * bevelRunPerRise };
  return { treatment: 'ramp', cutLengthIn: heightIn * runPerRise };
}
