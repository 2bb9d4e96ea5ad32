import { z } from 'zod';
import { invalidRequest } from './errors.ts';
import type { StripeError } from './errors.ts';

const INTEGER = 'not an integer';
const EMPTY = 'empty';

/** Text that is there. */
export const text = z.string().min(1, EMPTY).max(5000);
/** Text that may be empty, which clears the field in an update. */
export const clearable = z.string().max(5000);
export const integer = z
  .string()
  .regex(/^-?\d{1,15}$/, INTEGER)
  .transform(Number);
export const flag = z.enum(['true', 'false']).transform((value) => value === 'true');
/** Cents, at least 1 and at most what the provider takes in one piece. */
export const cents = integer.pipe(z.number().min(1, 'too small').max(99_999_999, 'too large'));
/** The stand-in's balances are in US dollars only. */
export const currency = z
  .string()
  .transform((value) => value.toLowerCase())
  .pipe(z.literal('usd'));
export const textList = z.array(text);
/** Up to 50 pairs; an empty value deletes its key, an empty text deletes all. */
export const metadata = z.union([z.literal(''), z.record(z.string().min(1).max(40), z.string().max(500))]);
export const address = z.strictObject({
  city: clearable.optional(),
  country: clearable.optional(),
  line1: clearable.optional(),
  line2: clearable.optional(),
  postal_code: clearable.optional(),
  state: clearable.optional(),
});

const range = z.union([
  integer,
  z.strictObject({
    gt: integer.optional(),
    gte: integer.optional(),
    lt: integer.optional(),
    lte: integer.optional(),
  }),
]);

export type Range = z.output<typeof range>;

/** Parameters of one call: those named, `expand`, and nothing else. */
export function params<Shape extends z.core.$ZodLooseShape>(shape: Shape) {
  return z.strictObject({ expand: textList.optional(), ...shape });
}

const paging = {
  limit: integer.pipe(z.number().min(1).max(100)).default(10),
  starting_after: text.optional(),
  ending_before: text.optional(),
};

/** Parameters of a list call: paging and nothing else. */
export const pagingParams = params(paging);

/** Parameters of a list call: paging, creation time and the filters named. */
export function listParams<Shape extends z.core.$ZodLooseShape>(filters: Shape) {
  return params({ ...paging, created: range.optional(), ...filters });
}

/** Whether a time lies in a `created` filter. */
export function isWithin(seconds: number, filter: Range | undefined): boolean {
  if (filter === undefined) return true;
  if (typeof filter === 'number') return seconds === filter;
  const { gt = -Infinity, gte = -Infinity, lt = Infinity, lte = Infinity } = filter;
  return seconds > gt && seconds >= gte && seconds < lt && seconds <= lte;
}

function bracketed(path: readonly PropertyKey[]): string {
  return path.map((part, index) => (index === 0 ? String(part) : `[${String(part)}]`)).join('');
}

function valueAt(input: unknown, path: readonly PropertyKey[]): unknown {
  return path.reduce<unknown>(
    (value, part) => (value as Record<PropertyKey, unknown> | undefined)?.[part],
    input,
  );
}

/** A union reports the problems of each of its branches; the last branch is the fullest one. */
function deepest(issue: z.core.$ZodIssue): z.core.$ZodIssue {
  if (issue.code !== 'invalid_union') return issue;
  const inner = issue.errors.at(-1)?.[0];
  return inner ? deepest({ ...inner, path: [...issue.path, ...inner.path] } as z.core.$ZodIssue) : issue;
}

function toStripeError(found: z.core.$ZodIssue, input: unknown): StripeError {
  const issue = deepest(found);
  if (issue.code === 'unrecognized_keys') {
    const param = bracketed([...issue.path, issue.keys[0] ?? '']);
    return invalidRequest(`Received unknown parameter: ${param}`, { code: 'parameter_unknown', param });
  }
  const param = bracketed(issue.path);
  const value = valueAt(input, issue.path);
  if (value === undefined) {
    return invalidRequest(`Missing required param: ${param}.`, { code: 'parameter_missing', param });
  }
  if (issue.message === INTEGER) {
    return invalidRequest(`Invalid integer: ${String(value)}`, { code: 'parameter_invalid_integer', param });
  }
  if (issue.message === EMPTY) {
    const message = `You passed an empty string for '${param}'. We assume empty values are an attempt to unset a parameter; however '${param}' cannot be unset.`;
    return invalidRequest(message, { code: 'parameter_invalid_empty', param });
  }
  return invalidRequest(`Invalid ${param}: ${issue.message}`, { param });
}

/** Checks decoded parameters. Throws the provider's 400 for the first problem. */
export function parseParams<Schema extends z.ZodType>(schema: Schema, input: unknown): z.output<Schema> {
  const result = schema.safeParse(input);
  if (result.success) return result.data;
  const unknownFirst = result.error.issues.find((issue) => issue.code === 'unrecognized_keys');
  throw toStripeError(unknownFirst ?? result.error.issues[0]!, input);
}

/** Merges metadata as an update does: new keys are added, an empty value deletes its key, '' deletes all. */
export function mergeMetadata(
  current: Record<string, string>,
  change: z.output<typeof metadata> | undefined,
): Record<string, string> {
  if (change === undefined) return current;
  if (change === '') return {};
  const merged = { ...current, ...change };
  return Object.fromEntries(Object.entries(merged).filter(([, value]) => value !== ''));
}
