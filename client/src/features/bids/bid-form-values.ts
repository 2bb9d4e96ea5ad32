import {
  bidInputSchema,
  usualUnit,
  type BidInput,
  type BidPrice,
  type BidUnit,
  type OwnBidView,
} from '@kerfyard/common/bids';
import { commonFactorsPct } from '@kerfyard/common/cutting';
import { priceFactors, type Method, type RateRow } from '@kerfyard/common/people';
import type { ResponsibilityItem, ScopeBody } from '@kerfyard/common/scopes';
import { z } from 'zod';

type Typed = number | string | null;

/** One cut's price as typed: empty lines are left out of the bid. */
export interface LineValues {
  cutId: string;
  unit: BidUnit;
  /** In hundredths of a cent. */
  rate: Typed;
  /** How the crew does it, for its own eyes: the usual way when empty. */
  method: Method | '';
  /** The rate of the crew's card that filled this line. */
  card: RateRow | null;
  /** Factors of this line alone, of a bid that was handed in with different ones for each line. */
  keptFactors: number[];
}

/** Factors on every line as percentages; `other` is one that has no name of its own. */
export const bidFactors = [...priceFactors, 'other'] as const;
export type BidFactor = (typeof bidFactors)[number];

/** The bid form as typed. What the crew is asked per item of the responsibility sheet has a field each. */
export interface BidFormValues {
  form: 'lump' | 'lines';
  lumpCents: Typed;
  lines: LineValues[];
  factors: Record<BidFactor, Typed>;
  minimumCents: Typed;
  mobilizationCents: Typed;
  minimumIncludesMobilization: boolean;
  answers: { item: ResponsibilityItem; answer: 'included' | 'excluded' | 'unclear' }[];
  inclusions: string;
  exclusions: string;
  note: string;
  validDays: Typed;
  startFrom: string;
}

const noFactors: BidFormValues['factors'] = {
  heavy_bar: null,
  overhead: null,
  finished_space: null,
  night: null,
  other: null,
};

/** The form before anything is typed: by-lines where only that is allowed, each crew item included. */
export function emptyBid(body: ScopeBody): BidFormValues {
  return {
    form: body.terms.priceForm === 'lines' ? 'lines' : 'lump',
    lumpCents: null,
    lines: body.cuts.map((line) => ({
      cutId: line.id,
      unit: usualUnit(line.cut.kind),
      rate: null,
      method: '',
      card: null,
      keptFactors: [],
    })),
    factors: noFactors,
    minimumCents: 0,
    mobilizationCents: 0,
    minimumIncludesMobilization: true,
    answers: crewItems(body).map((item) => ({ item, answer: 'included' })),
    inclusions: '',
    exclusions: '',
    note: '',
    validDays: body.terms.bidValidDays,
    startFrom: '',
  };
}

export function crewItems(body: ScopeBody): ResponsibilityItem[] {
  return body.responsibilities.filter((row) => row.by === 'crew').map((row) => row.item);
}

/** A bid that is in, back in the form for revising it. */
export function bidValues(body: ScopeBody, { input }: OwnBidView): BidFormValues {
  const empty = emptyBid(body);
  const { price } = input;
  const answers = new Map(input.answers.map((row) => [row.item, row.answer]));
  return {
    ...empty,
    form: price.form,
    lumpCents: price.form === 'lump' ? price.lumpCents : null,
    ...(price.form === 'lines' ? linesValues(empty, price) : {}),
    answers: empty.answers.map(({ item }) => ({ item, answer: answers.get(item) ?? 'unclear' })),
    inclusions: input.inclusions.join('\n'),
    exclusions: input.exclusions.join('\n'),
    note: input.note,
    validDays: input.validDays,
    startFrom: input.startFrom ?? '',
  };
}

type LinesPrice = Extract<BidPrice, { form: 'lines' }>;

function linesValues(empty: BidFormValues, price: LinesPrice): Partial<BidFormValues> {
  const shared = sharedFactors(price);
  return {
    factors: shared === null ? noFactors : namedFactors(shared),
    lines: empty.lines.map((line) => {
      const known = price.lines.find((one) => one.cutId === line.cutId);
      if (known === undefined) return line;
      const keptFactors = shared === null ? known.factors : [];
      return { ...line, unit: known.unit, rate: known.rate, keptFactors };
    }),
    minimumCents: price.minimumCents,
    mobilizationCents: price.mobilizationCents,
    minimumIncludesMobilization: price.minimumIncludesMobilization,
  };
}

/** The factors that all lines have, or null where they differ. */
function sharedFactors({ lines }: LinesPrice): readonly number[] | null {
  const [first] = lines;
  const isShared = lines.every((line) => line.factors.join() === first?.factors.join());
  return isShared ? (first?.factors ?? []) : null;
}

/** A bid keeps what its factors are, not what they are for: those of common practice get their names back. */
function namedFactors(factors: readonly number[]): BidFormValues['factors'] {
  const named = { ...noFactors };
  const rest = factors.filter((factor) => {
    const name = priceFactors.find((one) => commonFactorsPct.rows[one] === factor && named[one] === null);
    if (name !== undefined) named[name] = factor;
    return name === undefined;
  });
  const free = [...bidFactors].reverse().filter((name) => named[name] === null);
  rest.forEach((factor, index) => {
    const name = free[index];
    if (name !== undefined) named[name] = factor;
  });
  return named;
}

/** What the server takes, from what was typed. */
export function toBidInput(values: BidFormValues, revision: number): unknown {
  return {
    revision,
    price: toPrice(values),
    answers: values.answers.filter((row) => row.answer !== 'unclear'),
    inclusions: toList(values.inclusions),
    exclusions: toList(values.exclusions),
    note: values.note,
    validDays: values.validDays,
    startFrom: values.startFrom === '' ? null : values.startFrom,
  };
}

export function toPrice(values: BidFormValues): unknown {
  if (values.form === 'lump') return { form: 'lump', lumpCents: values.lumpCents };
  const factors = bidFactors.map((name) => values.factors[name]).filter(isTyped);
  return {
    form: 'lines',
    lines: values.lines
      .filter((line) => isTyped(line.rate))
      .map(({ cutId, unit, rate, keptFactors }) => ({
        cutId,
        unit,
        rate,
        factors: [...factors, ...keptFactors],
      })),
    minimumCents: values.minimumCents ?? 0,
    mobilizationCents: values.mobilizationCents ?? 0,
    minimumIncludesMobilization: values.minimumIncludesMobilization,
  };
}

function isTyped(value: Typed): boolean {
  return value !== null && value !== '';
}

function toList(text: string): string[] {
  return text
    .split('\n')
    .map((line) => line.trim())
    .filter((line) => line !== '');
}

/**
 * The form's own schema: reads what was typed as a bid, and brings each complaint back to the field it is about.
 * @param revision the revision on the page
 */
export function bidFormSchema(revision: number): z.ZodType<BidInput, BidFormValues> {
  return z.custom<BidFormValues>().transform((values, context) => {
    const parsed = bidInputSchema.safeParse(toBidInput(values, revision));
    if (parsed.success) return parsed.data;
    for (const issue of parsed.error.issues) {
      context.issues.push({
        code: 'custom',
        input: values,
        message: issue.message,
        path: fieldOf(values, issue.path),
      });
    }
    return z.NEVER;
  });
}

/** Where a complaint about the bid belongs in the form: `price.lines.1.rate` is the second *priced* line's field. */
export function fieldOf(values: BidFormValues, path: readonly PropertyKey[]): string[] {
  const [first, second, index, field, at] = path.map(String);
  if (first !== 'price') return first === 'inclusions' || first === 'exclusions' ? [first] : path.map(String);
  if (second === 'lines') {
    if (field === 'factors') return ['factors', factorAt(values, at)];
    const priced = values.lines.flatMap((line, place) => (isTyped(line.rate) ? [place] : []));
    return ['lines', String(priced[Number(index ?? 0)] ?? 0), 'rate'];
  }
  return [second ?? 'lumpCents'];
}

/** The name of the factor at a place of a line's list; all of them together are said at the last one typed. */
function factorAt({ factors }: BidFormValues, at: string | undefined): BidFactor {
  const typed = bidFactors.filter((name) => isTyped(factors[name]));
  return typed[at === undefined ? typed.length - 1 : Number(at)] ?? 'other';
}
