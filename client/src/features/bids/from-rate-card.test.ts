import { bidInputSchema, type BidInput, type OwnBidView } from '@kerfyard/common/bids';
import { emptyRateCard, type RateCard, type RateRow } from '@kerfyard/common/people';
import { cutSchema, prefillResponsibilities, type CutInput, type ScopeBody } from '@kerfyard/common/scopes';
import { describe, expect, it } from 'vitest';
import {
  bidFormSchema,
  bidValues,
  emptyBid,
  fieldOf,
  toBidInput,
  type BidFormValues,
} from './bid-form-values.ts';
import { fillFromCard } from './from-rate-card.ts';

const ids = ['0192f000-0000-7000-8000-000000000001', '0192f000-0000-7000-8000-000000000002'] as const;
const inputs: CutInput[] = [
  { kind: 'line', lengthFt: 20, depthIn: 6, count: 1 },
  { kind: 'core', diameterIn: 4, depthIn: 8, count: 3 },
];

function scope(
  over: { priceForm?: 'lump' | 'lines' | 'either'; steel?: 'mesh' | 'heavy_bar' } = {},
): ScopeBody {
  return {
    title: 'Trench and cores',
    summary: '',
    site: {
      name: 'Mill Row',
      address: '1 Mill Row',
      city: 'Denver',
      state: 'CO',
      zip: '80202',
      lat: 39.7,
      lon: -105,
      timeZone: 'America/Denver',
      contact: '',
    },
    cuts: inputs.map((cut, index) => ({
      id: ids[index] ?? '',
      mark: ['L1', 'C1'][index] ?? '',
      note: '',
      cut: cutSchema.parse(cut),
    })),
    conditions: {
      element: 'slab_on_grade',
      face: 'floor',
      indoors: false,
      floor: '',
      steel: over.steel ?? 'mesh',
      postTension: 'proved_none',
      below: 'soil',
      enginesAllowed: true,
      overcutsAllowed: true,
      workHours: '',
      access: '',
    },
    responsibilities: prefillResponsibilities({
      kinds: ['line', 'core'],
      indoors: false,
      face: 'floor',
      below: 'soil',
    }),
    terms: {
      priceForm: over.priceForm ?? 'either',
      retainageBasisPoints: 0,
      standbyFreeMinutes: 30,
      answerDays: 7,
      bidValidDays: 30,
      workFrom: '2027-01-11',
      workTo: '2027-01-15',
      wages: 'open_shop',
      notes: '',
    },
    bidding: { mode: 'sealed', dueAt: '2027-01-04T18:00:00.000Z' },
  };
}

const saw: RateRow = { method: 'flat_saw', kind: null, unit: 'in_ft', upToIn: 6, rate: 12_550 };
const drill: RateRow = { method: 'core_drill', kind: null, unit: 'each', upToIn: null, rate: 900_000 };
const card = (over: Partial<RateCard> = {}): RateCard => ({
  ...emptyRateCard(),
  rates: [saw, drill],
  factors: { heavy_bar: 160, overhead: null, finished_space: null, night: null },
  minimumCents: 65_000,
  mobilizationCents: 15_000,
  minimumIncludesMobilization: false,
  ...over,
});

const lines = (body: ScopeBody): BidFormValues => ({ ...emptyBid(body), form: 'lines' });

describe('a bid filled from a rate card', () => {
  it('has each line’s rate and unit, remembers whose they are, and the trip’s minimum', () => {
    const body = scope();
    const filled = fillFromCard(lines(body), body, card());
    expect(filled).toMatchObject({ unpriced: [], isFilled: true });
    expect(filled.values.lines).toMatchObject([
      { cutId: ids[0], unit: 'in_ft', rate: 12_550, method: 'flat_saw', card: saw },
      { cutId: ids[1], unit: 'each', rate: 900_000, method: 'core_drill', card: drill },
    ]);
    expect(filled.values).toMatchObject({
      minimumCents: 65_000,
      mobilizationCents: 15_000,
      minimumIncludesMobilization: false,
    });
    const input = bidFormSchema(1).safeParse(filled.values);
    expect(input.success).toBe(true);
  });

  it('puts the card’s factor on every line where the scope calls for it, and leaves the others as typed', () => {
    const body = scope({ steel: 'heavy_bar' });
    const typed = { ...lines(body), factors: { ...lines(body).factors, night: 130 } };
    const filled = fillFromCard(typed, body, card());
    expect(filled.values.factors).toMatchObject({ heavy_bar: 160, night: 130 });
    expect(bidInputSchema.parse(toBidInput(filled.values, 1)).price).toMatchObject({
      lines: [{ factors: [160, 130] }, { factors: [160, 130] }],
    });
  });

  it('keeps what was typed for a cut the card does not know, and names it', () => {
    const body = scope();
    const typed = lines(body);
    typed.lines = typed.lines.map((line) => ({ ...line, rate: 777 }));
    const filled = fillFromCard(typed, body, card({ rates: [drill] }));
    expect(filled.unpriced).toEqual(['L1']);
    expect(filled.values.lines.map(({ rate }) => rate)).toEqual([777, 900_000]);
    expect(filled.values.lines[0]?.card).toBeNull();
  });

  it('fills a lump with what the lines come to, also where lines are not asked for', () => {
    const body = scope({ priceForm: 'lump' });
    // 20 ft × 6 in × $1.255 = $150.60; 3 × $90 = $270; below the minimum of $650, and $150 on top.
    const filled = fillFromCard(emptyBid(body), body, card());
    expect(filled.values.lumpCents).toBe(80_000);
    const partly = fillFromCard(emptyBid(body), body, card({ rates: [drill] }));
    expect(partly).toMatchObject({ isFilled: false, unpriced: ['L1'], values: { lumpCents: null } });
  });

  it('sends nothing of methods or of the card', () => {
    const body = scope();
    const filled = fillFromCard(lines(body), body, card());
    expect(JSON.stringify(toBidInput(filled.values, 1))).not.toMatch(/flat_saw|core_drill|upToIn|card/);
  });
});

describe('a bid back in the form', () => {
  const back = (price: BidInput['price']) => {
    const body = scope();
    const input = {
      ...bidInputSchema.parse(toBidInput({ ...lines(body), lines: [], form: 'lump', lumpCents: 100 }, 1)),
      price,
    };
    return bidValues(body, { input } as OwnBidView);
  };
  const price = (first: number[], second: number[]): BidInput['price'] => ({
    form: 'lines',
    lines: [
      { cutId: ids[0], unit: 'lf', rate: 1_234, factors: first },
      { cutId: ids[1], unit: 'each', rate: 5, factors: second },
    ],
    minimumCents: 1,
    mobilizationCents: 2,
    minimumIncludesMobilization: false,
  });

  it('says the same again, factors named or not', () => {
    for (const factors of [[], [150], [150, 130], [160], [120, 110, 160]]) {
      const values = back(price(factors, factors));
      const again = bidInputSchema.parse(toBidInput(values, 1)).price;
      if (again.form !== 'lines') throw new Error('by lines');
      for (const line of again.lines) expect([...line.factors].sort()).toEqual([...factors].sort());
      expect(again).toMatchObject({
        minimumCents: 1,
        mobilizationCents: 2,
        minimumIncludesMobilization: false,
      });
    }
    expect(back(price([150], [150])).factors).toMatchObject({ heavy_bar: 150, other: null });
    expect(back(price([160], [160])).factors).toMatchObject({ heavy_bar: null, other: 160 });
  });

  it('keeps factors that differ by line with their lines', () => {
    const values = back(price([150], []));
    expect(values.factors.heavy_bar).toBeNull();
    expect(toBidInput(values, 1)).toMatchObject({ price: { lines: [{ factors: [150] }, { factors: [] }] } });
  });
});

describe('complaints about a bid', () => {
  it('stand at the form’s own fields: the priced line’s rate, and the factor typed', () => {
    const values = lines(scope());
    const [first, second] = values.lines;
    if (first === undefined || second === undefined) throw new Error('two lines');
    values.lines = [first, { ...second, rate: 5 }];
    values.factors = { ...values.factors, night: 999 };
    expect(fieldOf(values, ['price', 'lines', 0, 'rate'])).toEqual(['lines', '1', 'rate']);
    expect(fieldOf(values, ['price', 'lines', 0, 'factors', 0])).toEqual(['factors', 'night']);
    expect(fieldOf(values, ['price', 'lines', 0, 'factors'])).toEqual(['factors', 'night']);
    expect(fieldOf(values, ['price', 'minimumCents'])).toEqual(['minimumCents']);
    const parsed = bidFormSchema(1).safeParse(values);
    expect(parsed.error?.issues.map(({ path }) => path.join('.'))).toContain('factors.night');
  });
});
