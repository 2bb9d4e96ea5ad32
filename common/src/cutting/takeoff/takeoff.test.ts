import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { anyCut } from '../../../test/any-cut.ts';
import {
  inchFeet,
  jointPlan,
  takeoffCut,
  takeoffCutList,
  type Cut,
  type CutQuantities,
  type OpeningCut,
} from '../index.ts';

const wall: OpeningCut = {
  kind: 'opening',
  lengthFt: 3,
  widthFt: 7,
  thicknessIn: 8,
  corners: 'overcut',
  bladeDiameterIn: 24,
  passThroughIn: 1,
  count: 1,
};
// √(2·12·9 − 81) − √(2·12·1 − 1)
const overcutIn = Math.sqrt(135) - Math.sqrt(23);

describe('an opening', () => {
  it('cut all round has eight overcut ends', () => {
    expect(takeoffCut(wall)).toMatchObject({ sawFt: 20, inchFeet: 160, coreHoles: 0 });
    expect(takeoffCut(wall).overcutFt).toBeCloseTo((8 * overcutIn) / 12, 12);
  });

  it('as a door cut to the floor has four, none at its sill', () => {
    const door = takeoffCut({ ...wall, uncutSides: ['bottom'] });
    expect(door.sawFt).toBe(17);
    expect(door.overcutFt).toBeCloseTo((4 * overcutIn) / 12, 12);
  });

  it('as two parallel cuts has none', () => {
    expect(takeoffCut({ ...wall, uncutSides: ['left', 'right'] })).toMatchObject({ sawFt: 6, overcutFt: 0 });
    expect(takeoffCut({ ...wall, uncutSides: ['top', 'bottom', 'left', 'right'] }).sawFt).toBe(0);
  });

  it('with cored corners has a core a corner, twice the overcut wide, and no overcut', () => {
    const cored = takeoffCut({ ...wall, corners: 'cored', count: 2 });
    expect(cored).toMatchObject({ overcutFt: 0, coreHoles: 8, coreInches: 64, sawFt: 40 });
    expect(cored.cores[0]?.diameterIn).toBeCloseTo(2 * overcutIn, 12);
  });

  it('finished square has neither', () => {
    expect(takeoffCut({ ...wall, corners: 'square' })).toMatchObject({ overcutFt: 0, coreHoles: 0 });
  });

  it('without a blade leaves overcuts out and says so; without a pass-through takes the longest', () => {
    const unnamed = takeoffCut({ ...wall, bladeDiameterIn: undefined });
    expect(unnamed.overcutFt).toBe(0);
    expect(unnamed.cautions.join()).toContain('no blade');
    const cored = takeoffCut({ ...wall, bladeDiameterIn: undefined, corners: 'cored' });
    expect(cored.cores).toEqual([{ diameterIn: null, holes: 4, coreInches: 32 }]);
    const flush = takeoffCut({ ...wall, passThroughIn: undefined });
    expect(flush.overcutFt).toBeCloseTo((8 * Math.sqrt(8 * 16)) / 12, 12);
  });

  it('deeper than the blade commonly reaches carries a caution; a blade too small is refused', () => {
    expect(takeoffCut(wall).cautions).toEqual([]);
    expect(takeoffCut({ ...wall, thicknessIn: 9, passThroughIn: 1 }).cautions.join()).toContain('reaches');
    expect(() => takeoffCut({ ...wall, thicknessIn: 12 })).toThrow(
      expect.objectContaining({ field: 'bladeDiameterIn' }),
    );
  });

  it('counts pieces of one opening, cross cuts of all, and weighs without the allowance', () => {
    const two = takeoffCut({
      ...wall,
      lengthFt: 8,
      widthFt: 4,
      count: 2,
      removal: { densityPcf: 150, allowancePct: 10, maxPieceLb: 1_000 },
    });
    expect(two.crossCutFt).toBe(24);
    expect(two.sawFt).toBe(2 * 24 + 24);
    expect(two.pieces).toMatchObject({ count: 4, lengthFt: 4, widthFt: 2 });
    expect(two.pieces?.weightLb).toBeCloseTo(880, 9);
    expect(two.removedLb).toBeCloseTo(6_400, 9);
    expect(takeoffCut(wall)).toMatchObject({ pieces: null, removedLb: 14 * 150 });
  });

  it('puts limits of the removal under its name', () => {
    const removal = { densityPcf: 150, maxPieceLb: 0 };
    expect(() => takeoffCut({ ...wall, removal })).toThrow(
      expect.objectContaining({ field: 'removal.maxPieceLb' }),
    );
  });
});

describe('a trench', () => {
  const trench: Cut = { kind: 'trench', lengthFt: 40, widthFt: 2, thicknessIn: 6, endCuts: 2, count: 1 };

  it('counts its sides and ends, never its own length as saw feet', () => {
    expect(takeoffCut(trench).sawFt).toBe(84);
    expect(takeoffCut({ ...trench, endCuts: 0 }).sawFt).toBe(80);
    expect(takeoffCut({ ...trench, sideCuts: 1, endCuts: 1 }).sawFt).toBe(42);
  });

  it('overcuts where ends meet sides', () => {
    const blade = { bladeDiameterIn: 20, passThroughIn: 1 };
    const endIn = Math.sqrt(7 * 13) - Math.sqrt(19);
    expect(takeoffCut({ ...trench, ...blade }).overcutFt).toBeCloseTo((8 * endIn) / 12, 12);
    expect(takeoffCut({ ...trench, ...blade, endCuts: 1 }).overcutFt).toBeCloseTo((4 * endIn) / 12, 12);
    expect(takeoffCut({ ...trench, ...blade, endCuts: 0 }).overcutFt).toBe(0);
  });

  it('cautions about cross cuts that stop at the side line', () => {
    const removal = { densityPcf: 150, maxPieceLb: 2_000, maxSideFt: 4 };
    expect(takeoffCut({ ...trench, removal }).cautions.join()).toContain('webs');
    const narrow = takeoffCut({ ...trench, widthFt: 1, bladeDiameterIn: 20, passThroughIn: 0, removal });
    expect(narrow.cautions.join()).toContain('narrower than two overcuts');
    expect(takeoffCut(trench).cautions.join()).not.toContain('webs');
  });
});

describe('the other kinds', () => {
  it('line, curb and chase', () => {
    expect(takeoffCut({ kind: 'line', lengthFt: 25, depthIn: 3.25, count: 4 })).toMatchObject({
      sawFt: 100,
      inchFeet: 325,
      depthIn: 3.25,
    });
    expect(takeoffCut({ kind: 'curb', lengthFt: 16, heightIn: 6, count: 1 })).toMatchObject({
      sawFt: 16,
      inchFeet: 96,
    });
    const chase = takeoffCut({ kind: 'chase', lengthFt: 30, widthIn: 1.5, depthIn: 1, count: 2 });
    expect(chase).toMatchObject({ sawFt: 120, inchFeet: 120 });
    expect(chase.removedCuFt).toBeCloseTo(((30 * 1.5) / 144) * 2, 12);
  });

  it('cores and wire', () => {
    const cores = takeoffCut({ kind: 'core', diameterIn: 12, depthIn: 10, count: 3 });
    expect(cores).toMatchObject({ sawFt: 0, coreHoles: 3, coreInches: 30 });
    expect(cores.removedLb).toBeCloseTo(3 * 98.17, 1);
    const wire = takeoffCut({
      kind: 'wire',
      areaSqFt: 40,
      pilotCores: 4,
      pilotDiameterIn: 2,
      depthIn: 36,
      count: 2,
    });
    expect(wire).toMatchObject({ sawSqFt: 80, sawFt: 0, coreHoles: 8, coreInches: 288 });
  });

  it('stitching takes out its holes, laps counted once', () => {
    const run = { kind: 'stitch', lengthIn: 168, bitDiameterIn: 4, depthIn: 12, count: 1 } as const;
    const lapping = takeoffCut({ ...run, overlapIn: 0.5, closed: true });
    expect(lapping).toMatchObject({ coreHoles: 48, coreInches: 576 });
    const holesCuFt = (48 * (Math.PI / 4) * 16 * 12) / 1_728;
    // Laps of circles 3.5 in apart, by numeric integration of the lens.
    const strips = 200_000;
    const lensSqIn = Array.from(
      { length: strips },
      (_, index) => 1.75 + ((index + 0.5) / strips) * 0.25,
    ).reduce((sum, x) => sum + (4 * Math.sqrt(4 - x * x) * 0.25) / strips, 0);
    expect(lapping.removedCuFt).toBeCloseTo(holesCuFt - (48 * lensSqIn * 12) / 1_728, 6);
    const touching = takeoffCut({ ...run, overlapIn: 0, closed: true });
    expect(touching.removedCuFt).toBeCloseTo((42 * (Math.PI / 4) * 16 * 12) / 1_728, 9);
  });

  it('joints come from the joint plan', () => {
    const slab = { lengthFt: 60, widthFt: 40, thicknessIn: 4, spacingFactor: 36, capFt: 15 };
    expect(takeoffCut({ kind: 'joints', ...slab, count: 2 })).toMatchObject({
      sawFt: 2 * jointPlan(slab).sawFt,
      depthIn: 1,
      inchFeet: 680,
    });
  });

  it('blocks, pipes and bars by the piece', () => {
    expect(takeoffCut({ kind: 'block', cutLengthIn: 8, depthIn: 8, count: 45 })).toMatchObject({
      pieceCuts: 45,
      sawFt: 30,
      inchFeet: 240,
    });
    expect(takeoffCut({ kind: 'pipe', outsideDiameterIn: 8, count: 2 })).toMatchObject({
      pieceCuts: 2,
      sawFt: 0,
    });
    const bars = takeoffCut({ kind: 'bar', diameterIn: 0.625, count: 81 });
    expect(bars.pieceCuts).toBe(81);
    expect(bars.sawSqFt).toBeCloseTo((81 * Math.PI * 0.625 ** 2) / 4 / 144, 12);
  });

  it('lips: nothing, a bevel, a ramp, and the wedge each takes off', () => {
    const lip = (heightIn: number) =>
      takeoffCut({ kind: 'lip', widthFt: 4, heightIn, runPerRise: 12, count: 2 });
    expect(lip(0.25)).toMatchObject({ sawFt: 0, sawSqFt: 0, removedCuFt: 0 });
    expect(lip(0.5)).toMatchObject({ sawFt: 8, depthIn: 1 });
    expect(lip(1).sawSqFt).toBeCloseTo(8, 12);
    // 4 ft × 1 in × 12 in ÷ 2, two of them
    expect(lip(1).removedCuFt).toBeCloseTo(((4 * (1 / 12) * 1) / 2) * 2, 12);
  });
});

const quantities = [
  'sawFt',
  'overcutFt',
  'inchFeet',
  'sawSqFt',
  'coreHoles',
  'coreInches',
  'crossCutFt',
  'pieceCuts',
  'removedCuFt',
  'removedLb',
] as const satisfies readonly (keyof CutQuantities)[];

describe('whatever the cut', () => {
  it('every quantity is finite, not negative, proportional to the count, and shown with its working', () => {
    fc.assert(
      fc.property(anyCut, (cut) => {
        const takeoff = takeoffCut(cut);
        const one = takeoffCut({ ...cut, count: 1 });
        for (const quantity of quantities) {
          expect(Number.isFinite(takeoff[quantity])).toBe(true);
          expect(takeoff[quantity]).toBeGreaterThanOrEqual(0);
          expect(takeoff[quantity]).toBeCloseTo(one[quantity] * cut.count, 6);
        }
        expect(takeoff.pieces).toEqual(one.pieces);
        expect(takeoff.working.length).toBeGreaterThan(0);
        for (const step of takeoff.working) {
          expect(step.formula).not.toBe('');
          expect(step.inputs.length).toBeGreaterThan(0);
          expect(step.source.origin).not.toBe('');
        }
      }),
      { numRuns: 500 },
    );
  });

  it('inch-feet are saw feet times depth, cross cuts are part of saw feet', () => {
    fc.assert(
      fc.property(anyCut, (cut) => {
        const { sawFt, depthIn, inchFeet: sawn, crossCutFt } = takeoffCut(cut);
        expect(sawn).toBeCloseTo(sawFt * (depthIn ?? 0), 9);
        expect(crossCutFt).toBeLessThanOrEqual(sawFt + 1e-9);
        if (depthIn !== null && sawFt > 0) expect(inchFeet({ lengthFt: sawFt, depthIn })).toBe(sawn);
      }),
    );
  });

  // Overcuts are left out: a blade plunged deeper past a thinner slab runs past less. So are joints: a slab
  // grown towards square panels needs fewer of them, and a thicker one wider ones.
  it('nothing shrinks when a dimension grows', () => {
    const dimensions = ['lengthFt', 'widthFt', 'thicknessIn', 'depthIn', 'heightIn', 'areaSqFt', 'lengthIn'];
    fc.assert(
      fc.property(anyCut, fc.constantFrom(...dimensions), (cut, dimension) => {
        fc.pre(cut.kind !== 'joints');
        const fields: Readonly<Record<string, unknown>> = { ...cut };
        const value = fields[dimension];
        fc.pre(typeof value === 'number');
        const grown = takeoffCut({ ...cut, [dimension]: value * 1.25 } as Cut);
        const base = takeoffCut(cut);
        for (const quantity of [
          'sawFt',
          'inchFeet',
          'coreHoles',
          'coreInches',
          'removedCuFt',
          'removedLb',
        ] as const) {
          expect(grown[quantity], quantity).toBeGreaterThanOrEqual(base[quantity] * (1 - 1e-9));
        }
      }),
      { numRuns: 500 },
    );
  });
});

describe('takeoffCutList', () => {
  it('adds up, in any split of the list', () => {
    fc.assert(
      fc.property(fc.array(anyCut, { maxLength: 8 }), fc.array(anyCut, { maxLength: 8 }), (left, right) => {
        const whole = takeoffCutList({ cuts: [...left, ...right] });
        const [first, second] = [takeoffCutList({ cuts: left }), takeoffCutList({ cuts: right })];
        for (const quantity of quantities) {
          const sum = first.totals[quantity] + second.totals[quantity];
          expect(Math.abs(whole.totals[quantity] - sum)).toBeLessThanOrEqual(1e-9 * Math.max(1, sum));
        }
        expect(whole.totals.pieces).toBe(first.totals.pieces + second.totals.pieces);
        expect(whole.cuts).toEqual([...first.cuts, ...second.cuts]);
        expect(whole.cuts).toEqual([...left, ...right].map((cut) => takeoffCut(cut)));
      }),
      { numRuns: 60 },
    );
  });

  it('groups cores by diameter and saw feet by depth', () => {
    const { totals } = takeoffCutList({
      cuts: [
        { kind: 'core', diameterIn: 4, depthIn: 8, count: 2 },
        { kind: 'core', diameterIn: 2, depthIn: 6, count: 1 },
        { kind: 'core', diameterIn: 4, depthIn: 10, count: 1 },
        { kind: 'line', lengthFt: 10, depthIn: 6, count: 1 },
        { kind: 'line', lengthFt: 20, depthIn: 4, count: 1 },
        { kind: 'trench', lengthFt: 10, widthFt: 1, thicknessIn: 6, endCuts: 0, count: 1 },
      ],
    });
    expect(totals.cores).toEqual([
      { diameterIn: 2, holes: 1, coreInches: 6 },
      { diameterIn: 4, holes: 3, coreInches: 26 },
    ]);
    expect(totals.sawAtDepth).toEqual([
      { depthIn: 4, sawFt: 20, inchFeet: 80 },
      { depthIn: 6, sawFt: 30, inchFeet: 180 },
    ]);
    expect(totals.heaviestPieceLb).toBeNull();
  });

  it('an empty list is zero throughout', () => {
    const { totals, cuts } = takeoffCutList({ cuts: [] });
    expect(cuts).toEqual([]);
    for (const quantity of quantities) expect(totals[quantity]).toBe(0);
  });

  it('names the place of a bad cut', () => {
    const good: Cut = { kind: 'line', lengthFt: 1, depthIn: 1, count: 1 };
    expect(() => takeoffCutList({ cuts: [good, { ...good, depthIn: -1 }] })).toThrow(
      expect.objectContaining({ field: 'cuts[1].depthIn', given: -1 }),
    );
    expect(() => takeoffCutList({ cuts: [good, null as unknown as Cut] })).toThrow(
      expect.objectContaining({ field: 'cuts[1]' }),
    );
  });
});
