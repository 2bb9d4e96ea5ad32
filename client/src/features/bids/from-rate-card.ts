import { bidInputSchema, priceFromCard, readPrice } from '@kerfyard/common/bids';
import { priceFactors, type Method, type RateCard } from '@kerfyard/common/people';
import type { ScopeBody } from '@kerfyard/common/scopes';
import { toPrice, type BidFormValues } from './bid-form-values.ts';

/** The form filled from a card: what was filled, and the marks of the cuts the card has no rate for. */
export interface FilledBid {
  values: BidFormValues;
  unpriced: string[];
  /** Whether the one press changed a price: a lump is filled only when the card knows every cut. */
  isFilled: boolean;
}

/**
 * Fill a bid from the crew's rate card: lines by rate and unit, factors the conditions call for, minimum and
 * mobilization; a lump sum with what the lines would come to. A cut without a rate keeps what was typed.
 */
export function fillFromCard(typed: BidFormValues, body: ScopeBody, card: RateCard): FilledBid {
  const chosen = new Map(
    typed.lines.flatMap(({ cutId, method }): [string, Method][] => (method === '' ? [] : [[cutId, method]])),
  );
  const priced = priceFromCard(body, card, chosen);
  const factors = { ...typed.factors };
  for (const name of priceFactors) factors[name] = priced.factors[name] ?? factors[name];
  const values: BidFormValues = {
    ...typed,
    lines: typed.lines.map((line) => {
      const found = priced.lines.find(({ cutId }) => cutId === line.cutId);
      if (found === undefined) return line;
      const { method, row } = found;
      return { ...line, unit: row.unit, rate: row.rate, method, card: row, keptFactors: [] };
    }),
    factors,
    minimumCents: priced.minimumCents,
    mobilizationCents: priced.mobilizationCents,
    minimumIncludesMobilization: priced.minimumIncludesMobilization,
  };
  if (typed.form === 'lines') return { values, unpriced: priced.unpriced, isFilled: priced.lines.length > 0 };
  const lumpCents = priced.unpriced.length > 0 ? null : sumOfLines(values, body);
  return lumpCents === null
    ? { values: typed, unpriced: priced.unpriced, isFilled: false }
    : { values: { ...values, lumpCents }, unpriced: [], isFilled: true };
}

/** What the lines come to by the engine, minimum and all, or null while something typed makes no sense. */
function sumOfLines(values: BidFormValues, body: ScopeBody): number | null {
  const price = bidInputSchema.shape.price.safeParse(toPrice({ ...values, form: 'lines' }));
  if (!price.success) return null;
  const reading = readPrice({ cuts: body.cuts, terms: { ...body.terms, priceForm: 'lines' } }, price.data);
  return reading.ok ? reading.priced.totalCents : null;
}
