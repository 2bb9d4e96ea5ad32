import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  cutSchema,
  responsibilityItems,
  type CutInput,
  type Responsibility,
  type Terms,
} from '../scopes/index.ts';
import {
  bidInputSchema,
  bidIssues,
  cutQuantity,
  priceBid,
  readPrice,
  type BidLine,
  type BidPrice,
} from './index.ts';
import { readCutList } from '../scopes/totals.ts';

const TRENCH = '0192f000-0000-7000-8000-00000000000a';
const CORES = '0192f000-0000-7000-8000-00000000000b';
const LINE = '0192f000-0000-7000-8000-00000000000c';
const STRANGE = '0192f000-0000-7000-8000-0000000000ff';

const cut = (id: string, mark: string, input: CutInput) => ({
  id,
  mark,
  note: '',
  cut: cutSchema.parse(input),
});
const terms: Terms = {
  priceForm: 'either',
  retainageBasisPoints: 0,
  standbyFreeMinutes: 30,
  answerDays: 7,
  bidValidDays: 30,
  workFrom: '2027-01-04',
  workTo: '2027-01-15',
  wages: 'open_shop',
  notes: '',
};
const responsibilities: Responsibility[] = responsibilityItems.map((item) => ({
  item,
  by: item === 'cut' || item === 'slurry' ? 'crew' : 'gc',
  name: '',
}));
const scope = {
  terms,
  responsibilities,
  cuts: [
    // 40 × 2 ft of 6 in without removal: 2·40 + 2·2 = 84 LF, 504 in-ft.
    cut(TRENCH, 'A1', { kind: 'trench', lengthFt: 40, widthFt: 2, thicknessIn: 6, count: 1 }),
    cut(CORES, 'B1', { kind: 'core', diameterIn: 4, depthIn: 8, count: 6 }),
    cut(LINE, 'C1', { kind: 'line', lengthFt: 10.05, depthIn: 5, count: 1 }),
  ],
};

function linesPrice(
  lines: (Partial<BidLine> & Pick<BidLine, 'cutId' | 'unit' | 'rate'>)[],
  more = {},
): BidPrice {
  return {
    form: 'lines',
    lines: lines.map((line) => ({ factors: [], ...line })),
    minimumCents: 0,
    mobilizationCents: 0,
    minimumIncludesMobilization: true,
    ...more,
  };
}
const whole = [
  { cutId: TRENCH, unit: 'in_ft', rate: 8500 },
  { cutId: CORES, unit: 'each', rate: 450_000 },
  { cutId: LINE, unit: 'lf', rate: 30_000 },
] as const;
const bid = (price: BidPrice, more: object = {}) =>
  bidInputSchema.parse({ revision: 1, price, validDays: 30, ...more });

describe('the price of a bid', () => {
  it('takes quantities from the scope: 504 in-ft at $0.85, 6 cores at $45, 10.05 ft at $3', () => {
    const priced = priceBid(scope, { price: linesPrice([...whole]) });
    expect(priced.lines.map((line) => [line.quantity, line.cents])).toEqual([
      [50_400, 42_840], // 504 × $0.85 = $428.40
      [600, 27_000], // 6 × $45 = $270.00
      [1_005, 3_015], // 10.05 × $3 = $30.15
    ]);
    expect(priced).toMatchObject({ totalCents: 72_855, computedCents: 72_855, minimumApplied: false });
  });

  it('multiplies factors and rounds each line once, half up', () => {
    // 10.05 LF × $0.85 × 1.5 × 1.3 = $16.657875 → 1,666 cents
    const price = linesPrice([{ cutId: LINE, unit: 'lf', rate: 8500, factors: [150, 130] }]);
    expect(priceBid(scope, { price }).lines[0]?.cents).toBe(1_666);
  });

  it('raises to the minimum and adds the mobilization only when the minimum leaves it out', () => {
    const lines = [...whole];
    const inside = { minimumCents: 90_000, mobilizationCents: 15_000, minimumIncludesMobilization: true };
    expect(priceBid(scope, { price: linesPrice(lines, inside) })).toMatchObject({
      computedCents: 72_855,
      minimumApplied: true,
      mobilizationCents: 0,
      totalCents: 90_000,
    });
    const outside = { ...inside, minimumIncludesMobilization: false };
    expect(priceBid(scope, { price: linesPrice(lines, outside) })).toMatchObject({
      mobilizationCents: 15_000,
      totalCents: 105_000,
    });
  });

  it('lets a lump sum be the total', () => {
    expect(priceBid(scope, { price: { form: 'lump', lumpCents: 123_456 } })).toEqual({
      totalCents: 123_456,
      lines: [],
      computedCents: 123_456,
      minimumCents: 0,
      minimumApplied: false,
      mobilizationCents: 0,
    });
  });

  it('measures 1.005 ft as 101 hundredths, as on paper', () => {
    const line = cut(LINE, 'C1', { kind: 'line', lengthFt: 1.005, depthIn: 1, count: 1 });
    const list = readCutList([line]);
    const takeoff = list.ok ? list.byCutId.get(LINE) : undefined;
    expect(takeoff === undefined ? 0 : cutQuantity(line, takeoff, 'lf')).toBe(101);
  });

  it('always sums: total = the greater of minimum and lines, plus mobilization (property)', () => {
    const line = fc.record({
      cutId: fc.constantFrom(TRENCH, LINE),
      unit: fc.constantFrom('in_ft' as const, 'lf' as const, 'each' as const, 'lump' as const),
      rate: fc.integer({ min: 0, max: 5_000_000 }),
      factors: fc.array(fc.integer({ min: 50, max: 150 }), { maxLength: 2 }),
    });
    const lines = fc.uniqueArray(line, { minLength: 1, selector: (one) => `${one.cutId}${one.unit}` });
    const cents = fc.integer({ min: 100, max: 1_000_000 });
    fc.assert(
      fc.property(lines, cents, cents, fc.boolean(), (some, minimumCents, mobilizationCents, included) => {
        const price = linesPrice(some, {
          minimumCents,
          mobilizationCents,
          minimumIncludesMobilization: included,
        });
        const priced = priceBid(scope, { price });
        const sum = priced.lines.reduce((total, one) => total + one.cents, 0);
        expect(priced.computedCents).toBe(sum);
        expect(priced.totalCents).toBe(Math.max(sum, minimumCents) + (included ? 0 : mobilizationCents));
        expect(Number.isSafeInteger(priced.totalCents)).toBe(true);
      }),
    );
  });
});

describe('what is wrong with a bid', () => {
  const paths = (price: BidPrice, more: object = {}, on: typeof scope = scope) =>
    bidIssues(on, bid(price, more)).map((issue) => issue.path);

  it('is nothing for a whole bid', () => {
    expect(paths(linesPrice([...whole]), { answers: [{ item: 'cut', answer: 'included' }] })).toEqual([]);
    expect(paths({ form: 'lump', lumpCents: 100 })).toEqual([]);
  });

  it('names the form the scope asks for', () => {
    const lumpOnly = { ...scope, terms: { ...terms, priceForm: 'lump' as const } };
    const linesOnly = { ...scope, terms: { ...terms, priceForm: 'lines' as const } };
    expect(paths(linesPrice([...whole]), {}, lumpOnly)).toEqual(['price.form']);
    expect(paths({ form: 'lump', lumpCents: 5_000 }, {}, linesOnly)).toEqual(['price.form']);
  });

  it('names every faulty line at once: unknown cut, unit without measure, the same line twice, cuts left out', () => {
    const price = linesPrice([
      { cutId: STRANGE, unit: 'lf', rate: 100 },
      { cutId: LINE, unit: 'core_in', rate: 100 },
      { cutId: TRENCH, unit: 'lf', rate: 100 },
      { cutId: TRENCH, unit: 'lf', rate: 200 },
    ]);
    const issues = bidIssues(scope, bid(price));
    expect(issues.map((issue) => issue.path)).toEqual([
      'price.lines.0.unit',
      'price.lines.1.unit',
      'price.lines.3.unit',
      'price.lines',
    ]);
    expect(issues.at(-1)?.message).toContain('B1');
  });

  it('does not stop a preview for cuts not priced yet', () => {
    expect(readPrice(scope, linesPrice([whole[0]])).ok).toBe(true);
  });

  it('refuses factors over the cap, a total of nothing and one past the limit, instead of mending them', () => {
    const over = linesPrice([{ ...whole[0], factors: [200, 200] }, whole[1], whole[2]]);
    expect(paths(over)).toEqual(['price.lines.0.factors']);
    expect(paths(linesPrice(whole.map((line) => ({ ...line, rate: 0 }))))).toEqual(['price']);
    expect(paths(linesPrice(whole.map((line) => ({ ...line, rate: 10_000_000_000 }))))).toEqual(['price']);
  });

  it('takes answers only for what the crew has, once each', () => {
    const answers = [
      { item: 'cut', answer: 'included' },
      { item: 'scan', answer: 'excluded' },
      { item: 'cut', answer: 'excluded' },
    ];
    expect(paths({ form: 'lump', lumpCents: 100 }, { answers })).toEqual([
      'answers.1.item',
      'answers.2.item',
    ]);
  });
});
