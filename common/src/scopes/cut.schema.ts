import { z } from 'zod';
import { textSchema } from '../api/index.ts';
import { cutLimits } from '../cutting/limits.ts';
import type { NumberRange } from '../cutting/check.ts';
import { cutKinds as engineKinds, type CutKind as EngineKind } from '../cutting/types.ts';

/** A finite number within a range, with a message that says the range and the unit. */
function measure(unit: string, min: number, max: number) {
  return z
    .number(`A number of ${unit}`)
    .min(min, `At least ${min} ${unit}`)
    .max(max, `At most ${max} ${unit}`);
}

const lengthFt = measure('ft', 0.1, 100_000);
const widthFt = measure('ft', 0.1, 10_000);
const thicknessIn = measure('in', 0.5, 240);
const depthIn = measure('in', 0.1, 240);
const diameterIn = measure('in', 0.25, 96);
const count = z
  .number('A whole number')
  .int('A whole number')
  .min(1, 'At least 1')
  .max(10_000, 'At most 10,000');
/** A measure up to the engine's own limit, from a least size that a machine can still work. */
function measureTo({ max, unit }: NumberRange, min: number) {
  return measure(unit, min, max);
}

const bladeDiameterIn = measure('in', 4, 84).optional();
const passThroughIn = measure('in', 0, 12).optional();

/** How the piece is taken away: its greatest weight decides the cross cuts. */
export const removalSchema = z.strictObject({
  densityPcf: measure('pcf', 20, 600).default(150),
  allowancePct: measure('%', 0, 100).optional(),
  maxPieceLb: measure('lb', 10, 200_000),
  maxSideFt: measure('ft', 0.5, 1000).optional(),
  maxShortSideFt: measure('ft', 0.5, 1000).optional(),
});

const line = z.strictObject({ kind: z.literal('line'), lengthFt, depthIn, count });

const trench = z.strictObject({
  kind: z.literal('trench'),
  lengthFt,
  widthFt,
  thicknessIn,
  sideCuts: z.union([z.literal(1), z.literal(2)]).default(2),
  endCuts: z.union([z.literal(0), z.literal(1), z.literal(2)]).default(2),
  bladeDiameterIn,
  passThroughIn,
  count,
  removal: removalSchema.optional(),
});

const opening = z.strictObject({
  kind: z.literal('opening'),
  lengthFt,
  widthFt,
  thicknessIn,
  uncutSides: z
    .array(z.enum(['top', 'bottom', 'left', 'right']))
    .max(3, 'At least one side is cut')
    .optional(),
  corners: z.enum(['overcut', 'cored', 'square']),
  bladeDiameterIn,
  passThroughIn,
  count,
  removal: removalSchema.optional(),
});

const core = z.strictObject({ kind: z.literal('core'), diameterIn, depthIn, count });

const stitch = z.strictObject({
  kind: z.literal('stitch'),
  lengthIn: measureTo(cutLimits.stitch.lengthIn, 0.5),
  bitDiameterIn: measureTo(cutLimits.stitch.bitDiameterIn, 0.25),
  overlapIn: measureTo(cutLimits.stitch.overlapIn, 0),
  closed: z.boolean().default(false),
  depthIn,
  count,
});

/** As many bays along a side as the engine takes. */
const MAX_BAYS = 200;
const baysFt = z
  .array(measure('ft', 0.1, 100_000))
  .min(1)
  .max(MAX_BAYS)
  .optional();

const joints = z.strictObject({
  kind: z.literal('joints'),
  lengthFt,
  widthFt,
  thicknessIn: measureTo(cutLimits.joints.thicknessIn, cutLimits.joints.thicknessIn.min),
  spacingFactor: measure('thicknesses', 24, 36).default(30),
  capFt: measureTo(cutLimits.joints.capFt, 2).default(15),
  maxAspect: measure('to 1', 1, 10).optional(),
  baysAlongLengthFt: baysFt,
  baysAlongWidthFt: baysFt,
  count,
});

const wire = z.strictObject({
  kind: z.literal('wire'),
  areaSqFt: measureTo(cutLimits.wire.areaSqFt, 0.1),
  pilotCores: z
    .number('A whole number')
    .int('A whole number')
    .min(0, 'Not negative')
    .max(cutLimits.wire.pilotCores.max, 'At most 10,000'),
  pilotDiameterIn: measureTo(cutLimits.wire.pilotDiameterIn, 0.25),
  depthIn,
  count,
});

const curb = z.strictObject({
  kind: z.literal('curb'),
  lengthFt,
  heightIn: measureTo(cutLimits.curb.heightIn, 0.1),
  count,
});

const chase = z.strictObject({
  kind: z.literal('chase'),
  lengthFt,
  widthIn: measureTo(cutLimits.chase.widthIn, 0.1),
  depthIn: measureTo(cutLimits.chase.depthIn, 0.1),
  count,
});

const block = z.strictObject({
  kind: z.literal('block'),
  cutLengthIn: measureTo(cutLimits.block.cutLengthIn, 0.1),
  depthIn: measureTo(cutLimits.block.depthIn, 0.1),
  count,
});

const pipe = z.strictObject({
  kind: z.literal('pipe'),
  outsideDiameterIn: measureTo(cutLimits.pipe.outsideDiameterIn, 0.1),
  count,
});

const bar = z.strictObject({
  kind: z.literal('bar'),
  diameterIn: measureTo(cutLimits.bar.diameterIn, 0.1),
  count,
});

const lip = z.strictObject({
  kind: z.literal('lip'),
  widthFt,
  heightIn: measureTo(cutLimits.lip.heightIn, 0.05),
  runPerRise: measure('to 1', cutLimits.lip.runPerRise.min, cutLimits.lip.runPerRise.max).default(12),
  count,
});

/** One cut as typed, in the engine's own shape, so what is priced and what is stored are the same thing. */
export const cutSchema = z.discriminatedUnion('kind', [
  line,
  trench,
  opening,
  core,
  stitch,
  joints,
  wire,
  curb,
  chase,
  block,
  pipe,
  bar,
  lip,
]);
export type CutInput = z.input<typeof cutSchema>;
export type CutData = z.output<typeof cutSchema>;
export type CutKind = EngineKind & CutData['kind'];
/** All kinds the engine takes off, the usual ones first. */
export const cutKinds: readonly CutKind[] = engineKinds;

/** A line of the cut list: a stable id that bids, subcontracts and as-cuts cite, and the mark people say aloud. */
export const cutLineSchema = z.strictObject({
  id: z.uuid(),
  mark: textSchema(16),
  note: textSchema(300, 0).default(''),
  cut: cutSchema,
});
export type CutLine = z.output<typeof cutLineSchema>;

export const MAX_CUT_LINES = 500;
