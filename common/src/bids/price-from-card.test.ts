import { describe, expect, it } from 'vitest';
import { emptyRateCard, rateCardSchema, type RateCard, type RateRow } from '../people/index.ts';
import { cutSchema, type Conditions, type CutInput, type CutLine } from '../scopes/index.ts';
import { methodsOfCutHere, priceFromCard, rateFor } from './index.ts';

const conditions: Conditions = {
  element: 'slab_on_grade',
  face: 'floor',
  indoors: false,
  floor: '',
  steel: 'mesh',
  postTension: 'proved_none',
  below: 'soil',
  enginesAllowed: true,
  overcutsAllowed: true,
  workHours: '',
  access: '',
};

const row = (over: Partial<RateRow>): RateRow => ({
  method: 'flat_saw',
  kind: null,
  unit: 'in_ft',
  upToIn: null,
  rate: 10_000,
  ...over,
});
const card = (rates: RateRow[], over: Partial<RateCard> = {}): RateCard => ({
  ...emptyRateCard(),
  rates,
  ...over,
});
const cut = (input: CutInput): CutLine => ({
  id: JSON.stringify(input),
  mark: input.kind,
  note: '',
  cut: cutSchema.parse(input),
});

const line = cut({ kind: 'line', lengthFt: 20, depthIn: 6, count: 1 });
const core = cut({ kind: 'core', diameterIn: 4, depthIn: 8, count: 3 });

describe('a rate of a card', () => {
  const banded = [
    row({ upToIn: null, rate: 30_000 }),
    row({ upToIn: 6, rate: 12_000 }),
    row({ upToIn: 4, rate: 9_000 }),
  ];

  it('is that of the narrowest band that holds the cut, its upper end in it', () => {
    const depths = [3, 4, 4.1, 6, 6.1].map((depthIn) => {
      const { cut: sized } = cut({ kind: 'line', lengthFt: 1, depthIn, count: 1 });
      return rateFor({ rates: banded }, { cut: sized, method: 'flat_saw', unit: 'in_ft' })?.rate;
    });
    expect(depths).toEqual([9_000, 9_000, 12_000, 12_000, 30_000]);
  });

  it('is missing beyond the last band, and for another method or unit', () => {
    const rates = banded.slice(1);
    const deep = cut({ kind: 'line', lengthFt: 1, depthIn: 7, count: 1 }).cut;
    expect(rateFor({ rates }, { cut: deep, method: 'flat_saw', unit: 'in_ft' })).toBeUndefined();
    expect(rateFor({ rates }, { cut: line.cut, method: 'wall_saw', unit: 'in_ft' })).toBeUndefined();
    expect(rateFor({ rates }, { cut: line.cut, method: 'flat_saw', unit: 'lf' })).toBeUndefined();
  });

  it('for one kind of cut goes before one for every kind, also when its band is wider', () => {
    const rates = [row({ upToIn: 6, rate: 1 }), row({ kind: 'trench', upToIn: null, rate: 2 })];
    const trench = cut({ kind: 'trench', lengthFt: 9, widthFt: 2, thicknessIn: 6, count: 1 }).cut;
    expect(rateFor({ rates }, { cut: trench, method: 'flat_saw', unit: 'in_ft' })?.rate).toBe(2);
    expect(rateFor({ rates }, { cut: line.cut, method: 'flat_saw', unit: 'in_ft' })?.rate).toBe(1);
  });

  it('goes by the diameter of a core, a bit, a pipe and a bar', () => {
    const rates = [row({ method: 'core_drill', unit: 'each', upToIn: 4, rate: 1 })];
    expect(rateFor({ rates }, { cut: core.cut, method: 'core_drill', unit: 'each' })?.rate).toBe(1);
    const bar = cut({ kind: 'bar', diameterIn: 0.75, count: 9 }).cut;
    const bars = [row({ method: 'hand_saw', kind: 'bar', unit: 'each', upToIn: 0.625, rate: 1 })];
    expect(rateFor({ rates: bars }, { cut: bar, method: 'hand_saw', unit: 'each' })).toBeUndefined();
  });
});

describe('a scope priced from a card', () => {
  it('takes the first method that can do the cut and has a rate, in the usual unit', () => {
    const rates = [
      row({ method: 'wall_saw', rate: 5 }),
      row({ rate: 7 }),
      row({ method: 'core_drill', unit: 'core_in', rate: 3 }),
    ];
    const priced = priceFromCard({ cuts: [line, core], conditions }, card(rates));
    expect(priced.lines.map(({ method, row: one }) => [method, one.unit, one.rate])).toEqual([
      ['flat_saw', 'in_ft', 7],
      ['core_drill', 'core_in', 3],
    ]);
    expect(priced.unpriced).toEqual([]);
  });

  it('leaves a cut without a rate, and names it', () => {
    const priced = priceFromCard({ cuts: [line, core], conditions }, card([row({})]));
    expect(priced.lines.map(({ cutId }) => cutId)).toEqual([line.id]);
    expect(priced.unpriced).toEqual(['core']);
  });

  it('never prices by a method that cannot do the cut here', () => {
    const wall = { ...conditions, face: 'wall' as const };
    expect(priceFromCard({ cuts: [line], conditions: wall }, card([row({})])).lines).toEqual([]);
    expect(methodsOfCutHere(line.cut, wall)).not.toContain('flat_saw');
  });

  it('follows the method the crew picked', () => {
    const rates = [row({ rate: 7 }), row({ method: 'wall_saw', rate: 5 })];
    const priced = priceFromCard({ cuts: [line], conditions }, card(rates), new Map([[line.id, 'wall_saw']]));
    expect(priced.lines[0]?.row.rate).toBe(5);
  });

  it('does joints by a joint saw where the crew has one', () => {
    const joints = cut({ kind: 'joints', lengthFt: 60, widthFt: 40, thicknessIn: 6, count: 1 }).cut;
    expect(methodsOfCutHere(joints, conditions)).toEqual(['joint_saw', 'flat_saw']);
    expect(methodsOfCutHere(joints, conditions, ['flat_saw'])).toEqual(['flat_saw']);
  });

  it('brings the factors that the conditions call for, and no others', () => {
    const factors = { heavy_bar: 150, overhead: 175, finished_space: 140, night: 130 };
    const none = { heavy_bar: null, overhead: null, finished_space: null, night: null };
    const of = (over: Partial<Conditions>) =>
      priceFromCard({ cuts: [line], conditions: { ...conditions, ...over } }, card([], { factors })).factors;
    expect(of({})).toEqual(none);
    expect(of({ steel: 'heavy_bar' })).toEqual({ ...none, heavy_bar: 150 });
    expect(of({ steel: 'heavy_bar', face: 'ceiling' })).toEqual({ ...none, heavy_bar: 150, overhead: 175 });
  });
});

describe('a rate card', () => {
  it('is whole when empty, and refuses two rates of the same band, at the second', () => {
    expect(rateCardSchema.safeParse(emptyRateCard()).success).toBe(true);
    const parsed = rateCardSchema.safeParse(card([row({}), row({ upToIn: 4 }), row({ rate: 1 })]));
    expect(parsed.error?.issues.map(({ path }) => path.join('.'))).toEqual(['rates.2.upToIn']);
  });

  it('refuses what is no card: unknown fields, half cents of a hundredth, negative and endless numbers', () => {
    const wrong: unknown[] = [
      { ...emptyRateCard(), discount: 1 },
      card([row({ rate: 0.5 })]),
      card([row({ rate: -1 })]),
      card([row({ upToIn: Infinity })]),
      card([row({ method: 'axe' as never })]),
      card([row({ unit: 'lump' as never })]),
      card(Array.from({ length: 501 }, (_, index) => row({ upToIn: index + 1 }))),
      card([], { factors: { ...emptyRateCard().factors, night: 900 } }),
      card([], { minimumCents: 0.5 }),
    ];
    for (const one of wrong) expect(rateCardSchema.safeParse(one).success).toBe(false);
  });
});
