import { checkChoice, checkNumber, checkObject } from './check.ts';
import { excavationLimits, slopeRunPerRise, soilTypes, type SoilType } from './tables/excavation.ts';
import { sourceOf } from './tables/provenance.ts';
import { arithmetic, put, type WorkingStep } from './working.ts';

export type ProtectiveSystem =
  'not_required_if_no_sign_of_cave_in' | 'required' | 'engineer_required' | 'not_required';

export interface ExcavationRules {
  readonly ladderRequired: boolean;
  readonly protectiveSystem: ProtectiveSystem;
  readonly spoilSetbackFt: number;
  /** Feet back per foot of depth where the sides are sloped. */
  readonly slopeRunPerRise: number;
  readonly working: readonly WorkingStep[];
}

export interface SlopedTrench {
  readonly topWidthFt: number;
  readonly areaSqFt: number;
  readonly working: readonly WorkingStep[];
}

/**
 * What an open trench of a depth and soil needs, 29 CFR 1926.651, 652 and Appendix B. The competent person may
 * ask for a protective system earlier, at any sign of cave-in.
 * @throws CuttingInputError
 */
export function excavationRules(input: {
  readonly depthFt: number;
  readonly soil: SoilType;
}): ExcavationRules {
  const fields = checkObject(input, 'input');
  const depthFt = checkNumber(fields.depthFt, 'depthFt', { above: 0, max: 200, unit: 'ft' });
  const soil = checkChoice(fields.soil, 'soil', soilTypes);
  const limits = excavationLimits.rows;
  const protectiveSystem = protectiveSystemFor(depthFt, soil);
  return {
    ladderRequired: depthFt >= limits.ladderDepthFt,
    protectiveSystem,
    spoilSetbackFt: limits.spoilSetbackFt,
    slopeRunPerRise: slopeRunPerRise.rows[soil],
    working: [
      {
        label: 'Protective system',
        formula: 'none in stable rock; from 5 ft, or earlier at a sign of cave-in; over 20 ft by an engineer',
        inputs: [put('depth', depthFt, 'ft'), put('soil', soil, '')],
        value: protectiveSystem,
        unit: '',
        source: sourceOf(excavationLimits.source),
      },
    ],
  };
}

/**
 * Top width and cross-section of a trench with sloped sides, Table B-1, to 20 ft.
 * @throws CuttingInputError also over 20 ft, where an engineer designs the slope
 */
export function slopedTrench(input: {
  readonly bottomWidthFt: number;
  readonly depthFt: number;
  readonly soil: SoilType;
}): SlopedTrench {
  const fields = checkObject(input, 'input');
  const bottomWidthFt = checkNumber(fields.bottomWidthFt, 'bottomWidthFt', {
    above: 0,
    max: 1_000,
    unit: 'ft',
  });
  const depthFt = checkNumber(fields.depthFt, 'depthFt', {
    above: 0,
    max: excavationLimits.rows.engineerDepthFt,
    unit: 'ft; deeper slopes are designed by an engineer',
  });
  const soil = checkChoice(fields.soil, 'soil', soilTypes);
  const runPerRise = slopeRunPerRise.rows[soil];
  const topWidthFt = bottomWidthFt + 2 * runPerRise * depthFt;
  const areaSqFt = ((bottomWidthFt + topWidthFt) / 2) * depthFt;
  return {
    topWidthFt,
    areaSqFt,
    working: [
      {
        label: 'Top width',
        formula: 'bottom + 2 × run per rise × depth',
        inputs: [
          put('bottom', bottomWidthFt, 'ft'),
          put('run per rise', runPerRise, 'to 1'),
          put('depth', depthFt, 'ft'),
        ],
        value: topWidthFt,
        unit: 'ft',
        source: sourceOf(slopeRunPerRise.source),
      },
      {
        label: 'Cross-section',
        formula: '(bottom + top) ÷ 2 × depth',
        inputs: [
          put('bottom', bottomWidthFt, 'ft'),
          put('top', topWidthFt, 'ft'),
          put('depth', depthFt, 'ft'),
        ],
        value: areaSqFt,
        unit: 'sq ft',
        source: arithmetic,
      },
    ],
  };
}

function protectiveSystemFor(depthFt: number, soil: SoilType): ProtectiveSystem {
  const { engineerDepthFt, protectiveSystemDepthFt } = excavationLimits.rows;
  if (soil === 'rock') return 'not_required';
  if (depthFt > engineerDepthFt) return 'engineer_required';
  return depthFt >= protectiveSystemDepthFt ? 'required' : 'not_required_if_no_sign_of_cave_in';
}
