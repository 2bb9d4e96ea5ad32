import { describe, expect, it } from 'vitest';
import {
  bladeMounts,
  bladeReach,
  bladeReachIn,
  conduitKinds,
  conduitOutsideDiameterIn,
  conduitOutsideDiameters,
  constructionNoise,
  CuttingInputError,
  excavationRules,
  generalIndustryNoise,
  masonryWallWeights,
  minimumCoverIn,
  noiseExposure,
  silicaControls,
  silicaTable1,
  silicaTools,
  tradeSizes,
  unitWeights,
  type SilicaTool,
  type TradeSize,
} from './index.ts';

describe('29 CFR 1926.1153 Table 1, cell by cell', () => {
  // Out to 4 h, out over 4 h, in to 4 h, in over 4 h; null where the row does not cover the case.
  const cells: readonly (readonly [SilicaTool, readonly (number | null)[]])[] = [
    ['stationary_masonry_saw', [0, 0, 0, 0]],
    ['handheld_power_saw', [0, 10, 10, 10]],
    ['walk_behind_saw', [0, 0, 10, 10]],
    ['drivable_saw', [0, 0, null, null]],
    ['core_rig', [0, 0, 0, 0]],
    ['hand_drill', [0, 0, 0, 0]],
    ['dowel_rig', [10, 10, null, null]],
    ['jackhammer', [0, 10, 10, 10]],
    ['mortar_grinder', [10, 25, 10, 25]],
    ['wet_grinder', [0, 0, null, null]],
    ['shrouded_grinder', [0, 0, 0, 10]],
    ['floor_grinder', [0, 0, 0, 0]],
    ['demolition_machine', [0, 0, 0, 0]],
    ['wall_saw', [null, null, null, null]],
    ['wire_saw', [null, null, null, null]],
    ['chain_saw', [null, null, null, null]],
    ['ring_saw', [null, null, null, null]],
  ];

  it('has every tool', () => {
    expect(cells.map(([tool]) => tool)).toEqual([...silicaTools]);
  });

  it.each(cells)('%s', (tool, expected) => {
    const read = (['outdoors', 'indoors'] as const).flatMap((place) =>
      [4, 4.5].map((hours) => silicaControls([{ tool, place, hours }]).tasks[0]?.apf),
    );
    expect(read).toEqual(expected);
  });

  it('names a control for every tool, and exhaust for work indoors', () => {
    for (const tool of silicaTools) {
      const [task] = silicaControls([{ tool, place: 'indoors', hours: 1 }]).tasks;
      expect(task?.control, tool).not.toBe('');
      expect(task?.listed, tool).toBe(silicaTable1[tool] !== undefined);
    }
    expect(silicaControls([{ tool: 'jackhammer', place: 'indoors', hours: 1 }]).tasks[0]?.note).toContain(
      'exhaust',
    );
  });

  it('disagrees with a reprint that drops a row and gives other grinding the 10 and 25 of mortar removal', () => {
    const grinder = (hours: number) =>
      silicaControls([{ tool: 'shrouded_grinder', place: 'outdoors', hours }]).tasks[0]?.apf;
    expect([grinder(4), grinder(5)]).not.toEqual([10, 25]);
  });
});

describe('29 CFR 1926.52 Table D-2', () => {
  it.each([
    [90, 8],
    [92, 6],
    [95, 4],
    [97, 3],
    [100, 2],
    [102, 1.5],
    [105, 1],
    [110, 0.5],
    [115, 0.25],
  ])('%i dBA is allowed %d h', (dba, hours) => {
    expect(noiseExposure([{ dba, hours }]).constructionSum).toBeCloseTo(1, 12);
    expect(constructionNoise.rows.find((row) => row.dba === dba)?.hours).toBe(hours);
  });

  it('is a step table: a level between rows takes the next row up', () => {
    expect(noiseExposure([{ dba: 91, hours: 6 }]).constructionSum).toBeCloseTo(1, 12);
    expect(noiseExposure([{ dba: 112, hours: 0.25 }]).constructionSum).toBeCloseTo(1, 12);
  });

  it.each([
    [92, 6.063],
    [97, 3.031],
    [102, 1.516],
  ])('disagrees with the formula of 1910.95 at %i dBA, which gives %d h', (dba, formulaHours) => {
    expect(8 / 2 ** ((dba - 90) / 5)).toBeCloseTo(formulaHours, 3);
    expect(noiseExposure([{ dba, hours: formulaHours }]).constructionExceeded).toBe(true);
    expect(noiseExposure([{ dba, hours: formulaHours }]).dosePct).toBeCloseTo(100, 1);
  });

  it('ignores levels under 90 and is exceeded at once over 115', () => {
    expect(noiseExposure([{ dba: 89.9, hours: 24 }])).toMatchObject({
      constructionSum: 0,
      constructionExceeded: false,
    });
    expect(noiseExposure([{ dba: 115.1, hours: 0.01 }])).toMatchObject({
      constructionSum: null,
      constructionExceeded: true,
    });
    expect(noiseExposure([{ dba: 115.1, hours: 0 }]).constructionExceeded).toBe(false);
  });
});

describe('29 CFR 1910.95 Table G-16a, printed to two figures', () => {
  it.each([
    [80, 32],
    [85, 16],
    [88, 10.6],
    [90, 8],
    [92, 6.1],
    [95, 4],
    [97, 3],
    [98, 2.6],
    [100, 2],
    [102, 1.5],
    [103, 1.3],
    [105, 1],
    [107, 0.76],
    [108, 0.66],
    [110, 0.5],
    [112, 0.38],
    [115, 0.25],
    [120, 0.125],
  ])('%i dBA: %d h is a full dose', (dba, hours) => {
    const spans = Array.from({ length: 2 }, () => ({ dba, hours: hours / 2 }));
    expect(Math.abs(noiseExposure(spans).dosePct - 100)).toBeLessThan(2);
  });

  it('83 dBA allows 21.11 h by the formula, which older and newer pages print as 21.1 and 21.2', () => {
    expect(noiseExposure([{ dba: 83, hours: 21.11 }]).dosePct).toBeCloseTo(100, 1);
  });

  it('does not count levels under 80', () => {
    expect(noiseExposure([{ dba: 79.9, hours: 8 }])).toMatchObject({ dosePct: 0, twaDba: null });
    expect(generalIndustryNoise.thresholdDba).toBe(80);
  });

  // Table A-1, from memory: dose to eight-hour average.
  it.each([
    [10, 73.4],
    [25, 80],
    [50, 85],
    [75, 87.9],
    [100, 90],
    [125, 91.6],
    [150, 92.9],
    [200, 95],
    [300, 97.9],
    [400, 100],
  ])('a dose of %i %% is %d dBA', (dosePct, twaDba) => {
    const hours = (8 * dosePct) / 100;
    const spans = [
      { dba: 90, hours: Math.min(hours, 24) },
      { dba: 90, hours: Math.max(0, hours - 24) },
    ];
    expect(noiseExposure(spans).twaDba).toBeCloseTo(twaDba, 1);
  });

  // Computed from both publications' formulas.
  it('102 dBA 2 h and 88 dBA 6 h: 188.8 % and 94.58 dBA, by NIOSH 1,419.9 % and 96.52 dBA', () => {
    const noise = noiseExposure([
      { dba: 102, hours: 2 },
      { dba: 88, hours: 6 },
    ]);
    expect(noise.dosePct).toBeCloseTo(188.8, 1);
    expect(noise.twaDba).toBeCloseTo(94.58, 2);
    expect(noise.nioshDosePct).toBeCloseTo(1_419.9, 1);
    expect(noise.nioshTwaDba).toBeCloseTo(96.52, 2);
  });

  // NIOSH 98-126: each 3 dB halves the time.
  it.each([
    [85, 8],
    [88, 4],
    [91, 2],
    [94, 1],
    [97, 0.5],
    [100, 0.25],
    [103, 0.125],
    [106, 0.0625],
  ])('NIOSH: %i dBA for %d h is a full dose', (dba, hours) => {
    expect(noiseExposure([{ dba, hours }]).nioshDosePct).toBeCloseTo(100, 8);
  });
});

describe('conduit outside diameters (ASTM D1785, iron pipe size; EMT from memory)', () => {
  const pipe: Record<TradeSize, number> = {
    '1/2': 0.84,
    '3/4': 1.05,
    '1': 1.315,
    '1-1/4': 1.66,
    '1-1/2': 1.9,
    '2': 2.375,
    '2-1/2': 2.875,
    '3': 3.5,
    '3-1/2': 4,
    '4': 4.5,
    '5': 5.563,
    '6': 6.625,
  };
  const emt: Partial<Record<TradeSize, number>> = {
    '1/2': 0.706,
    '3/4': 0.922,
    '1': 1.163,
    '1-1/4': 1.51,
    '1-1/2': 1.74,
    '2': 2.197,
    '2-1/2': 2.875,
    '3': 3.5,
    '3-1/2': 4,
    '4': 4.5,
  };

  it.each(tradeSizes)('trade size %s', (tradeSize) => {
    expect(conduitOutsideDiameterIn({ kind: 'pvc', tradeSize })).toBe(pipe[tradeSize]);
    expect(conduitOutsideDiameterIn({ kind: 'rmc', tradeSize })).toBe(pipe[tradeSize]);
    const emtIn = emt[tradeSize];
    if (emtIn !== undefined) expect(conduitOutsideDiameterIn({ kind: 'emt', tradeSize })).toBe(emtIn);
    else expect(() => conduitOutsideDiameterIn({ kind: 'emt', tradeSize })).toThrow(CuttingInputError);
  });

  it('keeps its source by kind', () => {
    expect(conduitKinds.map((kind) => conduitOutsideDiameters[kind].source.certainty)).toEqual([
      'published',
      'published',
      'from memory',
    ]);
  });
});

describe('NEC Table 300.5 inside a raceway', () => {
  it('takes 4 in for the two low-power columns under a 4-in slab, and refuses bare cable under a building', () => {
    for (const wiring of ['branch_120v', 'control_30v'] as const) {
      expect(minimumCoverIn({ location: 'under_4in_slab_no_vehicles', wiring, inRaceway: true })).toBe(4);
    }
    expect(() => minimumCoverIn({ location: 'under_building', wiring: 'direct_burial' })).toThrow(
      expect.objectContaining({ field: 'inRaceway' }),
    );
  });
});

describe('29 CFR 1926.651, 652 and Appendix B', () => {
  it.each([
    [3.9, 'B', false, 'not_required_if_no_sign_of_cave_in'],
    [4, 'B', true, 'not_required_if_no_sign_of_cave_in'],
    [5, 'C', true, 'required'],
    [20, 'A', true, 'required'],
    [20.1, 'A', true, 'engineer_required'],
    [12, 'rock', true, 'not_required'],
  ] as const)('%d ft in %s', (depthFt, soil, ladderRequired, protectiveSystem) => {
    expect(excavationRules({ depthFt, soil })).toMatchObject({
      ladderRequired,
      protectiveSystem,
      spoilSetbackFt: 2,
    });
  });

  it.each([
    ['rock', 0, 90],
    ['A', 0.75, 53],
    ['B', 1, 45],
    ['C', 1.5, 34],
    ['unclassified', 1.5, 34],
  ] as const)('%s soil is cut back %d to 1, printed as %i°', (soil, run, degrees) => {
    const { slopeRunPerRise } = excavationRules({ depthFt: 8, soil });
    expect(slopeRunPerRise).toBe(run);
    expect(Math.round((Math.atan2(1, slopeRunPerRise) * 180) / Math.PI)).toBe(degrees);
  });

  it('disagrees with an exam page that prints ½ to 1 for type A and 2 to 1 for type C', () => {
    expect(excavationRules({ depthFt: 8, soil: 'A' }).slopeRunPerRise).not.toBe(0.5);
    expect(excavationRules({ depthFt: 8, soil: 'C' }).slopeRunPerRise).not.toBe(2);
  });
});

describe('weights', () => {
  it('has the unit weights, each with how sure it is', () => {
    const pcf = Object.fromEntries(unitWeights.map((row) => [row.material, [row.pcf, row.source.certainty]]));
    expect(pcf).toEqual({
      reinforced_concrete: [150, 'published'],
      plain_concrete: [144, 'from memory'],
      brick_hard: [130, 'from memory'],
      asphalt: [145, 'from memory'],
      steel: [490, 'from memory'],
    });
    expect(masonryWallWeights.map((row) => row.psf)).toEqual([36, 82]);
  });
});

describe('blade reach, common practice, no source', () => {
  const cells = {
    hand: { 9: 3.25, 12: 4, 14: 5, 16: 6 },
    walk_behind: { 14: 4.75, 18: 6.625, 20: 7.625, 24: 9.625, 26: 10.625, 30: 11.75, 36: 14.75, 42: 17.75 },
    wall: { 24: 9.5, 30: 12, 36: 15, 42: 18 },
  };

  it.each(bladeMounts)('%s', (mount) => {
    for (const [diameter, reachIn] of Object.entries(cells[mount])) {
      expect(bladeReachIn({ diameterIn: Number(diameter), mount })).toBe(reachIn);
    }
    expect(bladeReach.rows[mount]).toHaveLength(Object.keys(cells[mount]).length);
  });

  it('never reaches half the blade', () => {
    for (const row of bladeMounts.flatMap((mount) => bladeReach.rows[mount])) {
      expect(row.reachIn).toBeLessThan(row.diameterIn / 2);
    }
  });
});
