import { z } from 'zod';
import { productionMethods, type ProductionMethod } from '../cutting/tables/common-practice.ts';
import { MAX_CENTS } from '../money/index.ts';
import { cutKinds } from '../scopes/cut.schema.ts';
import { methods } from './people.schema.ts';

/** What a rate is for one of. `each` is one of a cut's count: a hole, a block, a bar. */
export const rateUnits = ['in_ft', 'lf', 'sq_ft', 'each', 'core_in'] as const;
export type RateUnit = (typeof rateUnits)[number];

/** What makes the same cut dearer, as percentages that multiply. */
export const priceFactors = ['heavy_bar', 'overhead', 'finished_space', 'night'] as const;
export type PriceFactor = (typeof priceFactors)[number];

export const MAX_RATES = 500;

const cents = z
  .number('An amount in dollars')
  .int('Whole cents')
  .min(0, 'Not negative')
  .max(MAX_CENTS, 'At most $10,000,000');
const rate = z
  .number('A rate in dollars')
  .int('To a hundredth of a cent')
  .min(0, 'Not negative')
  .max(MAX_CENTS * 10, 'At most $1,000,000 for one unit');
const sizeIn = z.number('A number of inches').min(0.1, 'At least 0.1 in').max(1200, 'At most 1,200 in');
const perHour = z
  .number('A number an hour')
  .gt(0, 'More than nothing an hour')
  .max(100_000, 'At most 100,000 an hour')
  .nullable();

/**
 * One rate of a crew. Its band is what a cut measures across the tool: depth of a saw cut, diameter of a core, of a
 * pipe or of a bar. `kind` null holds for every kind of cut; a rate for one kind goes before it.
 */
export const rateRowSchema = z.strictObject({
  method: z.enum(methods),
  kind: z.enum(cutKinds).nullable(),
  unit: z.enum(rateUnits),
  /** The band's upper end, inches, itself in it; null is any size above the other bands. */
  upToIn: sizeIn.nullable(),
  /** In hundredths of a cent for one unit: $0.85 is 8500. */
  rate,
});
export type RateRow = z.output<typeof rateRowSchema>;

const factor = z
  .number('A factor such as 1.5')
  .int('To a hundredth')
  .min(50, 'At least × 0.5')
  .max(400, 'At most × 4')
  .nullable();

const ratesSchema = z
  .array(rateRowSchema)
  .max(MAX_RATES, `At most ${MAX_RATES} rates`)
  .check((context) => {
    const seen = new Set<string>();
    context.value.forEach((row, index) => {
      const key = rateKey(row);
      if (seen.has(key)) {
        const message = 'Another rate has the same method, kind, unit and band';
        context.issues.push({ code: 'custom', input: row, path: [index, 'upToIn'], message });
      }
      seen.add(key);
    });
  });

/** A crew's own prices, costs and production. Null anywhere means that the crew has not said. */
export const rateCardSchema = z.strictObject({
  rates: ratesSchema,
  factors: z.strictObject({
    heavy_bar: factor,
    overhead: factor,
    finished_space: factor,
    night: factor,
  } satisfies Record<PriceFactor, unknown>),
  minimumCents: cents,
  mobilizationCents: cents,
  minimumIncludesMobilization: z.boolean(),
  standbyHourCents: cents.nullable(),
  /** What the work costs the crew itself. */
  costs: z.strictObject({
    crewHourCents: cents.nullable(),
    /** In hundredths of a cent for one inch-foot. */
    bladeRate: rate.nullable(),
    /** In hundredths of a cent for one inch of core. */
    bitRate: rate.nullable(),
  }),
  /** Replaces the engine's common practice, where given. */
  production: z.strictObject({
    perHour: z.strictObject({
      flat_saw: perHour,
      flat_saw_electric: perHour,
      wall_saw: perHour,
      hand_saw: perHour,
      ring_saw: perHour,
      chain_saw: perHour,
      wire_saw: perHour,
      joint_saw: perHour,
    } satisfies Record<ProductionMethod, unknown>),
    coreSetUpMinutes: z.number('Minutes').min(0, 'Not negative').max(1440, 'At most a day').nullable(),
    coreFeeds: z
      .array(
        z.strictObject({
          upToIn: sizeIn.nullable(),
          inchesPerMinute: z.number('Inches in a minute').gt(0, 'More than nothing').max(60, 'At most 60'),
        }),
      )
      .max(20, 'At most 20 feeds'),
  }),
});
export type RateCard = z.output<typeof rateCardSchema>;

/** `version` is the card's version last seen, 0 before there is one; a newer one answers 409 `stale_version`. */
export const saveRateCardSchema = z.strictObject({ version: z.number().int().min(0), card: rateCardSchema });
export type SaveRateCard = z.output<typeof saveRateCardSchema>;

/** `GET /api/company/rate-card`: the reading company's own and nobody else's; null before it has one. */
export interface RateCardView {
  card: RateCard | null;
  version: number;
  updatedAt: string | null;
}

/** What makes two rates the same one. */
export function rateKey(row: Pick<RateRow, 'method' | 'kind' | 'unit' | 'upToIn'>): string {
  return `${row.method} ${row.kind ?? ''} ${row.unit} ${row.upToIn ?? ''}`;
}

/** A card with nothing on it. */
export function emptyRateCard(): RateCard {
  return {
    rates: [],
    factors: { heavy_bar: null, overhead: null, finished_space: null, night: null },
    minimumCents: 0,
    mobilizationCents: 0,
    minimumIncludesMobilization: true,
    standbyHourCents: null,
    costs: { crewHourCents: null, bladeRate: null, bitRate: null },
    production: {
      perHour: Object.fromEntries(productionMethods.map((method) => [method, null])) as Record<
        ProductionMethod,
        null
      >,
      coreSetUpMinutes: null,
      coreFeeds: [],
    },
  };
}
