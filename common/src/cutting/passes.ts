import { checkNumber, checkObject } from './check.ts';
import { CuttingInputError } from './input-error.ts';
import { depthInRange } from './limits.ts';
import { wholeUp } from './rounding.ts';
import { commonPractice, put, type WorkingStep } from './working.ts';

export interface PassPlanInput {
  readonly depthIn: number;
  readonly maxPassIn: number;
  readonly scoreIn: number;
}

export interface PassPlan {
  /** Depth reached by each pass, from the score to the full depth. */
  readonly depthsIn: readonly number[];
  readonly working: readonly WorkingStep[];
}

const maxPasses = 1_000;

/**
 * The fewest passes to a depth: the score first, then equal steps none over `maxPassIn`, the full depth last.
 * @throws CuttingInputError also when the score is over the depth or over one pass
 */
export function passPlan(input: PassPlanInput): PassPlan {
  const fields = checkObject(input, 'input');
  const depthIn = checkNumber(fields.depthIn, 'depthIn', depthInRange);
  const maxPassIn = checkNumber(fields.maxPassIn, 'maxPassIn', {
    above: 0,
    max: depthInRange.max,
    unit: 'in',
  });
  const scoreLimitIn = Math.min(depthIn, maxPassIn);
  const scoreIn = checkNumber(fields.scoreIn, 'scoreIn', { above: 0, max: scoreLimitIn, unit: 'in' });
  const restIn = depthIn - scoreIn;
  const steps = wholeUp(restIn / maxPassIn);
  if (steps >= maxPasses) {
    throw new CuttingInputError({
      field: 'maxPassIn',
      allowed: `deep enough to need at most ${maxPasses} passes`,
      given: maxPassIn,
    });
  }
  const deeper = Array.from({ length: steps }, (_, step) =>
    step === steps - 1 ? depthIn : scoreIn + (restIn * (step + 1)) / steps,
  );
  return {
    depthsIn: [scoreIn, ...deeper],
    working: [
      {
        label: 'Passes',
        formula: '1 + ⌈(depth − score) ÷ deepest pass⌉, equal steps after the score',
        inputs: [
          put('depth', depthIn, 'in'),
          put('score', scoreIn, 'in'),
          put('deepest pass', maxPassIn, 'in'),
        ],
        value: steps + 1,
        unit: 'passes',
        source: commonPractice,
      },
    ],
  };
}
