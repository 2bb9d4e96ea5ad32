import { describe, expect, it } from 'vitest';
import {
  concreteOrderCuYd,
  coreWeightLb,
  excavationRules,
  handArmVibration,
  jointPlan,
  lipTreatment,
  overcutIn,
  slabWeightLb,
  slingTension,
  slurry,
  spoil,
  stitchHoles,
  surfaceSpeedSfm,
  trenchPlan,
} from './index.ts';

describe('rigging', () => {
  // A sling maker's table, last digits cut off, so to 0.002.
  it.each([
    [90, 1],
    [85, 1.004],
    [80, 1.015],
    [75, 1.035],
    [70, 1.064],
    [65, 1.104],
    [60, 1.155],
    [55, 1.221],
    [50, 1.305],
    [45, 1.414],
    [40, 1.555],
    [35, 1.742],
    [30, 2],
  ])('the factor at %i° is %d', (angleDeg, factor) => {
    expect(Math.abs(slingTension({ loadLb: 100, legs: 2, angleDeg }).factor - factor)).toBeLessThan(0.002);
  });

  it('flags an angle under 30° (ASME B30.9, from memory)', () => {
    expect(slingTension({ loadLb: 100, legs: 2, angleDeg: 29.9 }).belowMinimumAngle).toBe(true);
    expect(slingTension({ loadLb: 100, legs: 2, angleDeg: 30 }).belowMinimumAngle).toBe(false);
  });

  it('counts four legs as two unless the rigging equalizes them', () => {
    const lift = { loadLb: 3_200, legs: 4, angleDeg: 60 };
    expect(slingTension(lift).perLegLb).toBeCloseTo(1_847.5, 1);
    expect(slingTension({ ...lift, equalized: true }).perLegLb).toBeCloseTo(923.8, 1);
  });
});

describe('weights', () => {
  // A safety office: 2 × 2 × 4 ft at 150.
  it('a block of 16 cu ft is 2,400 lb', () => {
    expect(slabWeightLb({ lengthFt: 2, widthFt: 4, thicknessIn: 24 })).toBe(2_400);
  });

  // 0.7854 (D/12)² 150, pounds per foot.
  it.each([
    [2, 3.27],
    [3, 7.36],
    [4, 13.09],
    [5, 20.45],
    [6, 29.45],
    [8, 52.36],
    [10, 81.81],
    [12, 117.81],
    [14, 160.35],
    [16, 209.44],
    [18, 265.07],
    [20, 327.25],
    [24, 471.24],
    [30, 736.31],
    [36, 1_060.29],
  ])('a %i-in core weighs %d lb a foot', (diameterIn, lbPerFt) => {
    expect(coreWeightLb({ diameterIn, lengthIn: 12 })).toBeCloseTo(lbPerFt, 1);
  });

  it('is not the rescue shortcut of 0.8 D² L, which is 1.9 % heavier', () => {
    const exactLb = coreWeightLb({ diameterIn: 12, lengthIn: 12 });
    expect(exactLb).not.toBeCloseTo(0.8 * 150, 0);
    expect((0.8 * 150) / exactLb).toBeCloseTo(1.019, 3);
  });

  // The same published lift, holes out: 8,599 lb by calculation against 8,500 lifted.
  it('the stitched piece less its 123 holes is within 1.2 % of the weight lifted', () => {
    const holesLb = 123 * coreWeightLb({ diameterIn: 3.25, lengthIn: 13 });
    // Of each perimeter hole the piece loses about half; the published check takes the whole hole off.
    const netLb = slabWeightLb({ lengthFt: 6, widthFt: 10, thicknessIn: 13 }) - holesLb;
    expect(Math.abs(netLb / 8_500 - 1)).toBeLessThan(0.012);
  });
});

describe('stitching, ⌈P ÷ (Ø − overlap)⌉', () => {
  it.each([
    [168, 4, 0.5, 48],
    [168, 4, 1, 56],
    [168, 6, 1, 34],
  ])(
    '%i in around with a %i-in bit lapping %d in is %i holes',
    (lengthIn, bitDiameterIn, overlapIn, holes) => {
      expect(stitchHoles({ lengthIn, bitDiameterIn, overlapIn, closed: true, depthIn: 8 }).holes).toBe(holes);
    },
  );

  it('an open run has one hole more than gaps and its cusp is R − √(R² − (pitch/2)²)', () => {
    const run = stitchHoles({ lengthIn: 24, bitDiameterIn: 4, overlapIn: 1, closed: false, depthIn: 10 });
    // (24 − 4) / 3 = 6.67 → 7 gaps, 8 holes, 20/7 in apart
    expect(run.holes).toBe(8);
    expect(run.pitchIn).toBeCloseTo(20 / 7, 12);
    expect(run.coreInches).toBe(80);
    expect(run.cuspIn).toBeCloseTo(2 - Math.sqrt(4 - (10 / 7) ** 2), 12);
  });

  it('a run of one bit is one hole, and touching holes never part', () => {
    expect(
      stitchHoles({ lengthIn: 4, bitDiameterIn: 4, overlapIn: 1, closed: false, depthIn: 10 }),
    ).toMatchObject({
      holes: 1,
      pitchIn: 0,
      cuspIn: 0,
    });
    expect(
      stitchHoles({ lengthIn: 48.01, bitDiameterIn: 4, overlapIn: 0, closed: true, depthIn: 1 }).holes,
    ).toBe(13);
  });
});

describe('overcut, the half-chord difference', () => {
  // Ø, thickness, plunge (thickness + pass-through), overcut; computed from the chord formula.
  it.each([
    [14, 4, 4, 6.32],
    [14, 4, 4.75, 3.48],
    [20, 6, 6, 9.17],
    [20, 6, 7.625, 4.25],
    [26, 8, 8, 12],
    [26, 8, 10.625, 4.95],
    [30, 10, 10, 14.14],
    [30, 10, 12, 7.21],
    [36, 12, 12, 16.97],
    [36, 12, 15, 7.8],
    [42, 12, 18, 6.09],
  ])('Ø %i in, %i in thick, plunged %d in: %d in', (bladeDiameterIn, thicknessIn, plungeIn, expected) => {
    expect(overcutIn({ bladeDiameterIn, thicknessIn, passThroughIn: plungeIn - thicknessIn })).toBeCloseTo(
      expected,
      2,
    );
  });
});

describe('rim speed, masonry press 2004 (operating rpm all at 9,500 SFM)', () => {
  it.each([
    [4, 9_072],
    [4.5, 8_063],
    [5, 7_257],
    [6, 6_048],
    [7, 5_184],
    [8, 4_536],
    [9, 4_032],
  ])('%d in at %i rpm', (diameterIn, rpm) => {
    expect(Math.abs(surfaceSpeedSfm({ diameterIn, rpm }) - 9_500)).toBeLessThan(2);
  });
});

describe('hand-arm vibration points, 2a²T', () => {
  it.each([
    [2.5, 8, 100],
    [3, 1, 18],
    [4, 2, 64],
    [5, 8, 400],
    [6, 0.5, 36],
    [7, 3, 294],
    [8, 1, 128],
    [10, 0.25, 50],
    [12, 0.5, 144],
    [15, 2, 900],
    [20, 10, 8_000],
  ])('%d m/s² for %d h is %d points', (mps2, hours, points) => {
    expect(handArmVibration([{ mps2, hours }]).points).toBeCloseTo(points, 9);
  });

  // EU guide, from memory, recomputed: angle grinder, angle cutter, chipping hammer.
  it('4 m/s² 2.5 h, 3 m/s² 1 h and 20 m/s² 15 min are 298 points and 4.3 m/s²', () => {
    const day = handArmVibration([
      { mps2: 4, hours: 2.5 },
      { mps2: 3, hours: 1 },
      { mps2: 20, hours: 0.25 },
    ]);
    expect(day.points).toBeCloseTo(298, 9);
    expect(day.a8).toBeCloseTo(4.3, 1);
  });

  it('100 points is the action value and 400 the limit; only above is above', () => {
    expect(handArmVibration([{ mps2: 2.5, hours: 8 }])).toMatchObject({ a8: 2.5, aboveActionValue: false });
    expect(handArmVibration([{ mps2: 5, hours: 8 }])).toMatchObject({ a8: 5, aboveLimitValue: false });
    expect(handArmVibration([{ mps2: 5.01, hours: 8 }]).aboveLimitValue).toBe(true);
  });
});

describe('joints', () => {
  // PCA Concrete Floors on Ground, 2nd edition: 24, 30 and 36 thicknesses; caps go on after the factor.
  it.each([
    [4, 8, 10, 12],
    [6, 12, 15, 15],
    [8, 15, 15, 15],
    [10, 15, 15, 15],
  ])('a %i-in slab is jointed at %i, %i and %i ft under the 15-ft cap', (thicknessIn, ...spacings) => {
    const read = [24, 30, 36].map(
      (spacingFactor) => jointPlan({ lengthFt: 60, widthFt: 60, thicknessIn, spacingFactor }).maxSpacingFt,
    );
    expect(read).toEqual(spacings);
  });

  // The table prints 16 to 30 ft for thick slabs, over both published caps.
  it('disagrees with uncapped table cells', () => {
    expect(
      jointPlan({ lengthFt: 60, widthFt: 60, thicknessIn: 10, spacingFactor: 36 }).maxSpacingFt,
    ).not.toBe(30);
    expect(
      jointPlan({ lengthFt: 60, widthFt: 60, thicknessIn: 10, spacingFactor: 36, capFt: 18 }).maxSpacingFt,
    ).toBe(18);
  });

  // A continuing-education course on thin overlays: 60 ft of 24-ft pavement, interior joints only.
  it('6-ft and 4-ft panels need about two and a half and four times the sawing of 12-ft ones', () => {
    const sawFt = (capFt: number) => jointPlan({ lengthFt: 60, widthFt: 24, thicknessIn: 6, capFt }).sawFt;
    expect([sawFt(12), sawFt(6), sawFt(4)]).toEqual([156, 396, 636]);
    expect(sawFt(6) / sawFt(12)).toBeCloseTo(2.54, 2);
    expect(sawFt(4) / sawFt(12)).toBeCloseTo(4.08, 2);
  });

  it('100 × 50 ft at 10 ft is 850 ft', () => {
    expect(jointPlan({ lengthFt: 100, widthFt: 50, thicknessIn: 4, spacingFactor: 30 }).sawFt).toBe(850);
  });

  it('early entry ends at 9 in', () => {
    const depth = (thicknessIn: number) =>
      jointPlan({ lengthFt: 60, widthFt: 40, thicknessIn }).earlyEntryDepthIn;
    expect([depth(4), depth(9), depth(9.1)]).toEqual([1, 1, null]);
  });
});

describe('slurry solids, kerf × depth × length', () => {
  it.each([
    [600, 0.165, 0.6875, 5.14, 103],
    [1_600, 0.187, 2.078, 15.5, 312],
    [6_000, 0.25, 10.42, 77.9, 1_563],
  ])('%i in-ft with a %d-in kerf', (inchFeet, kerfIn, cuFt, gal, lb) => {
    const dry = slurry({ inchFeet, kerfIn, gallonsPerMinute: 0, minutes: 0 });
    expect(dry.solidsCuIn / 1_728).toBeCloseTo(cuFt, 2);
    expect(dry.slurryGal).toBeCloseTo(gal, 1);
    expect(Math.round(dry.weightLb)).toBe(lb);
  });
});

describe('swell and patch', () => {
  it('a public bulking page: 8,000 cu ft at 40 % is 414 loose cu yd', () => {
    expect(Math.floor(spoil({ cuFt: 8_000, bulking: 1.4 }).looseCuYd)).toBe(414);
  });

  it('200 bank cu yd at 40 % is 280', () => {
    expect(spoil({ cuFt: 5_400, bulking: 1.4 }).looseCuYd).toBeCloseTo(280, 9);
  });

  it('a worked slab of 12 × 10 ft × 4 in: 1.48 cu yd, with 10 % order 1.75', () => {
    expect(spoil({ cuFt: 40 }).bankCuYd).toBeCloseTo(1.48, 2);
    expect(concreteOrderCuYd({ cuYd: 40 / 27, wastePct: 10 })).toBe(1.75);
  });

  it('disagrees with a supplier who rounds 4 in up to 0.34 ft and prints 1.52 cu yd for 4 × 30 ft', () => {
    expect(spoil({ cuFt: (4 * 30 * 4) / 12 }).bankCuYd).toBeCloseTo(1.48, 2);
    expect(spoil({ cuFt: (4 * 30 * 4) / 12 }).bankCuYd).not.toBeCloseTo(1.52, 2);
  });

  // 100 × 2 ft, 6-in slab, 36 in deep in all: concrete 3.70 cu yd and 7.5 tons, soil 18.52 and 23.15 at 25 %.
  it('a whole trench adds up', () => {
    const plan = trenchPlan({
      lengthFt: 100,
      widthIn: 24,
      slabThicknessIn: 6,
      location: 'under_roads_parking',
      wiring: 'rmc_imc',
      conduitKind: 'rmc',
      tradeSize: '2',
      beddingIn: 36 - 24 - 2.375,
      swellPct: 25,
    });
    expect(plan.digDepthIn).toBe(36);
    expect(plan.sawFt).toBe(204);
    expect(plan.inchFeet).toBe(1_224);
    expect(plan.patchCuYd).toBeCloseTo(3.7, 2);
    expect(plan.concreteTons).toBe(7.5);
    expect(plan.soilBankCuYd).toBeCloseTo(18.52, 2);
    expect(plan.soilLooseCuYd).toBeCloseTo(23.15, 2);
    expect(plan.patchOrderCuYd).toBe(4.25);
    expect(plan.excavation).toMatchObject(excavationRules({ depthFt: 3, soil: 'unclassified' }));
    expect(plan.cautions.join(' ')).toContain('never type A');
  });
});

describe('ADA Standards 303 and 405', () => {
  it.each([
    [0.2, 12, 'none', 0],
    [0.375, 12, 'bevel', 0.75],
    [0.75, 8, 'ramp', 6],
    [0.75, 12, 'ramp', 9],
    [0.75, 20, 'ramp', 15],
    [1.5, 12, 'ramp', 18],
    [2, 20, 'ramp', 40],
  ] as const)('%d in at 1:%i', (heightIn, runPerRise, treatment, cutLengthIn) => {
    expect(lipTreatment({ heightIn, runPerRise })).toEqual({ treatment, cutLengthIn });
  });
});
