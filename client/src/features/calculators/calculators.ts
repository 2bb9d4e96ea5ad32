import type { Calculator } from './calculator.ts';

type Load = () => Promise<{ default: Calculator }>;

/**
 * The calculators by name of the work, in the order they are offered; the key is the last part of the address. Each
 * is its own chunk.
 */
export const calculatorLoaders = {
  trench: () => import('./descriptions/trench.tsx'),
  opening: () => import('./descriptions/opening.tsx'),
  cores: () => import('./descriptions/cores.tsx'),
  joints: () => import('./descriptions/joints.tsx'),
  passes: () => import('./descriptions/passes.tsx'),
  lifting: () => import('./descriptions/lifting.tsx'),
  dust: () => import('./descriptions/dust.ts'),
  'noise-and-vibration': () => import('./descriptions/noise-and-vibration.ts'),
  slurry: () => import('./descriptions/slurry.ts'),
  price: () => import('./descriptions/price.ts'),
} satisfies Record<string, Load>;

export type CalculatorSlug = keyof typeof calculatorLoaders;

export const calculatorSlugs = Object.keys(calculatorLoaders) as readonly CalculatorSlug[];

/** Where the words of a calculator are: the slug in camel case, as in the catalogue. */
export function wordsOfCalculator(slug: CalculatorSlug): string {
  return slug.replace(/-(\w)/g, (_, letter: string) => letter.toUpperCase());
}

export function isCalculatorSlug(value: string | undefined): value is CalculatorSlug {
  return value !== undefined && Object.hasOwn(calculatorLoaders, value);
}
