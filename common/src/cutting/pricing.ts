import { checkBoolean, checkList, checkNumber, checkNumberOr, checkObject, within } from './check.ts';
import { CuttingInputError } from './input-error.ts';
import { arithmetic, companyNumber, put, type WorkingStep } from './working.ts';

/** A trip is named by its place or its own id. */
export type TripId = string | number;

export interface PriceLine {
  readonly id: string | number;
  readonly trip: TripId;
  /** In hundredths of the unit: 12 ft is 1200. */
  readonly quantity: number;
  readonly unit: string;
  /** In hundredths of a cent for one unit: $10 is 100000. */
  readonly rate: number;
  /** In percent: 150 is × 1.5. Several multiply. */
  readonly factors: readonly number[];
}

export interface PriceExtra {
  readonly id: string | number;
  readonly trip: TripId;
  readonly cents: number;
}

export interface PriceCutsInput {
  readonly lines: readonly PriceLine[];
  readonly extras: readonly PriceExtra[];
  readonly minimumCents: number;
  readonly mobilizationCents: number;
  /** True when the minimum already pays for the trip. */
  readonly minimumIncludesMobilization?: boolean | undefined;
  /** The most all factors of a line may come to together. */
  readonly factorCapPct?: number | undefined;
}

export interface PricedLine {
  readonly id: string | number;
  readonly cents: number;
  /** All factors of the line together, after the cap. */
  readonly factorPct: number;
  readonly isFactorCapped: boolean;
}

export interface PricedTrip {
  readonly trip: TripId;
  readonly computedCents: number;
  readonly minimumApplied: boolean;
  readonly cents: number;
}

export interface PricedCuts {
  readonly lines: readonly PricedLine[];
  readonly trips: readonly PricedTrip[];
  readonly totalCents: number;
  readonly working: readonly WorkingStep[];
}

const maxLines = 10_000;
const maxFactors = 10;
// Ten trillion dollars of cents still add up exactly in a double.
const centsRange = { min: 0, max: 100_000_000_000, integer: true, unit: 'cents' } as const;
const quantityRange = { min: 0, max: 10_000_000_000, integer: true, unit: 'hundredths' } as const;
const rateRange = { min: 0, max: 10_000_000_000, integer: true, unit: 'hundredths of a cent' } as const;
const factorRange = { min: 1, max: 1_000, integer: true, unit: '%' } as const;
const factorCapRange = { min: 100, max: 10_000, integer: true, unit: '%' } as const;

/**
 * Price of cut lines: quantity × rate × factors in whole numbers, each line rounded half up to a cent once; per
 * trip the greater of the minimum and the sum of its lines and extras, plus the mobilization only when the
 * minimum does not include it.
 * @throws CuttingInputError with the line's place in `field`, as in `lines[2].rate`
 */
export function priceCuts(input: PriceCutsInput): PricedCuts {
  const fields = checkObject(input, 'input');
  const minimumCents = checkNumber(fields.minimumCents, 'minimumCents', centsRange);
  const mobilizationCents = checkNumber(fields.mobilizationCents, 'mobilizationCents', centsRange);
  const minimumIncludesMobilization = checkBoolean(
    fields.minimumIncludesMobilization,
    'minimumIncludesMobilization',
    true,
  );
  const factorCapPct = checkNumberOr(fields.factorCapPct, 'factorCapPct', factorCapRange, 250);
  const lines = checkList(fields.lines, 'lines', maxLines).map((line, index) =>
    within(`lines[${index}]`, () => priceLine(line, factorCapPct)),
  );
  const extras = checkList(fields.extras, 'extras', maxLines).map((extra, index) =>
    within(`extras[${index}]`, () => checkExtra(extra)),
  );
  const addedCents = minimumIncludesMobilization ? 0 : mobilizationCents;
  const trips = priceTrips([...lines, ...extras], { minimumCents, addedCents });
  const totalCents = trips.reduce((sum, trip) => sum + trip.cents, 0);
  if (totalCents > Number.MAX_SAFE_INTEGER) {
    throw new CuttingInputError({
      field: 'lines',
      allowed: 'small enough to add up to the cent',
      given: totalCents,
    });
  }
  return {
    lines: lines.map(({ id, cents, factorPct, isFactorCapped }) => ({
      id,
      cents,
      factorPct,
      isFactorCapped,
    })),
    trips,
    totalCents,
    working: [
      ...lines.map((line) => line.step),
      ...trips.map((trip) => tripStep(trip, { minimumCents, addedCents })),
      totalStep(trips, totalCents),
    ],
  };
}

interface CheckedLine extends PricedLine {
  readonly trip: TripId;
  readonly step: WorkingStep;
}

function priceLine(line: unknown, factorCapPct: number): CheckedLine {
  const fields = checkObject(line, 'line');
  const id = checkId(fields.id, 'id');
  const trip = checkId(fields.trip, 'trip');
  const quantity = checkNumber(fields.quantity, 'quantity', quantityRange);
  const rate = checkNumber(fields.rate, 'rate', rateRange);
  const unit = checkText(fields.unit, 'unit');
  const factors = checkList(fields.factors, 'factors', maxFactors).map((factor, index) =>
    checkNumber(factor, `factors[${index}]`, factorRange),
  );
  const factor = multiplyFactors(factors, factorCapPct);
  // quantity and rate are both in hundredths, so four more digits go before cents are left.
  const cents = roundHalfUp(BigInt(quantity) * BigInt(rate) * factor.numerator, 10_000n * factor.denominator);
  const factorPct = (Number(factor.numerator) / Number(factor.denominator)) * 100;
  return {
    id,
    trip,
    cents,
    factorPct,
    isFactorCapped: factor.isCapped,
    step: lineStep({ id, quantity, rate, unit, factors, factorCapPct, isCapped: factor.isCapped, cents }),
  };
}

function multiplyFactors(
  factors: readonly number[],
  capPct: number,
): { numerator: bigint; denominator: bigint; isCapped: boolean } {
  let numerator = 1n;
  let denominator = 1n;
  for (const factor of factors) {
    numerator *= BigInt(factor);
    denominator *= 100n;
  }
  const isCapped = numerator * 100n > BigInt(capPct) * denominator;
  return isCapped
    ? { numerator: BigInt(capPct), denominator: 100n, isCapped }
    : { numerator, denominator, isCapped };
}

function roundHalfUp(numerator: bigint, denominator: bigint): number {
  const cents = (2n * numerator + denominator) / (2n * denominator);
  if (cents > BigInt(Number.MAX_SAFE_INTEGER)) {
    throw new CuttingInputError({ field: 'rate', allowed: 'small enough to count in cents', given: cents });
  }
  return Number(cents);
}

function checkExtra(extra: unknown): { trip: TripId; cents: number } {
  const fields = checkObject(extra, 'extra');
  checkId(fields.id, 'id');
  return { trip: checkId(fields.trip, 'trip'), cents: checkNumber(fields.cents, 'cents', centsRange) };
}

/** One priced trip for each trip named, in the order first named. */
function priceTrips(
  items: readonly { readonly trip: TripId; readonly cents: number }[],
  { minimumCents, addedCents }: { minimumCents: number; addedCents: number },
): readonly PricedTrip[] {
  const computed = new Map<TripId, number>();
  for (const { trip, cents } of items) computed.set(trip, (computed.get(trip) ?? 0) + cents);
  return [...computed].map(([trip, computedCents]) => ({
    trip,
    computedCents,
    minimumApplied: computedCents < minimumCents,
    cents: Math.max(minimumCents, computedCents) + addedCents,
  }));
}

/** An id is a short text or a whole number. */
function checkId(value: unknown, field: string): string | number {
  return typeof value === 'number'
    ? checkNumber(value, field, { min: 0, max: Number.MAX_SAFE_INTEGER, integer: true, unit: '' })
    : checkText(value, field);
}

function checkText(value: unknown, field: string): string {
  if (typeof value !== 'string' || value === '' || value.length > 200) {
    throw new CuttingInputError({ field, allowed: 'a text of 1 to 200 characters', given: value });
  }
  return value;
}

function lineStep(line: {
  id: string | number;
  quantity: number;
  rate: number;
  unit: string;
  factors: readonly number[];
  factorCapPct: number;
  isCapped: boolean;
  cents: number;
}): WorkingStep {
  return {
    label: `Line ${line.id}`,
    formula: 'quantity × rate × factors, rounded half up to a cent once',
    inputs: [
      put('quantity', line.quantity / 100, line.unit),
      put('rate', line.rate / 100, `cents per ${line.unit}`),
      ...line.factors.map((factor) => put('factor', factor, '%')),
      ...(line.isCapped ? [put('factors together stopped at the cap', line.factorCapPct, '%')] : []),
    ],
    value: line.cents,
    unit: 'cents',
    source: companyNumber,
  };
}

function tripStep(trip: PricedTrip, rule: { minimumCents: number; addedCents: number }): WorkingStep {
  return {
    label: `Trip ${trip.trip}`,
    formula: 'max(minimum, lines + extras) + mobilization not in the minimum',
    inputs: [
      put('minimum', rule.minimumCents, 'cents'),
      put('lines + extras', trip.computedCents, 'cents'),
      put('mobilization', rule.addedCents, 'cents'),
    ],
    value: trip.cents,
    unit: 'cents',
    source: companyNumber,
  };
}

function totalStep(trips: readonly PricedTrip[], totalCents: number): WorkingStep {
  return {
    label: 'Total',
    formula: 'sum of the trips',
    inputs: trips.map((trip) => put(`trip ${trip.trip}`, trip.cents, 'cents')),
    value: totalCents,
    unit: 'cents',
    source: arithmetic,
  };
}
