import { CuttingInputError, type WorkingSource, type WorkingStep } from '@kerfyard/common/cutting';
import type { Calculator, RawValues, Result } from './calculator.ts';
import { readValues, type Problems } from './inputs.ts';

export interface Evaluated {
  /** Null as long as anything is wrong: no number is better than a wrong one. */
  readonly result: Result | null;
  readonly values: Readonly<Record<string, unknown>>;
  readonly problems: Problems;
  /** What the engine refused that stands in no field of its own. */
  readonly refused: string | null;
}

/** What is typed, computed; or everything that is wrong with it, each by its field. */
export function evaluate(calculator: Calculator, raw: RawValues): Evaluated {
  const { values, problems } = readValues(calculator.fields, raw);
  if (Object.keys(problems).length > 0) return { result: null, values, problems, refused: null };
  try {
    return { result: calculator.compute(values as never), values, problems, refused: null };
  } catch (error) {
    if (!(error instanceof CuttingInputError)) throw error;
    const place = placeOf(calculator, raw, error.field);
    return place === undefined
      ? { result: null, values, problems, refused: error.message }
      : { result: null, values, problems: { [place]: error.allowed }, refused: null };
  }
}

/** The field, or cell of a table, that the engine's path leads to. */
function placeOf(calculator: Calculator, raw: RawValues, path: string): string | undefined {
  const inner = path.replace(/^(cuts?|input|removal)\./, '');
  const cell = /^(\w+)\[(\d+)\]\.(\w+)$/.exec(inner);
  if (cell !== null) {
    const [, field = '', row = '', column = ''] = cell;
    const rows = raw[field];
    const isCell = Array.isArray(rows) && (rows as readonly object[])[Number(row)] !== undefined;
    const spec = calculator.fields[field];
    return isCell && spec?.kind === 'rows' && column in spec.columns ? inner : undefined;
  }
  const field = inner.replace(/\[.*$/, '');
  return field in calculator.fields ? field : undefined;
}

/** The same error under another field's name, where the form calls it otherwise than the engine. */
export function renamed<Value>(names: Readonly<Record<string, string>>, run: () => Value): Value {
  try {
    return run();
  } catch (error) {
    if (!(error instanceof CuttingInputError)) throw error;
    const [head = ''] = /^\w+/.exec(error.field) ?? [];
    throw new CuttingInputError({
      field: error.field.replace(head, names[head] ?? head),
      allowed: error.allowed,
      given: error.given,
    });
  }
}

/** The steps with these labels, in the engine's order. */
export function stepsOf(
  working: readonly WorkingStep[],
  ...labels: readonly string[]
): readonly WorkingStep[] {
  return working.filter((step) => labels.some((label) => step.label === label));
}

/** Steps with the engine's own names for choices (`walk_behind_saw`) as words. */
export function inPlainWords(steps: readonly WorkingStep[]): readonly WorkingStep[] {
  const plain = (text: string) => text.replaceAll('_', ' ');
  const value = (given: number | string) => (typeof given === 'string' ? plain(given) : given);
  return steps.map((step) => ({
    ...step,
    label: plain(step.label),
    value: value(step.value),
    inputs: step.inputs.map((input) => ({ ...input, name: plain(input.name), value: value(input.value) })),
  }));
}

/** Every document behind a result, each once; arithmetic has none. */
export function sourcesOf(result: Result): readonly WorkingSource[] {
  const found = new Map<string, WorkingSource>();
  for (const block of result.blocks) {
    for (const { source } of block.figures.flatMap((figure) => figure.working ?? [])) {
      if (source.origin === 'arithmetic') continue;
      found.set([source.origin, source.document, source.section].join('|'), source);
    }
  }
  return [...found.values()];
}
