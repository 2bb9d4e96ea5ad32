import { checkChoice, checkNumber, checkObject } from './check.ts';
import { CuttingInputError } from './input-error.ts';
import { arithmetic, put, type WorkingStep } from './working.ts';
import { bladeDiameterInRange, passThroughInRange, thicknessInRange } from './limits.ts';

export interface OvercutInput {
  readonly bladeDiameterIn: number;
  readonly thicknessIn: number;
  /** How far the blade goes past the far face; 0 gives the longest overcut. */
  readonly passThroughIn: number;
}

/**
 * Length the kerf runs past a corner on the entry face, in inches, per cut end, when the far face is cut to the
 * corner. With R = Ø/2, e the pass-through and d = T + e: √(2Rd − d²) − √(2Re − e²).
 * @throws CuttingInputError also when the blade is too small: d must stay under R, the blade's centre above the face
 */
export function overcutIn(input: OvercutInput): number {
  const fields = checkObject(input, 'input');
  return overcutOf({
    bladeDiameterIn: checkNumber(fields.bladeDiameterIn, 'bladeDiameterIn', bladeDiameterInRange),
    thicknessIn: checkNumber(fields.thicknessIn, 'thicknessIn', thicknessInRange),
    passThroughIn: checkNumber(fields.passThroughIn, 'passThroughIn', passThroughInRange),
  });
}

/** `overcutIn` for numbers already checked. */
export function overcutOf({ bladeDiameterIn, thicknessIn, passThroughIn }: OvercutInput): number {
  const radiusIn = bladeDiameterIn / 2;
  const plungeIn = thicknessIn + passThroughIn;
  if (plungeIn >= radiusIn) {
    throw new CuttingInputError({
      field: 'bladeDiameterIn',
      allowed: `over ${2 * plungeIn} in to cut ${thicknessIn} in with ${passThroughIn} in through`,
      given: bladeDiameterIn,
    });
  }
  const halfChord = (depthIn: number) => Math.sqrt(depthIn * (bladeDiameterIn - depthIn));
  return halfChord(plungeIn) - halfChord(passThroughIn);
}

/** The working of one overcut, for numbers already checked. */
export function overcutStep({ bladeDiameterIn, thicknessIn, passThroughIn }: OvercutInput): WorkingStep {
  return {
    label: 'Overcut at one cut end',
    formula: '√(2R(T + e) − (T + e)²) − √(2Re − e²), R = Ø ÷ 2',
    inputs: [put('Ø', bladeDiameterIn, 'in'), put('T', thicknessIn, 'in'), put('e', passThroughIn, 'in')],
    value: overcutOf({ bladeDiameterIn, thicknessIn, passThroughIn }),
    unit: 'in',
    source: arithmetic,
  };
}

export const corePlacements = ['inside', 'centred'] as const;
export type CorePlacement = (typeof corePlacements)[number];

/**
 * Diameter in inches of the corner core that swallows an overcut: 2 × inside, tangent to both lines; 1 × centred
 * on the corner.
 * @throws CuttingInputError
 */
export function cornerCoreDiameterIn(input: {
  readonly overcutIn: number;
  readonly placement?: CorePlacement | undefined;
}): number {
  const fields = checkObject(input, 'input');
  const overcut = checkNumber(fields.overcutIn, 'overcutIn', { above: 0, max: 60, unit: 'in' });
  const placement =
    fields.placement === undefined ? 'inside' : checkChoice(fields.placement, 'placement', corePlacements);
  return placement === 'inside' ? 2 * overcut : overcut;
}
