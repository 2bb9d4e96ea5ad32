import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { methodsOfCutHere } from '../bids/index.ts';
import { CuttingInputError, type NumberOrigin } from '../cutting/index.ts';
import { emptyRateCard, type Method, type RateCard } from '../people/index.ts';
import { cutSchema, type CutInput, type CutLine } from '../scopes/index.ts';
import { estimateJob, type EstimateInput, type OtherHours } from './index.ts';

const noHours: OtherHours = {
  travelHours: 0,
  orientationHours: 0,
  setUpHours: 0,
  moveHours: 0,
  breakingHours: 0,
  loadingHours: 0,
  cleaningHours: 0,
};
const outside = {
  face: 'floor',
  below: 'soil',
  indoors: false,
  enginesAllowed: true,
  overcutsAllowed: true,
} as const;

function job(
  cuts: readonly (readonly [CutInput, Method | null])[],
  over: Partial<EstimateInput> = {},
): EstimateInput {
  const lines = cuts.map(([input], index): CutLine => ({
    id: String(index),
    mark: `M${index}`,
    note: '',
    cut: cutSchema.parse(input),
  }));
  const methods = new Map(
    cuts.flatMap(([, method], index) => (method === null ? [] : [[String(index), method] as const])),
  );
  return {
    cuts: lines,
    methods,
    place: outside,
    card: null,
    hours: noHours,
    load: { tons: 10, cuYd: 10 },
    generator: null,
    ...over,
  };
}

const own = (over: Partial<RateCard>): RateCard => ({ ...emptyRateCard(), ...over });
const origins = (steps: readonly { source: { origin: NumberOrigin } }[]) => [
  ...new Set(steps.map(({ source }) => source.origin)),
];
// Common practice: trench 40 × 2 ft, 6 in, pieces 4 ft → 102 LF, 612 in-ft.
const trench: CutInput = {
  kind: 'trench',
  lengthFt: 40,
  widthFt: 2,
  thicknessIn: 6,
  count: 1,
  removal: { maxPieceLb: 600, maxSideFt: 4 },
};

describe('the estimate of a job', () => {
  it('takes hours from common practice, a quick job and a slow one, and says so', () => {
    const { tools, hours } = estimateJob(job([[trench, 'flat_saw']]));
    // 612 in-ft at 600 and at 300 in-ft an hour.
    expect(tools).toMatchObject([{ tool: 'flat_saw', quantity: 612, unit: 'in-ft', low: 1.02, high: 2.04 }]);
    expect([hours.low, hours.high]).toEqual([1.02, 2.04]);
    expect(origins(tools[0]?.working ?? [])).toEqual(['common practice']);
  });

  it('takes the crew’s own production instead, one figure and one step, and says whose it is', () => {
    const card = emptyRateCard();
    card.production.perHour.flat_saw = 306;
    const { tools } = estimateJob(job([[trench, 'flat_saw']], { card }));
    expect([tools[0]?.low, tools[0]?.high]).toEqual([2, 2]);
    expect(tools[0]?.working).toHaveLength(1);
    expect(origins(tools[0]?.working ?? [])).toEqual(['company']);
  });

  it('adds travel, set-up and the rest', () => {
    const hours = { ...noHours, travelHours: 1.5, setUpHours: 0.5 };
    expect(estimateJob(job([[trench, 'flat_saw']], { hours })).hours.low).toBeCloseTo(3.02, 10);
  });

  it('runs a floor saw electric where no engine may run', () => {
    const place = { ...outside, indoors: true };
    const { tools } = estimateJob(job([[trench, 'flat_saw']], { place }));
    // 612 in-ft at 400 and at 150.
    expect(tools).toMatchObject([{ tool: 'flat_saw_electric', low: 1.53, high: 4.08 }]);
  });

  it('cores by diameter and set-up, with the crew’s own feed where its band holds the bit', () => {
    const core: CutInput = { kind: 'core', diameterIn: 4, depthIn: 8, count: 6 };
    // 6 × (8 ÷ 0.8 + 5) and 6 × (8 ÷ 0.8 + 15) minutes.
    const common = estimateJob(job([[core, 'core_drill']])).tools[0];
    expect([common?.low, common?.high]).toEqual([1.5, 2.5]);
    const card = emptyRateCard();
    card.production.coreFeeds = [
      { upToIn: null, inchesPerMinute: 0.1 },
      { upToIn: 4, inchesPerMinute: 2 },
    ];
    card.production.coreSetUpMinutes = 6;
    // 6 × (8 ÷ 2 + 6) minutes.
    const mine = estimateJob(job([[core, 'core_drill']], { card })).tools[0];
    expect([mine?.low, mine?.high]).toEqual([1, 1]);
    expect(origins(mine?.working ?? [])).toEqual(['company']);
    card.production.coreFeeds = [];
    const half = estimateJob(job([[core, 'core_drill']], { card })).tools[0];
    expect(origins(half?.working ?? [])).toEqual(['company', 'common practice']);
  });

  it('counts blades, bits and the crew’s hours at the crew’s own cost, and nothing it has no cost for', () => {
    const core: CutInput = { kind: 'core', diameterIn: 4, depthIn: 8, count: 6 };
    const cuts = [
      [trench, 'flat_saw'],
      [core, 'core_drill'],
    ] as const;
    // 612 in-ft at $0.125, 48 core-in at $0.50, hours at $180.
    const card = own({ costs: { crewHourCents: 18_000, bladeRate: 1_250, bitRate: 5_000 } });
    card.production.perHour.flat_saw = 306;
    card.production.coreSetUpMinutes = 10;
    const found = estimateJob(job(cuts, { card }));
    expect(found.bladeCents?.value).toBe(7_650);
    expect(found.bitCents?.value).toBe(2_400);
    // 2 h of sawing and 6 × (10 + 10) min of coring.
    expect(found.crewCents).toMatchObject({ low: 72_000, high: 72_000 });
    expect(found.costCents).toMatchObject({ low: 82_050, high: 82_050 });
    expect(origins(found.bladeCents?.working ?? [])).toEqual(['company']);
    const none = estimateJob(job(cuts));
    expect([none.crewCents, none.bladeCents, none.bitCents, none.costCents]).toEqual([
      null,
      null,
      null,
      null,
    ]);
  });

  it('counts water and slurry as the worked job: 612 in-ft, 3 gpm, 91.8 min → 282 gal, 6 drums', () => {
    const card = emptyRateCard();
    card.production.perHour.flat_saw = 400;
    const found = estimateJob(job([[trench, 'flat_saw']], { card }));
    expect(found.waterGal.low).toBeCloseTo(275.4, 6);
    const last = found.drums.working.find(({ label }) => label === 'Slurry');
    expect(Number(last?.value)).toBeCloseTo(281.76, 1);
    expect([found.drums.low, found.drums.high]).toEqual([6, 6]);
  });

  it('counts loads by weight or by room, whichever fills first', () => {
    // 40 × 2 ft × 6 in = 40 cu ft = 3 tons = 1.48 cu yd in place, 2.22 loose.
    const loads = (load: EstimateInput['load']) =>
      estimateJob(job([[trench, 'flat_saw']], { load })).spoil?.loads.value;
    expect(loads({ tons: 10, cuYd: 10 })).toBe(1);
    expect(loads({ tons: 1, cuYd: 10 })).toBe(3);
    expect(loads({ tons: 10, cuYd: 1 })).toBe(3);
    expect(() => loads({ tons: 0, cuYd: 1 })).toThrow(CuttingInputError);
    const line: CutInput = { kind: 'line', lengthFt: 10, depthIn: 4, count: 1 };
    expect(estimateJob(job([[line, 'flat_saw']])).spoil).toBeNull();
  });

  it('counts batteries for work by hand where no engine may run', () => {
    const cuts = [
      [{ kind: 'line', lengthFt: 60, depthIn: 1, count: 1 }, 'hand_saw'],
      [{ kind: 'block', cutLengthIn: 8, depthIn: 8, count: 45 }, 'hand_saw'],
      [{ kind: 'bar', diameterIn: 0.625, count: 81 }, 'hand_saw'],
    ] as const;
    const place = { ...outside, indoors: true };
    // Common practice: 60 ft at 1 in needs 3 packs, 45 blocks 2, 81 bars 2.
    expect(estimateJob(job(cuts, { place })).batteryPacks?.value).toBe(7);
    expect(estimateJob(job(cuts)).batteryPacks).toBeNull();
  });

  it('sizes a generator for the machine typed', () => {
    const generator = { volts: 480, amps: 30, phases: 3 } as const;
    // 480 × 30 × √3 ÷ 1000 ÷ 0.8 = 31.2 kW.
    expect(estimateJob(job([[trench, 'flat_saw']], { generator })).generatorKw?.value).toBeCloseTo(31.18, 2);
  });

  it('says what it does not count, and why', () => {
    const found = estimateJob(
      job([
        [trench, null],
        [{ kind: 'bar', diameterIn: 0.5, count: 3 }, 'hand_saw'],
        [
          { kind: 'opening', lengthFt: 3, widthFt: 7, thicknessIn: 8, corners: 'cored', count: 1 },
          'wall_saw',
        ],
        [{ kind: 'core', diameterIn: 24, depthIn: 8, count: 1 }, 'core_drill'],
        [{ kind: 'line', lengthFt: 3, depthIn: 8, count: 1 }, 'stitch_drill'],
      ]),
    );
    expect(found.notCounted.map(({ mark, reason }) => [mark, reason]).sort()).toEqual([
      ['M0', 'no_method'],
      ['M1', 'no_rate'],
      ['M2', 'no_blade'],
      ['M4', 'no_rate'],
      ['Ø 24 in', 'no_feed'],
    ]);
  });

  it('counts a wire cut by its face, its pilots as cores', () => {
    const wire: CutInput = {
      kind: 'wire',
      areaSqFt: 50,
      pilotCores: 2,
      pilotDiameterIn: 2,
      depthIn: 30,
      count: 1,
    };
    const { tools } = estimateJob(job([[wire, 'wire_saw']]));
    // 50 sq ft at 25 and at 8 sq ft an hour; 2 × (30 ÷ 1 + 5) min at best.
    expect(tools).toMatchObject([
      { tool: 'wire_saw', unit: 'sq ft', quantity: 50, low: 2, high: 6.25 },
      { tool: 'core', quantity: 2, low: 70 / 60 },
    ]);
  });

  it('answers any list of cuts with finite figures, or refuses it by name', () => {
    const size = fc.double({ min: 0.3, max: 90, noNaN: true });
    const count = fc.integer({ min: 1, max: 10_000 });
    const cut: fc.Arbitrary<CutInput> = fc.oneof(
      fc.record({ kind: fc.constant('line' as const), lengthFt: size, depthIn: size, count }),
      fc.record({ kind: fc.constant('core' as const), diameterIn: size, depthIn: size, count }),
      fc.record({
        kind: fc.constant('wire' as const),
        areaSqFt: size,
        pilotCores: fc.integer({ min: 0, max: 9 }),
        pilotDiameterIn: size,
        depthIn: size,
        count,
      }),
      fc.record({ kind: fc.constant('block' as const), cutLengthIn: size, depthIn: size, count }),
      fc.record({ kind: fc.constant('pipe' as const), outsideDiameterIn: size, count }),
    );
    const place = { ...outside, indoors: true, below: 'unoccupied' } as const;
    let estimated = 0;
    fc.assert(
      fc.property(fc.array(cut, { maxLength: 5 }), (list) => {
        const input = job(
          list.map((one) => [one, methodsOfCutHere(cutSchema.parse(one), place)[0] ?? null] as const),
          { place },
        );
        try {
          const { hours, drums, waterGal } = estimateJob(input);
          estimated += 1;
          for (const { low, high } of [hours, drums, waterGal]) {
            expect(Number.isFinite(low) && Number.isFinite(high) && low <= high).toBe(true);
          }
        } catch (error) {
          expect(error).toBeInstanceOf(CuttingInputError);
        }
      }),
      { numRuns: 300 },
    );
    expect(estimated).toBeGreaterThan(20);
  });
});
