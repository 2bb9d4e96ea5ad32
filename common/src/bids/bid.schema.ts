import { z } from 'zod';
import { idSchema, textSchema } from '../api/index.ts';
import { MAX_CENTS } from '../money/index.ts';
import { responsibilityItems } from '../scopes/responsibilities.ts';

const cents = z
  .number('An amount in dollars')
  .int('Whole cents')
  .min(0, 'Not negative')
  .max(MAX_CENTS, 'At most $10,000,000');

/** What a line's rate is per. The server takes the quantity from the scope's own cut list. */
export const bidUnits = ['in_ft', 'lf', 'sq_ft', 'each', 'core_in', 'lump'] as const;
export type BidUnit = (typeof bidUnits)[number];

export const bidLineSchema = z.strictObject({
  cutId: idSchema,
  unit: z.enum(bidUnits),
  /** In hundredths of a cent per unit, so that $0.85 per inch-foot is 8500. */
  rate: z
    .number('A rate in dollars')
    .int('To a hundredth of a cent')
    .min(0, 'Not negative')
    .max(MAX_CENTS * 10, 'At most $1,000,000 for one unit'),
  /** Percentages that multiply: 150 is × 1.5. */
  factors: z.array(z.number().int().min(50).max(400)).max(6).default([]),
});
export type BidLine = z.output<typeof bidLineSchema>;

const priceSchema = z.discriminatedUnion('form', [
  z.strictObject({ form: z.literal('lump'), lumpCents: cents.min(100, 'At least $1') }),
  z.strictObject({
    form: z.literal('lines'),
    lines: z.array(bidLineSchema).min(1).max(500),
    minimumCents: cents,
    mobilizationCents: cents,
    minimumIncludesMobilization: z.boolean().default(true),
  }),
]);
export type BidPrice = z.output<typeof priceSchema>;

/** For each item the scope gives to the crew: in the price or not. Unanswered counts as unclear. */
export const bidAnswerSchema = z.strictObject({
  item: z.enum(responsibilityItems),
  answer: z.enum(['included', 'excluded']),
});
export type BidAnswer = z.output<typeof bidAnswerSchema>;

/** A bid. No total travels: the server prices it with the engine from the scope's quantities. */
export const bidInputSchema = z.strictObject({
  /** The revision that was read; bidding on an older one answers 409 `stale_revision`. */
  revision: z.number().int().min(1),
  price: priceSchema,
  answers: z.array(bidAnswerSchema).max(responsibilityItems.length).default([]),
  inclusions: z.array(textSchema(200)).max(20).default([]),
  exclusions: z.array(textSchema(200)).max(20).default([]),
  note: textSchema(2000, 0).default(''),
  validDays: z.number().int().min(1).max(180),
  startFrom: z.iso.date().nullable().default(null),
});
export type BidInput = z.output<typeof bidInputSchema>;

/** A price to be shown before it is sent: cuts may still be without a line. */
export const bidPriceInputSchema = z.strictObject({ revision: z.number().int().min(1), price: priceSchema });
export type BidPriceInput = z.output<typeof bidPriceInputSchema>;

/** A bid draft is anything of bounded size; it is stored encrypted like the bid itself. */
export const bidDraftSchema = z.strictObject({ draft: z.record(z.string().max(60), z.unknown()) });

export const awardSchema = z.strictObject({
  bidId: idSchema,
  /** What the others are told; never a price. */
  reason: z.enum(['price', 'scope_of_price', 'start_date', 'cover_or_papers', 'experience', 'other']),
  note: textSchema(500, 0).default(''),
});
export type Award = z.output<typeof awardSchema>;
