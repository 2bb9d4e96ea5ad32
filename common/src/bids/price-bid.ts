import { CuttingInputError, priceCuts, type CutTakeoff } from '../cutting/index.ts';
import type { FieldIssue } from '../errors/index.ts';
import { MAX_CENTS } from '../money/index.ts';
import { readCutList } from '../scopes/totals.ts';
import type { CutLine } from '../scopes/cut.schema.ts';
import type { ScopeBody } from '../scopes/scope.schema.ts';
import type { BidInput, BidLine, BidPrice, BidUnit } from './bid.schema.ts';
import type { PricedBid, PricedLine } from './bid.views.ts';

/** What of a published scope a bid's price depends on. */
export type PricedScope = Pick<ScopeBody, 'cuts' | 'terms'>;

/** A price, or every complaint about it at its field (`price.lines.2.rate`). */
export type PriceReading = { ok: true; priced: PricedBid } | { ok: false; issues: FieldIssue[] };

// A line's quantity comes from measured feet: 1.005 must become 101 hundredths as on paper, though the nearest
// binary fraction lies a hair below it.
const HAIR = 1e-6;
const TRIP = 'visit';

/**
 * How much of a unit a cut comes to, in hundredths: inch-feet, linear feet and square feet of face without overcuts
 * (cross cuts are in), cores in inches of depth, `each` by count, `lump` once.
 */
export function cutQuantity(line: CutLine, takeoff: CutTakeoff, unit: BidUnit): number {
  const amounts: Record<BidUnit, number> = {
    in_ft: takeoff.inchFeet,
    lf: takeoff.sawFt,
    sq_ft: takeoff.sawSqFt,
    core_in: takeoff.coreInches,
    each: line.cut.count,
    lump: 1,
  };
  return Math.round(amounts[unit] * 100 + HAIR);
}

/**
 * Price a bid by the engine from the scope's own quantities; what is wrong comes back as issues. Cuts without a
 * line are no issue here, so that a price can be shown while lines are still being typed.
 */
export function readPrice(scope: PricedScope, price: BidPrice): PriceReading {
  const form = formIssues(scope, price);
  if (form.length > 0) return { ok: false, issues: form };
  if (price.form === 'lump') return { ok: true, priced: lumpBid(price.lumpCents) };
  const list = readCutList(scope.cuts);
  if (!list.ok) return list;
  const issues: FieldIssue[] = [];
  const seen = new Set<string>();
  const lines = price.lines.map((line, index) => {
    const quantity = quantityOrIssue(scope, line, list.byCutId);
    const key = `${line.cutId} ${line.unit}`;
    if (typeof quantity === 'string') issues.push({ path: `price.lines.${index}.unit`, message: quantity });
    else if (seen.has(key)) issues.push(lineIssue(index, 'unit', 'This cut has a line in this unit already'));
    seen.add(key);
    return { ...line, quantity: typeof quantity === 'number' ? quantity : 0 };
  });
  return issues.length > 0 ? { ok: false, issues } : priceLines(price, lines);
}

/**
 * Price a bid that has been checked.
 * @throws RangeError when it has not: see `readPrice` for the issues
 */
export function priceBid(scope: PricedScope, input: Pick<BidInput, 'price'>): PricedBid {
  const reading = readPrice(scope, input.price);
  if (reading.ok) return reading.priced;
  throw new RangeError(reading.issues.map(({ path, message }) => `${path}: ${message}`).join('; '));
}

/** Everything wrong with a bid on this scope, price included; empty when it may be handed in. */
export function bidIssues(
  scope: PricedScope & Pick<ScopeBody, 'responsibilities'>,
  input: BidInput,
): FieldIssue[] {
  const price = readPrice(scope, input.price);
  return [
    ...(price.ok ? [] : price.issues),
    ...unpricedCutIssues(scope, input.price),
    ...answerIssues(scope, input),
  ];
}

function formIssues({ terms }: PricedScope, price: BidPrice): FieldIssue[] {
  if (terms.priceForm === 'either' || terms.priceForm === price.form) return [];
  const message =
    terms.priceForm === 'lump'
      ? 'This scope asks for a lump sum'
      : 'This scope asks for a price line by line';
  return [{ path: 'price.form', message }];
}

function lumpBid(lumpCents: number): PricedBid {
  return {
    totalCents: lumpCents,
    lines: [],
    computedCents: lumpCents,
    minimumCents: 0,
    minimumApplied: false,
    mobilizationCents: 0,
  };
}

function quantityOrIssue(
  scope: PricedScope,
  line: BidLine,
  byCutId: ReadonlyMap<string, CutTakeoff>,
): number | string {
  const cut = scope.cuts.find(({ id }) => id === line.cutId);
  const takeoff = byCutId.get(line.cutId);
  if (cut === undefined || takeoff === undefined) return 'This cut is not in the scope';
  const quantity = cutQuantity(cut, takeoff, line.unit);
  return quantity > 0 ? quantity : 'This cut has nothing to measure in this unit';
}

type LinesPrice = Extract<BidPrice, { form: 'lines' }>;

function priceLines(price: LinesPrice, lines: readonly (BidLine & { quantity: number })[]): PriceReading {
  try {
    const result = priceCuts({
      lines: lines.map((line, index) => ({ ...line, id: index, trip: TRIP })),
      extras: [],
      minimumCents: price.minimumCents,
      mobilizationCents: price.mobilizationCents,
      minimumIncludesMobilization: price.minimumIncludesMobilization,
    });
    const issues = result.lines.flatMap((line, index) =>
      line.isFactorCapped ? [lineIssue(index, 'factors', 'Factors together come to × 2.5 at most')] : [],
    );
    issues.push(...totalIssues(result.totalCents));
    if (issues.length > 0) return { ok: false, issues };
    return { ok: true, priced: pricedLinesBid(price, lines, result) };
  } catch (error) {
    if (!(error instanceof CuttingInputError)) throw error;
    const path = `price.${error.field.replaceAll('[', '.').replaceAll(']', '')}`;
    return { ok: false, issues: [{ path, message: `Must be ${error.allowed}` }] };
  }
}

function pricedLinesBid(
  price: LinesPrice,
  lines: readonly (BidLine & { quantity: number })[],
  result: ReturnType<typeof priceCuts>,
): PricedBid {
  const [trip] = result.trips;
  return {
    totalCents: result.totalCents,
    lines: lines.map(({ cutId, unit, quantity, rate, factors }, index): PricedLine => ({
      cutId,
      unit,
      quantity,
      rate,
      factors,
      cents: result.lines[index]?.cents ?? 0,
    })),
    computedCents: trip?.computedCents ?? 0,
    minimumCents: price.minimumCents,
    minimumApplied: trip?.minimumApplied ?? false,
    // What is added on top; a mobilization inside the minimum adds nothing.
    mobilizationCents: price.minimumIncludesMobilization ? 0 : price.mobilizationCents,
  };
}

function totalIssues(totalCents: number): FieldIssue[] {
  if (totalCents < 100) return [{ path: 'price', message: 'The whole bid must come to at least $1' }];
  if (totalCents > MAX_CENTS)
    return [{ path: 'price', message: 'The whole bid must come to at most $10,000,000' }];
  return [];
}

/** A bid by lines that leaves out a cut would hide a gap; a cut done for nothing says so with a rate of 0. */
function unpricedCutIssues(scope: PricedScope, price: BidPrice): FieldIssue[] {
  if (price.form === 'lump') return [];
  const priced = new Set(price.lines.map((line) => line.cutId));
  const marks = scope.cuts.filter((cut) => !priced.has(cut.id)).map((cut) => cut.mark);
  return marks.length === 0 ? [] : [{ path: 'price.lines', message: `Not priced yet: ${marks.join(', ')}` }];
}

/** Only what the scope gives to the crew can be in or out of its price. */
function answerIssues(
  { responsibilities }: Pick<ScopeBody, 'responsibilities'>,
  input: BidInput,
): FieldIssue[] {
  const own = new Set(responsibilities.filter((row) => row.by === 'crew').map((row) => row.item));
  const seen = new Set<string>();
  return input.answers.flatMap(({ item }, index) => {
    const path = `answers.${index}.item`;
    const isRepeated = seen.has(item);
    seen.add(item);
    if (!own.has(item)) return [{ path, message: 'The scope does not give this to the crew' }];
    return isRepeated ? [{ path, message: 'Answered twice' }] : [];
  });
}

function lineIssue(index: number, field: string, message: string): FieldIssue {
  return { path: `price.lines.${index}.${field}`, message };
}
