import { checkBoolean, checkNumber, checkObject } from './check.ts';
import { pieceLbRange } from './limits.ts';
import { put, type WorkingStep } from './working.ts';

export interface SlingTension {
  readonly perLegLb: number;
  /** 1 / sin θ. */
  readonly factor: number;
  readonly belowMinimumAngle: boolean;
  readonly working: readonly WorkingStep[];
}

/** Slings flatter than this are not used except as the maker or a qualified person says. */
export const minimumSlingAngleDeg = 30;

/**
 * Tension in each sling leg: W / (n · sin θ), θ from the horizontal. Three or more legs count as two unless the
 * rigging equalizes them.
 * @throws CuttingInputError
 */
export function slingTension(input: {
  readonly loadLb: number;
  readonly legs: number;
  readonly angleDeg: number;
  readonly equalized?: boolean | undefined;
}): SlingTension {
  const fields = checkObject(input, 'input');
  const loadLb = checkNumber(fields.loadLb, 'loadLb', pieceLbRange);
  const legs = checkNumber(fields.legs, 'legs', { min: 1, max: 8, integer: true, unit: 'legs' });
  const angleDeg = checkNumber(fields.angleDeg, 'angleDeg', {
    above: 0,
    max: 90,
    unit: 'degrees from horizontal',
  });
  const equalized = checkBoolean(fields.equalized, 'equalized', false);
  const countedLegs = equalized ? legs : Math.min(legs, 2);
  const factor = 1 / Math.sin((angleDeg * Math.PI) / 180);
  const perLegLb = (loadLb / countedLegs) * factor;
  return {
    perLegLb,
    factor,
    belowMinimumAngle: angleDeg < minimumSlingAngleDeg,
    working: [
      {
        label: 'Tension in each leg',
        formula: 'load ÷ (legs counted × sin θ)',
        inputs: [put('load', loadLb, 'lb'), put('legs counted', countedLegs, ''), put('θ', angleDeg, '°')],
        value: perLegLb,
        unit: 'lb',
        source: { origin: 'published', document: 'Rigging handbooks', section: 'Sling angle factors' },
      },
    ],
  };
}
