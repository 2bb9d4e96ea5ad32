import { z } from 'zod';
import { idSchema, instantSchema, pageQuerySchema, textSchema } from '../api/index.ts';
import { MAX_CENTS } from '../money/index.ts';
import { methods } from '../people/people.schema.ts';
import { latSchema, lonSchema, zipSchema } from '../places/index.ts';
import { cutLineSchema, MAX_CUT_LINES } from './cut.schema.ts';
import { responsibilitySheetSchema } from './responsibilities.ts';

export const siteSchema = z.strictObject({
  name: textSchema(120),
  address: textSchema(200),
  city: textSchema(80),
  state: z.string().regex(/^[A-Z]{2}$/, 'Two letters, such as OH'),
  zip: zipSchema,
  lat: latSchema,
  lon: lonSchema,
  /** IANA zone; due time, windows and expiry dates of this scope are read in it. */
  timeZone: z.string().min(3).max(60),
  contact: textSchema(120, 0).default(''),
});
export type Site = z.output<typeof siteSchema>;

export const conditionsSchema = z.strictObject({
  element: z.enum([
    'slab_on_grade',
    'suspended_slab',
    'slab_on_deck',
    'wall',
    'masonry_wall',
    'footing',
    'pavement',
    'other',
  ]),
  face: z.enum(['floor', 'wall', 'ceiling']),
  indoors: z.boolean(),
  floor: textSchema(60, 0).default(''),
  steel: z.enum(['none', 'mesh', 'light_bar', 'heavy_bar', 'unknown']),
  postTension: z.enum(['proved_none', 'present', 'unknown']),
  below: z.enum(['soil', 'occupied', 'unoccupied', 'unknown']),
  enginesAllowed: z.boolean(),
  overcutsAllowed: z.boolean(),
  workHours: textSchema(120, 0).default(''),
  access: textSchema(500, 0).default(''),
});
export type Conditions = z.output<typeof conditionsSchema>;

export const termsSchema = z.strictObject({
  priceForm: z.enum(['lump', 'lines', 'either']),
  /** Retainage in basis points; 0 to begin with (under $5,000 or one visit nothing is kept back unless agreed). */
  retainageBasisPoints: z.number().int().min(0).max(1000),
  standbyFreeMinutes: z.number().int().min(0).max(480),
  /** Calendar days in which the general contractor answers a request for payment. */
  answerDays: z.number().int().min(1).max(60),
  bidValidDays: z.number().int().min(1).max(180),
  workFrom: z.iso.date(),
  workTo: z.iso.date(),
  wages: z.enum(['open_shop', 'prevailing', 'union']),
  notes: textSchema(2000, 0).default(''),
});
export type Terms = z.output<typeof termsSchema>;

export const biddingSchema = z.strictObject({
  /** `sealed`: the general contractor sees a count until due, then all at once. `ranked`: each crew sees its own rank. */
  mode: z.enum(['sealed', 'ranked']),
  dueAt: instantSchema,
});
export type BiddingMode = 'sealed' | 'ranked';

/** A published revision: complete, strict, never changed afterwards. Photos and drawings are linked beside it. */
export const scopeBodySchema = z
  .strictObject({
    title: textSchema(140),
    summary: textSchema(2000, 0).default(''),
    site: siteSchema,
    cuts: z
      .array(cutLineSchema)
      .min(1, 'At least one cut')
      .max(MAX_CUT_LINES, `At most ${MAX_CUT_LINES} cuts`),
    conditions: conditionsSchema,
    responsibilities: responsibilitySheetSchema,
    terms: termsSchema,
    bidding: biddingSchema,
  })
  .check((context) => {
    const { terms, cuts } = context.value;
    if (terms.workTo < terms.workFrom) {
      context.issues.push({
        code: 'custom',
        input: terms.workTo,
        path: ['terms', 'workTo'],
        message: 'Not before the first day',
      });
    }
    const ids = new Set(cuts.map((line) => line.id));
    const marks = new Set(cuts.map((line) => line.mark.toLowerCase()));
    if (ids.size !== cuts.length)
      context.issues.push({ code: 'custom', input: cuts, path: ['cuts'], message: 'Two cuts share an id' });
    if (marks.size !== cuts.length)
      context.issues.push({ code: 'custom', input: cuts, path: ['cuts'], message: 'Two cuts share a mark' });
  });
export type ScopeBody = z.output<typeof scopeBodySchema>;

/**
 * A draft is whatever has been typed so far: the same names, everything optional, numbers possibly missing.
 * It is bounded in size and depth, never in sense; publishing checks sense.
 */
const draftSection = z.record(
  z.string().max(60),
  z.union([z.string().max(4000), z.number(), z.boolean(), z.null()]),
);
export const scopeDraftSchema = z.strictObject({
  title: z.string().max(400).default(''),
  summary: z.string().max(4000).default(''),
  site: draftSection.default({}),
  cuts: z
    .array(
      z.strictObject({
        id: idSchema,
        mark: z.string().max(40).default(''),
        note: z.string().max(600).default(''),
        cut: z.record(
          z.string().max(40),
          z.union([
            z.string().max(200),
            z.number(),
            z.boolean(),
            z.null(),
            z.array(z.string().max(20)).max(4),
            z.array(z.number()).max(200),
            draftSection,
          ]),
        ),
      }),
    )
    .max(MAX_CUT_LINES)
    .default([]),
  conditions: draftSection.default({}),
  responsibilities: z.array(draftSection).max(40).default([]),
  terms: draftSection.default({}),
  bidding: draftSection.default({}),
});
export type ScopeDraft = z.output<typeof scopeDraftSchema>;

export const createScopeSchema = z.strictObject({ id: idSchema, draft: scopeDraftSchema });
/** `version` is the draft's version last seen; a newer one on the server answers 409 `stale_version`. */
export const saveDraftSchema = z.strictObject({ version: z.number().int().min(1), draft: scopeDraftSchema });
export const publishScopeSchema = z.strictObject({ version: z.number().int().min(1) });
export const closeScopeSchema = z.strictObject({ reason: textSchema(500) });

export const attachFileSchema = z.strictObject({ fileId: idSchema, caption: textSchema(200, 0).default('') });

/** Filters of the open-scopes list, all in the page's address. */
export const openScopesQuerySchema = pageQuerySchema.extend({
  method: z.enum(methods).optional(),
  withinMiles: z.coerce.number().int().min(1).max(3000).optional(),
  dueBefore: instantSchema.optional(),
  minInchFeet: z.coerce.number().min(0).max(1e9).optional(),
  maxInchFeet: z.coerce.number().min(0).max(1e9).optional(),
  sort: z.enum(['newest', 'due', 'nearest', 'largest']).default('newest'),
});
export type OpenScopesQuery = z.infer<typeof openScopesQuerySchema>;

export const ownScopesQuerySchema = pageQuerySchema.extend({
  status: z.enum(['draft', 'open', 'due', 'awarded', 'closed_without_award', 'withdrawn']).optional(),
});
export type OwnScopesQuery = z.infer<typeof ownScopesQuerySchema>;

/** A priced allowance the general contractor adds where a bid leaves an item out; kept per scope. */
export const plugsSchema = z.strictObject({
  plugs: z
    .array(z.strictObject({ item: z.string().max(40), cents: z.number().int().min(0).max(MAX_CENTS) }))
    .max(60),
});
export type Plugs = z.infer<typeof plugsSchema>;
