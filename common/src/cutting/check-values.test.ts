import { describe, expect, it } from 'vitest';
import {
  burialLocations,
  concreteOrderCuYd,
  coreWeightLb,
  earliestDigDate,
  handArmVibration,
  jointPlan,
  levelAtDistanceDba,
  lipTreatment,
  minimumCoverIn,
  noiseExposure,
  overcutIn,
  piecePlan,
  rpmForSurfaceSpeed,
  silicaControls,
  slabWeightLb,
  slingTension,
  slopedTrench,
  slurry,
  spoil,
  stitchHoles,
  surfaceSpeedSfm,
  takeoffCut,
  trenchPlan,
  wiringMethods,
  type SilicaTool,
} from './index.ts';

describe('values published elsewhere', () => {
  it('29 CFR 1926.1153(c)(3): a handheld saw 2 h and a jackhammer 2.5 h outdoors need APF 10 each, alone none', () => {
    const saw = { tool: 'handheld_power_saw', place: 'outdoors', hours: 2 } as const;
    const hammer = { tool: 'jackhammer', place: 'outdoors', hours: 2.5 } as const;
    const both = silicaControls([saw, hammer]);
    expect(both.combinedHours).toBe(4.5);
    expect(both.tasks.map((task) => task.apf)).toEqual([10, 10]);
    expect(silicaControls([saw]).tasks[0]?.apf).toBe(0);
    expect(silicaControls([hammer]).tasks[0]?.apf).toBe(0);
  });

  it('29 CFR 1926.52(d)(2)(iii), worked in the rule: 110 dBA ¼ h, 100 dBA ½ h, 90 dBA 1½ h', () => {
    const noise = noiseExposure([
      { dba: 110, hours: 0.25 },
      { dba: 100, hours: 0.5 },
      { dba: 90, hours: 1.5 },
    ]);
    // 0.25 / 0.5 + 0.5 / 2 + 1.5 / 8 = 0.5 + 0.25 + 0.1875
    expect(noise.constructionSum).toBeCloseTo(0.9375, 12);
    expect(noise.constructionExceeded).toBe(false);
  });

  it('a guide to 29 CFR 1910.95 Appendix A: 90 dBA 4 h, 95 dBA 2 h, 85 dBA 2 h', () => {
    const noise = noiseExposure([
      { dba: 90, hours: 4 },
      { dba: 95, hours: 2 },
      { dba: 85, hours: 2 },
    ]);
    // 100 × (4/8 + 2/4 + 2/16)
    expect(noise.dosePct).toBeCloseTo(112.5, 10);
    expect(noise.twaDba).toBeCloseTo(90.85, 2);
  });

  it('HSE hand-arm vibration ready-reckoner: 5 m/s² for 3 h is 150 points', () => {
    expect(handArmVibration([{ mps2: 5, hours: 3 }]).points).toBeCloseTo(150, 10);
  });

  it('EU guide to good practice on hand-arm vibration (from memory, recomputed): brush cutter and chain saw', () => {
    const day = handArmVibration([
      { mps2: 4, hours: 4.5 },
      { mps2: 6, hours: 1 },
    ]);
    expect(day.a8).toBeCloseTo(3.7, 1);
    expect(day.aboveActionValue).toBe(true);
    expect(day.aboveLimitValue).toBe(false);
  });

  it('NEC Table 300.5: all 35 cells', () => {
    const table: Record<(typeof burialLocations)[number], readonly number[]> = {
      general: [24, 6, 18, 12, 6],
      under_2in_concrete: [18, 6, 12, 6, 6],
      under_building: [0, 0, 0, 0, 0],
      under_4in_slab_no_vehicles: [18, 4, 4, 6, 6],
      under_roads_parking: [24, 24, 24, 24, 24],
      dwelling_driveway: [18, 18, 18, 12, 18],
      airport: [18, 18, 18, 18, 18],
    };
    for (const location of burialLocations) {
      const cells = wiringMethods.map((wiring) =>
        minimumCoverIn({ location, wiring, inRaceway: location === 'under_building' }),
      );
      expect(cells, location).toEqual(table[location]);
    }
  });

  it('NEC Table 300.5, worked: 2-in PVC under parking with 2 in of bedding is 28.375 in to dig', () => {
    // 24 cover + 2.375 outside diameter + 2 bedding
    const plan = trenchPlan({
      lengthFt: 100,
      widthIn: 24,
      slabThicknessIn: 6,
      location: 'under_roads_parking',
      wiring: 'nonmetallic',
      conduitKind: 'pvc',
      tradeSize: '2',
      beddingIn: 2,
      swellPct: 25,
    });
    expect(plan.digDepthIn).toBe(28.375);
  });

  it.each([
    [60, 577],
    [45, 707],
    [30, 1_000],
  ])('rigging handbooks: 1,000 lb on two legs at %i° is %i lb a leg', (angleDeg, published) => {
    const { perLegLb } = slingTension({ loadLb: 1_000, legs: 2, angleDeg });
    expect(Math.abs(perLegLb / published - 1)).toBeLessThan(0.003);
  });

  it('masonry press 2004, blade table to ANSI B7.1: 9 in at 4,032 rpm is 9,500 SFM, 14 in at 9,500 SFM is 2,592 rpm', () => {
    expect(surfaceSpeedSfm({ diameterIn: 9, rpm: 4_032 })).toBeCloseTo(9_500, -1);
    expect(rpmForSurfaceSpeed({ diameterIn: 14, sfm: 9_500 })).toBeCloseTo(2_592, 0);
  });

  it('urban search-and-rescue field guide: 8 × 8 ft of 6-in concrete is 4,800 lb; 6 in is 75 psf', () => {
    expect(slabWeightLb({ lengthFt: 8, widthFt: 8, thicknessIn: 6 })).toBe(4_800);
    expect(slabWeightLb({ lengthFt: 1, widthFt: 1, thicknessIn: 6 })).toBe(75);
  });

  it('concrete trade press, a real lift: 6 × 10 ft × 13 in behind 123 stitched holes lifted at 8,500 lb', () => {
    const grossLb = slabWeightLb({ lengthFt: 6, widthFt: 10, thicknessIn: 13 });
    expect(grossLb).toBe(9_750);
    expect(8_500).toBeLessThan(grossLb);
    const perimeterIn = 2 * (72 + 120);
    const run = stitchHoles({
      lengthIn: perimeterIn,
      bitDiameterIn: 3.25,
      overlapIn: 0.13,
      closed: true,
      depthIn: 13,
    });
    expect(run.holes).toBe(123);
  });

  it('ACI 302.1R: a 4-in slab is jointed at 8 to 12 ft, 1 in deep; a 6-in slab 1.5 in deep', () => {
    const slab = { lengthFt: 60, widthFt: 40, capFt: 18 };
    expect(jointPlan({ ...slab, thicknessIn: 4, spacingFactor: 24 }).maxSpacingFt).toBe(8);
    expect(jointPlan({ ...slab, thicknessIn: 4, spacingFactor: 36 }).maxSpacingFt).toBe(12);
    expect(jointPlan({ ...slab, thicknessIn: 4 }).depthIn).toBe(1);
    expect(jointPlan({ ...slab, thicknessIn: 6 }).depthIn).toBe(1.5);
  });

  it('joint arithmetic: 120 × 80 ft at 15 ft is 1,160 ft, 60 × 40 ft at 12 ft is 340 ft', () => {
    // 8 × 6 panels: 7 × 80 + 5 × 120; 5 × 4 panels: 4 × 40 + 3 × 60
    expect(jointPlan({ lengthFt: 120, widthFt: 80, thicknessIn: 6, spacingFactor: 30 }).sawFt).toBe(1_160);
    expect(jointPlan({ lengthFt: 60, widthFt: 40, thicknessIn: 4, spacingFactor: 36 }).sawFt).toBe(340);
  });

  it("a concrete supplier's worked slab: 16 × 20 ft × 4 in is 3.95 cu yd; with 5 % order 4.25", () => {
    const cuYd = (16 * 20 * (4 / 12)) / 27;
    expect(spoil({ cuFt: cuYd * 27 }).bankCuYd).toBeCloseTo(3.95, 2);
    expect(concreteOrderCuYd({ cuYd, wastePct: 5 })).toBe(4.25);
  });

  it('estimating textbook: 1,000 bank cu yd at 30 % swell is 1,300 loose', () => {
    expect(spoil({ cuFt: 27_000, bulking: 1.3 }).looseCuYd).toBeCloseTo(1_300, 8);
  });

  it.each([
    ['A', 15, 72],
    ['B', 19, 88],
    ['C', 27, 120],
  ] as const)(
    '29 CFR 1926 Appendix B, B-1: 3 ft bottom 8 ft deep in %s soil',
    (soil, topWidthFt, areaSqFt) => {
      expect(slopedTrench({ bottomWidthFt: 3, depthFt: 8, soil })).toMatchObject({ topWidthFt, areaSqFt });
    },
  );

  it('ADA Standards 303 and 405.2: ¼ in none, ½ in a bevel, 1 in a ramp 12 in long', () => {
    expect(lipTreatment({ heightIn: 0.25 })).toEqual({ treatment: 'none', cutLengthIn: 0 });
    expect(lipTreatment({ heightIn: 0.5 })).toEqual({ treatment: 'bevel', cutLengthIn: 1 });
    expect(lipTreatment({ heightIn: 1 })).toEqual({ treatment: 'ramp', cutLengthIn: 12 });
  });

  it('a city noise exhibit, inverse square: 92 dBA at 50 ft is 86 at 100 and 80 at 200', () => {
    const at = (distanceFt: number) => levelAtDistanceDba({ levelDba: 92, referenceFt: 50, distanceFt });
    expect(at(100)).toBeCloseTo(86, 1);
    expect(at(200)).toBeCloseTo(80, 1);
    // The same exhibit goes on to 300 ft.
    expect(Math.round(at(300))).toBe(76);
  });

  it('a state one-call centre, worked example: notice on Wednesday, two full business days, dig on Saturday', () => {
    // 2026-12-02 is a Wednesday.
    expect(earliestDigDate({ notifiedOn: '2026-12-02', fullBusinessDays: 2, holidays: [] })).toBe(
      '2026-12-05',
    );
  });
});

describe('common practice, no source', () => {
  it('a trench of 40 × 2 ft, 6 in, in 4-ft pieces is 102 ft and 612 in-ft', () => {
    const takeoff = takeoffCut({
      kind: 'trench',
      lengthFt: 40,
      widthFt: 2,
      thicknessIn: 6,
      endCuts: 2,
      count: 1,
      removal: { densityPcf: 150, maxPieceLb: 5_000, maxSideFt: 4 },
    });
    // 2 × 40 + 2 × 2 + 9 × 2
    expect(takeoff).toMatchObject({ sawFt: 102, inchFeet: 612, crossCutFt: 18 });
  });

  it('an 8-in wall with a 24-in blade 1 in through overcuts 6.8 in', () => {
    expect(overcutIn({ bladeDiameterIn: 24, thicknessIn: 8, passThroughIn: 1 })).toBeCloseTo(6.8, 1);
  });

  it('4 × 8 ft × 8 in with 10 % in pieces to 1,000 lb takes 12 ft of cross cut', () => {
    const plan = piecePlan({ lengthFt: 4, widthFt: 8, thicknessIn: 8, allowancePct: 10, maxPieceLb: 1_000 });
    expect(plan.crossCutFt).toBe(12);
  });

  it('612 in-ft with a 0.2-in kerf and 3 gpm for 91.8 minutes is 282 gal of slurry in 6 drums', () => {
    const job = slurry({ inchFeet: 612, kerfIn: 0.2, gallonsPerMinute: 3, minutes: 91.8 });
    expect(Math.round(job.slurryGal)).toBe(282);
    expect(job.drums).toBe(6);
  });

  it('a 12-in core 10 in long weighs 98 lb', () => {
    expect(Math.round(coreWeightLb({ diameterIn: 12, lengthIn: 10 }))).toBe(98);
  });
});

describe('silica worked cases, by applying 29 CFR 1926.1153 Table 1', () => {
  const apf = (tool: SilicaTool, place: 'outdoors' | 'indoors', hours: number) =>
    silicaControls([{ tool, place, hours }]).tasks[0]?.apf;

  it.each([
    ['handheld_power_saw', 'outdoors', 3.5, 0],
    ['handheld_power_saw', 'outdoors', 4, 0],
    ['handheld_power_saw', 'outdoors', 4.01, 10],
    ['handheld_power_saw', 'indoors', 0.5, 10],
    ['shrouded_grinder', 'indoors', 5, 10],
    ['shrouded_grinder', 'indoors', 3, 0],
    ['drivable_saw', 'indoors', 1, null],
    ['core_rig', 'indoors', 10, 0],
  ] as const)('%s %s for %d h', (tool, place, hours, expected) => {
    expect(apf(tool, place, hours)).toBe(expected);
  });

  it('a walk-behind saw 2 h and a jackhammer 2.5 h indoors need APF 10 both', () => {
    const shift = silicaControls([
      { tool: 'walk_behind_saw', place: 'indoors', hours: 2 },
      { tool: 'jackhammer', place: 'indoors', hours: 2.5 },
    ]);
    expect(shift.tasks.map((task) => task.apf)).toEqual([10, 10]);
  });

  it('hours of a tool the table does not name do not push a listed one over four hours', () => {
    const shift = silicaControls([
      { tool: 'handheld_power_saw', place: 'outdoors', hours: 3 },
      { tool: 'wall_saw', place: 'outdoors', hours: 6 },
    ]);
    expect(shift.combinedHours).toBe(3);
    expect(shift.tasks[0]?.apf).toBe(0);
    expect(shift.tasks[1]).toMatchObject({
      listed: false,
      apf: null,
      note: 'not in Table 1: 1926.1153(d), air or objective data',
    });
  });
});
