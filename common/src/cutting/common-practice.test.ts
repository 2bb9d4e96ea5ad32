import { describe, expect, it } from 'vitest';
import {
  batteryPacks,
  bladeReachIn,
  bladeReachWithSource,
  commonFactorsPct,
  commonKerfIn,
  coringHours,
  CuttingInputError,
  explain,
  generatorKw,
  passPlan,
  priceCuts,
  productionRates,
  sawingHours,
  sawsForWindow,
  standbyFreeMinutes,
  surfaceSpeedSfm,
  toolWear,
  trenchPlan,
  usualRimSpeedLimitSfm,
  waterGallonsPerMinute,
  workPerBatteryPack,
} from './index.ts';

// Every value of this file is common practice, no source.

it('a 9-in blade held by hand cuts to 3¼ in and gets there in four passes', () => {
  expect(bladeReachIn({ diameterIn: 9, mount: 'hand' })).toBe(3.25);
  expect(passPlan({ depthIn: 3.25, scoreIn: 0.5, maxPassIn: 1.25 }).depthsIn).toHaveLength(4);
});

it.each([
  [12, 20_000],
  [25, 25_000],
])('%i ft at about $10 a foot with a $200 minimum', (feet, totalCents) => {
  const price = priceCuts({
    lines: [{ id: 'a', trip: 1, quantity: feet * 100, unit: 'ft', rate: 100_000, factors: [] }],
    extras: [],
    minimumCents: 20_000,
    mobilizationCents: 0,
  });
  expect(price.totalCents).toBe(totalCents);
});

it('one large cordless pack scores 25 in-ft, halves 30 blocks, or cuts 80 bars', () => {
  const { inchFeet, blocks, bars } = workPerBatteryPack.rows;
  expect(batteryPacks({ inchFeet: 60, inchFeetPerPack: inchFeet })).toBe(3);
  expect(batteryPacks({ units: 45, unitsPerPack: blocks })).toBe(2);
  expect(batteryPacks({ units: 81, unitsPerPack: bars })).toBe(2);
  expect(batteryPacks({ units: 80, unitsPerPack: bars })).toBe(1);
});

describe('cover counted from the underside of the slab', () => {
  const trench = {
    lengthFt: 20,
    widthIn: 12,
    slabThicknessIn: 4,
    wiring: 'nonmetallic',
    conduitKind: 'pvc',
    tradeSize: '1',
    beddingIn: 0,
    swellPct: 25,
  } as const;

  it('a 4-in slab without vehicles needs 4 in of cover, which many crews take below the slab', () => {
    const location = 'under_4in_slab_no_vehicles';
    // From the surface the slab itself is the cover: 4 + 1.315; from the underside 4 + 4 + 1.315.
    expect(trenchPlan({ ...trench, location }).digDepthIn).toBeCloseTo(5.315, 12);
    const cautious = trenchPlan({ ...trench, location, coverFrom: 'underside_of_slab' });
    expect(cautious.coverIn).toBe(4);
    expect(cautious.digDepthIn).toBeCloseTo(9.315, 12);
    expect(cautious.cautions.join(' ')).toContain('6 in beyond');
  });

  it('a slab thicker than the cover decides the depth: the conduit lies under it', () => {
    // 6 in of cover, 8 in of slab: 8 + 1.315 + 3
    const plan = trenchPlan({
      ...trench,
      wiring: 'rmc_imc',
      slabThicknessIn: 8,
      beddingIn: 3,
      location: 'general',
    });
    expect(plan.coverIn).toBe(6);
    expect(plan.digDepthIn).toBeCloseTo(12.315, 12);
    expect(plan.soilDepthIn).toBeCloseTo(4.315, 12);
  });

  it('under 2 in of concrete it is 12 in', () => {
    expect(trenchPlan({ ...trench, slabThicknessIn: 2, location: 'under_2in_concrete' }).coverIn).toBe(12);
  });
});

it('a 9-in wheel at 6,500 rpm runs at 15,315 SFM, under the usual 16,000 limit', () => {
  const sfm = surfaceSpeedSfm({ diameterIn: 9, rpm: 6_500 });
  expect(Math.round(sfm)).toBe(15_315);
  expect(sfm).toBeLessThan(usualRimSpeedLimitSfm.rows);
});

describe('a company’s own numbers', () => {
  it('replace a common reach and say whose they are', () => {
    const companyReach = {
      wall: [
        { diameterIn: 30, reachIn: 11.5 },
        { diameterIn: 32, reachIn: 12.5 },
      ],
    };
    const own = bladeReachWithSource({ diameterIn: 30, mount: 'wall', companyReach });
    expect(own).toEqual({ reachIn: 11.5, source: { origin: 'company' } });
    expect(bladeReachIn({ diameterIn: 32, mount: 'wall', companyReach })).toBe(12.5);
    expect(bladeReachWithSource({ diameterIn: 36, mount: 'wall', companyReach }).source.origin).toBe(
      'common practice',
    );
    expect(explain.bladeReachIn({ diameterIn: 30, mount: 'wall', companyReach }).source.origin).toBe(
      'company',
    );
  });

  it('an unknown diameter is refused with the ones there are', () => {
    expect(() => bladeReachIn({ diameterIn: 13, mount: 'hand' })).toThrow('one of 9, 12, 14, 16 in');
  });

  it('replace a common production rate and say whose they are', () => {
    const common = sawingHours({ method: 'flat_saw', quantity: 1_200 });
    expect([common.lowHours, common.highHours]).toEqual([2, 4]);
    expect(common.working[0]?.source.origin).toBe('common practice');
    const own = sawingHours({ method: 'flat_saw', quantity: 1_200, companyPerHour: 500 });
    expect([own.lowHours, own.highHours]).toEqual([2.4, 2.4]);
    expect(own.working[0]?.source.origin).toBe('company');
  });
});

describe('production', () => {
  it('has the rates', () => {
    const ranges = Object.fromEntries(
      Object.entries(productionRates.rows).map(([method, rate]) => [
        method,
        [rate.lowPerHour, rate.highPerHour],
      ]),
    );
    expect(ranges).toEqual({
      flat_saw: [300, 600],
      flat_saw_electric: [150, 400],
      wall_saw: [60, 200],
      hand_saw: [30, 80],
      ring_saw: [30, 60],
      chain_saw: [20, 50],
      wire_saw: [8, 25],
      joint_saw: [150, 400],
    });
  });

  it('cores: 10 of 3 in, 6 in deep, 6 min drilling and 5 to 15 min setting up each', () => {
    const hours = coringHours({ holes: 10, diameterIn: 3, depthIn: 6 });
    expect(hours.lowHours).toBeCloseTo(110 / 60, 12);
    expect(hours.highHours).toBeCloseTo(210 / 60, 12);
  });

  it.each([
    [3, 1],
    [4, 0.8],
    [6, 0.8],
    [8, 0.5],
    [12, 0.5],
  ])('a %i-in bit feeds %d in a minute', (diameterIn, inchesPerMinute) => {
    const hours = coringHours({ holes: 60, diameterIn, depthIn: 12, companySetUpMinutes: 0 });
    expect(hours.lowHours).toBeCloseTo(12 / inchesPerMinute, 10);
  });

  it('asks for the company’s feed where there is no common one', () => {
    expect(() => coringHours({ holes: 1, diameterIn: 14, depthIn: 8 })).toThrow(CuttingInputError);
    expect(
      coringHours({
        holes: 1,
        diameterIn: 14,
        depthIn: 6,
        companyInchesPerMinute: 0.3,
        companySetUpMinutes: 40,
      }),
    ).toMatchObject({ lowHours: 1, highHours: 1 });
  });

  it('wears out blades by the company’s life and price', () => {
    expect(toolWear({ quantity: 612, quantityPerTool: 4_000, toolCents: 60_000 })).toMatchObject({
      tools: 0.153,
      cents: 9_180,
    });
  });

  it('keeps the other habits as data', () => {
    expect(waterGallonsPerMinute.rows).toEqual({ flat: 3, wall: 2, hand: 0.3, core: 1 });
    expect(commonKerfIn.rows).toBe(0.2);
    expect(standbyFreeMinutes.rows).toBe(30);
    expect(commonFactorsPct.rows).toEqual({ heavy_bar: 150, overhead: 175, finished_space: 140, night: 130 });
  });
});

it('joints: 1,160 ft at 290 ft an hour in a 4-hour window take one saw, a foot more two', () => {
  expect(sawsForWindow({ sawFt: 1_160, feetPerHour: 290, windowHours: 4 })).toBe(1);
  expect(sawsForWindow({ sawFt: 1_161, feetPerHour: 290, windowHours: 4 })).toBe(2);
});

it('generators carry the running load at 80 %, or the start', () => {
  // 480 V × 30 A × √3 / 1000 = 24.94 kW running
  const saw = { volts: 480, amps: 30, phases: 3 } as const;
  expect(generatorKw(saw)).toBeCloseTo(31.18, 2);
  expect(generatorKw({ ...saw, startFactor: 2 })).toBeCloseTo(49.88, 2);
  expect(generatorKw({ volts: 120, amps: 15, phases: 1, loadFraction: 1 })).toBeCloseTo(1.8, 12);
});
