import {
  bidInputSchema,
  usualUnit,
  type BidInput,
  type BidUnit,
  type OwnBidView,
} from '@kerfyard/common/bids';
import type { ResponsibilityItem, ScopeBody } from '@kerfyard/common/scopes';
import { z } from 'zod';

/** One cut's price as typed: empty lines are left out of the bid. */
export interface LineValues {
  cutId: string;
  unit: BidUnit;
  rateCents: number | string | null;
}

/** The bid form as typed. What the crew is asked per item of the responsibility sheet has a field each. */
export interface BidFormValues {
  form: 'lump' | 'lines';
  lumpCents: number | string | null;
  lines: LineValues[];
  minimumCents: number | string | null;
  mobilizationCents: number | string | null;
  answers: { item: ResponsibilityItem; answer: 'included' | 'excluded' | 'unclear' }[];
  inclusions: string;
  exclusions: string;
  note: string;
  validDays: number | string | null;
  startFrom: string;
}

/** The form before anything is typed: by-lines where only that is allowed, each crew item included. */
export function emptyBid(body: ScopeBody): BidFormValues {
  return {
    form: body.terms.priceForm === 'lines' ? 'lines' : 'lump',
    lumpCents: null,
    lines: body.cuts.map((line) => ({
      cutId: line.id,
      unit: usualUnit(line.cut.kind),
      rateCents: null,
    })),
    minimumCents: 0,
    mobilizationCents: 0,
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
    lines: empty.lines.map((line) => {
      const known = price.form === 'lines' ? price.lines.find((one) => one.cutId === line.cutId) : undefined;
      return known === undefined
        ? line
        : { cutId: line.cutId, unit: known.unit, rateCents: known.rate / 100 };
    }),
    minimumCents: price.form === 'lines' ? price.minimumCents : 0,
    mobilizationCents: price.form === 'lines' ? price.mobilizationCents : 0,
    answers: empty.answers.map(({ item }) => ({ item, answer: answers.get(item) ?? 'unclear' })),
    inclusions: input.inclusions.join('\n'),
    exclusions: input.exclusions.join('\n'),
    note: input.note,
    validDays: input.validDays,
    startFrom: input.startFrom ?? '',
  };
}

/** What the server takes, from what was typed. Rates are kept in hundredths of a cent. */
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
  const priced = values.lines.filter((line) => line.rateCents !== null && line.rateCents !== '');
  return {
    form: 'lines',
    lines: priced.map((line) => ({
      cutId: line.cutId,
      unit: line.unit,
      rate: typeof line.rateCents === 'number' ? Math.round(line.rateCents * 100) : line.rateCents,
    })),
    minimumCents: values.minimumCents ?? 0,
    mobilizationCents: values.mobilizationCents ?? 0,
  };
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
  const [first, second, index] = path.map(String);
  if (first !== 'price') return first === 'inclusions' || first === 'exclusions' ? [first] : path.map(String);
  if (second === 'lines') {
    const priced = values.lines.flatMap((line, at) =>
      line.rateCents === null || line.rateCents === '' ? [] : [at],
    );
    return ['lines', String(priced[Number(index ?? 0)] ?? 0), 'rateCents'];
  }
  return [second ?? 'lumpCents'];
}
