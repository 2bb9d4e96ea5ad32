import { CuttingInputError } from './input-error.ts';

/** Which numbers a field takes. `above` excludes its bound, `min` and `max` include theirs. */
export interface NumberRange {
  readonly above?: number;
  readonly min?: number;
  readonly max: number;
  readonly integer?: boolean;
  readonly unit: string;
}

const grouped = new Intl.NumberFormat('en-US', { maximumFractionDigits: 6 });

/** A range in words: "over 0 and at most 100,000 ft". */
export function describeRange(range: NumberRange): string {
  const lower =
    range.above === undefined
      ? `at least ${grouped.format(range.min ?? 0)}`
      : `over ${grouped.format(range.above)}`;
  const kind = range.integer ? 'a whole number ' : '';
  const unit = range.unit === '' ? '' : ` ${range.unit}`;
  return `${kind}${lower} and at most ${grouped.format(range.max)}${unit}`;
}

/** Returns `value` when it is a finite number inside `range`; otherwise throws `CuttingInputError`. */
export function checkNumber(value: unknown, field: string, range: NumberRange): number {
  const isInside =
    typeof value === 'number' &&
    Number.isFinite(value) &&
    value <= range.max &&
    (range.above === undefined ? value >= (range.min ?? 0) : value > range.above) &&
    (!range.integer || Number.isInteger(value));
  if (!isInside) throw new CuttingInputError({ field, allowed: describeRange(range), given: value });
  return value;
}

/** Like `checkNumber`, but a field left out takes `fallback`. Null is not left out. */
export function checkNumberOr<Fallback extends number | undefined>(
  value: unknown,
  field: string,
  range: NumberRange,
  fallback: Fallback,
): number | Fallback {
  return value === undefined ? fallback : checkNumber(value, field, range);
}

/** Returns `value` when it is one of `choices`. */
export function checkChoice<Choice extends string | number>(
  value: unknown,
  field: string,
  choices: readonly Choice[],
): Choice {
  if (!(choices as readonly unknown[]).includes(value)) {
    throw new CuttingInputError({ field, allowed: `one of ${choices.join(', ')}`, given: value });
  }
  return value as Choice;
}

/** Returns `value` when it is true or false; a field left out takes `fallback` where one is given. */
export function checkBoolean(value: unknown, field: string, fallback?: boolean): boolean {
  if (value === undefined && fallback !== undefined) return fallback;
  if (typeof value !== 'boolean')
    throw new CuttingInputError({ field, allowed: 'true or false', given: value });
  return value;
}

/** Makes sure that `value` is an object and hands its fields out unread. */
export function checkObject(value: unknown, field: string): Readonly<Record<string, unknown>> {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) {
    throw new CuttingInputError({ field, allowed: 'an object', given: value });
  }
  return value as Readonly<Record<string, unknown>>;
}

/** Makes sure that `value` is a list of at most `maxItems`, before anything reads its items. */
export function checkList(value: unknown, field: string, maxItems: number): readonly unknown[] {
  if (!Array.isArray(value) || value.length > maxItems) {
    throw new CuttingInputError({
      field,
      allowed: `a list of at most ${grouped.format(maxItems)}`,
      given: value,
    });
  }
  return value as readonly unknown[];
}

/** Runs `read` and puts `path` in front of the field of any input error it throws. */
export function within<Result>(path: string, read: () => Result): Result {
  try {
    return read();
  } catch (error) {
    if (error instanceof CuttingInputError) throw error.within(path);
    throw error;
  }
}
