import { checkList, checkNumber, checkObject } from '../check.ts';
import { sourceOf } from '../tables/provenance.ts';
import { vibrationValues } from '../tables/vibration.ts';
import { put, type WorkingStep } from '../working.ts';
import { hoursRange, maxExposures } from './ranges.ts';

/** `hours` are trigger hours. */
export interface VibrationSpan {
  readonly mps2: number;
  readonly hours: number;
}

export interface HandArmVibration {
  /** Daily exposure A(8), m/s². */
  readonly a8: number;
  /** 100 at the action value, 400 at the limit value. */
  readonly points: number;
  readonly aboveActionValue: boolean;
  readonly aboveLimitValue: boolean;
  readonly working: readonly WorkingStep[];
}

/**
 * Daily hand-arm vibration: A(8) = √(Σ a²T / 8), points = Σ 2a²T. The action and limit values are European; there
 * is no US limit.
 * @throws CuttingInputError with the span's place in `field`
 */
export function handArmVibration(spans: readonly VibrationSpan[]): HandArmVibration {
  const checked = checkList(spans, 'exposures', maxExposures).map(checkSpan);
  const energy = checked.reduce((sum, { mps2, hours }) => sum + mps2 * mps2 * hours, 0);
  const a8 = Math.sqrt(energy / 8);
  const points = 2 * energy;
  const { actionMps2, limitMps2 } = vibrationValues.rows;
  const inputs = checked.map((span) => put(`${span.mps2} m/s²`, span.hours, 'h'));
  const source = sourceOf(vibrationValues.source);
  return {
    a8,
    points,
    aboveActionValue: a8 > actionMps2,
    aboveLimitValue: a8 > limitMps2,
    working: [
      { label: 'Daily exposure A(8)', formula: '√(Σ a² × T ÷ 8)', inputs, value: a8, unit: 'm/s²', source },
      { label: 'Points', formula: 'Σ 2 × a² × T', inputs, value: points, unit: 'points', source },
    ],
  };
}

function checkSpan(span: unknown, index: number): VibrationSpan {
  const path = `exposures[${index}]`;
  const fields = checkObject(span, path);
  return {
    mps2: checkNumber(fields.mps2, `${path}.mps2`, { min: 0, max: 200, unit: 'm/s²' }),
    hours: checkNumber(fields.hours, `${path}.hours`, hoursRange),
  };
}
