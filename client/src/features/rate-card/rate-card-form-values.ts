import { productionMethods, type ProductionMethod } from '@kerfyard/common/cutting';
import {
  rateCardSchema,
  type Method,
  type PriceFactor,
  type RateCard,
  type RateRow,
  type RateUnit,
} from '@kerfyard/common/people';
import type { CutKind } from '@kerfyard/common/scopes';
import { z } from 'zod';

type Typed = number | string | null;

/** One rate as typed; an empty kind is every kind. */
export interface RateValues {
  method: Method;
  kind: CutKind | '';
  unit: RateUnit;
  upToIn: Typed;
  rate: Typed;
}

/** The rate card's form as typed: any number may be missing or half typed. */
export interface RateCardValues {
  rates: RateValues[];
  factors: Record<PriceFactor, Typed>;
  minimumCents: Typed;
  mobilizationCents: Typed;
  minimumIncludesMobilization: boolean;
  standbyHourCents: Typed;
  costs: { crewHourCents: Typed; bladeRate: Typed; bitRate: Typed };
  production: {
    perHour: Record<ProductionMethod, Typed>;
    coreSetUpMinutes: Typed;
    coreFeeds: { upToIn: Typed; inchesPerMinute: Typed }[];
  };
}

export function rateValues(row: RateRow): RateValues {
  return { ...row, kind: row.kind ?? '' };
}

export function cardValues(card: RateCard): RateCardValues {
  return { ...card, rates: card.rates.map(rateValues) };
}

/** A rate not typed yet, of the same sort as the last one. */
export function nextRate(last: RateValues | undefined): RateValues {
  const { method, kind, unit } = last ?? { method: 'flat_saw', kind: '', unit: 'in_ft' };
  return { method, kind, unit, upToIn: null, rate: null };
}

function toCard(values: RateCardValues): unknown {
  return {
    ...values,
    rates: values.rates.map((row) => ({ ...row, kind: row.kind === '' ? null : row.kind })),
    minimumCents: values.minimumCents ?? 0,
    mobilizationCents: values.mobilizationCents ?? 0,
  };
}

/** Reads what was typed as a card; complaints keep the form's own names, which are the card's. */
export const rateCardFormSchema: z.ZodType<RateCard, RateCardValues> = z
  .custom<RateCardValues>()
  .transform((values, context) => {
    const parsed = rateCardSchema.safeParse(toCard(values));
    if (parsed.success) return parsed.data;
    for (const { message, path } of parsed.error.issues) {
      context.issues.push({ code: 'custom', input: values, message, path });
    }
    return z.NEVER;
  });

export const productionTools = productionMethods;
