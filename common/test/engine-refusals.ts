import { describe, expect, it } from 'vitest';
import { CuttingInputError } from '../src/cutting/index.ts';

/** A function of the engine with good input, and which of its fields refuse what. */
export interface Subject {
  readonly calculate: (input: never) => unknown;
  readonly input: object;
  /** Numeric fields that must be there, by path, and whether they take zero. */
  readonly numbers: Readonly<Record<string, 'positive' | 'zero'>>;
  /** Numeric fields that may be left out. */
  readonly optional?: readonly string[];
  readonly choices?: readonly string[];
}

/** A copy of the input with the field at `path` replaced; a list's own name (`tasks`) is not part of it. */
function withField(input: object, path: string, value: unknown): never {
  const copy: unknown = structuredClone(input);
  const keys = path.split(/[.[\]]+/).filter((key) => key !== '');
  const inside = Array.isArray(copy) ? keys.slice(1) : keys;
  let holder = copy as Record<string, unknown>;
  for (const key of inside.slice(0, -1)) holder = holder[key] as Record<string, unknown>;
  const last = inside.at(-1) ?? '';
  if (value === undefined) delete holder[last];
  else holder[last] = value;
  return copy as never;
}

export function errorOf(run: () => unknown): unknown {
  try {
    run();
  } catch (error) {
    return error;
  }
  return undefined;
}

function expectRefused(subject: Subject, field: string, value: unknown): void {
  const error = errorOf(() => subject.calculate(withField(subject.input, field, value)));
  const shown = `${field} = ${String(value)}`;
  expect(error, shown).toBeInstanceOf(CuttingInputError);
  if (!(error instanceof CuttingInputError)) return;
  expect(error.field, shown).toBe(field);
  expect(error.allowed, shown).not.toBe('');
  expect(error.message, shown).toContain(field);
}

const notNumbers = [NaN, Infinity, -Infinity, 1e308, -1, '6', null, true, [], {}];

/** Tests that every field of every subject refuses bad input by name. */
export function describeRefusals(subjects: Readonly<Record<string, Subject>>): void {
  describe.each(Object.entries(subjects))('%s', (_name, subject) => {
    it('takes its good input', () => {
      expect(() => subject.calculate(subject.input as never)).not.toThrow();
    });

    it('names every bad number', () => {
      for (const [field, kind] of Object.entries(subject.numbers)) {
        for (const value of [...notNumbers, undefined, ...(kind === 'positive' ? [0] : [])]) {
          // A list given short of its first item is a good list.
          if (value === undefined && field.endsWith(']')) continue;
          expectRefused(subject, field, value);
        }
      }
      for (const field of subject.optional ?? []) {
        for (const value of notNumbers) expectRefused(subject, field, value);
      }
    });

    it('names every bad choice', () => {
      for (const field of subject.choices ?? []) {
        for (const value of ['no such choice \u0000', NaN, 99.5, null]) {
          const isText = /\.(id|trip|unit)$/.test(field);
          if (isText && typeof value === 'string') continue;
          const isMissingList = value === null && ['mats', 'embedded'].includes(field);
          if (!isMissingList) expectRefused(subject, field, value);
        }
      }
    });

    it('refuses what is no input at all', () => {
      for (const input of [undefined, null, 'text', 7]) {
        expect(errorOf(() => subject.calculate(input as never))).toBeInstanceOf(CuttingInputError);
      }
    });
  });
}
