import type { WorkingInput, WorkingSource, WorkingStep } from '../cutting/index.ts';
import type { Spread } from './estimate.types.ts';

const arithmetic: WorkingSource = { origin: 'arithmetic' };

/** One step of a working. */
export function step(
  label: string,
  formula: string,
  inputs: readonly WorkingInput[],
  [value, unit]: readonly [number, string],
  source: WorkingSource = arithmetic,
): WorkingStep {
  return { label, formula, inputs, value, unit, source };
}

/** One number put into a step of a working. */
export const put = (name: string, value: number, unit: string): WorkingInput => ({ name, value, unit });

/** Two sums of the same parts, for the quick and the slow job; one step where they are equal. */
export function sumSpread(
  label: string,
  unit: string,
  parts: readonly { name: string; low: number; high: number }[],
): Spread {
  const sum = (side: 'low' | 'high') => parts.reduce((total, part) => total + part[side], 0);
  const [low, high] = [sum('low'), sum('high')];
  const sumStep = (side: 'low' | 'high', words: string) =>
    step(
      words,
      parts.map((part) => part.name).join(' + '),
      parts.map((part) => put(part.name, part[side], unit)),
      [side === 'low' ? low : high, unit],
    );
  const working =
    low === high
      ? [sumStep('low', label)]
      : [sumStep('low', `${label}, at best`), sumStep('high', `${label}, at worst`)];
  return { low, high, working };
}
