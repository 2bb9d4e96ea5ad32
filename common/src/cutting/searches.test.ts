import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { CuttingInputError, jointPlan, passPlan, piecePlan } from './index.ts';

const slack = 1 + 1e-9;

/** Feet on a plan: quarters, so that ties and exact divisions turn up often. */
const planFt = (maxFt: number) => fc.integer({ min: 1, max: maxFt * 4 }).map((quarters) => quarters / 4);

interface Grid {
  readonly alongLength: number;
  readonly alongWidth: number;
  readonly crossCutFt: number;
}

interface Panel {
  readonly lengthFt: number;
  readonly widthFt: number;
  readonly thicknessIn: number;
  readonly allowancePct: number;
  readonly maxPieceLb: number;
  readonly maxSideFt: number | undefined;
  readonly maxShortSideFt: number | undefined;
}

/** Every grid up to 60 × 60, the best by the four rules in turn. */
function bruteForcePieces(panel: Panel): Grid | undefined {
  const { lengthFt, widthFt } = panel;
  const panelLb = ((lengthFt * widthFt * panel.thicknessIn) / 12) * 150 * (1 + panel.allowancePct / 100);
  const grids: Grid[] = [];
  for (let alongLength = 1; alongLength <= 60; alongLength += 1) {
    for (let alongWidth = 1; alongWidth <= 60; alongWidth += 1) {
      const sides = [lengthFt / alongLength, widthFt / alongWidth];
      const obeys =
        panelLb / (alongLength * alongWidth) <= panel.maxPieceLb * slack &&
        Math.max(...sides) <= (panel.maxSideFt ?? Infinity) * slack &&
        Math.min(...sides) <= (panel.maxShortSideFt ?? Infinity) * slack;
      const crossCutFt = (alongLength - 1) * widthFt + (alongWidth - 1) * lengthFt;
      if (obeys) grids.push({ alongLength, alongWidth, crossCutFt });
    }
  }
  const near = (left: number, right: number) =>
    Math.abs(left - right) <= 1e-9 * Math.max(left, right) ? 0 : left - right;
  const longest = (grid: Grid) => Math.max(lengthFt / grid.alongLength, widthFt / grid.alongWidth);
  return grids.sort(
    (left, right) =>
      near(left.crossCutFt, right.crossCutFt) ||
      left.alongLength * left.alongWidth - right.alongLength * right.alongWidth ||
      near(longest(left), longest(right)) ||
      left.alongLength + left.alongWidth - right.alongLength - right.alongWidth,
  )[0];
}

const panels: fc.Arbitrary<Panel> = fc.record({
  lengthFt: planFt(14),
  widthFt: planFt(14),
  thicknessIn: fc.integer({ min: 2, max: 16 }),
  allowancePct: fc.constantFrom(0, 10, 25),
  maxPieceLb: fc.integer({ min: 300, max: 6_000 }),
  maxSideFt: fc.option(planFt(6), { nil: undefined }),
  maxShortSideFt: fc.option(planFt(4), { nil: undefined }),
});

describe('piecePlan', () => {
  it('finds what a search of every grid finds', () => {
    fc.assert(
      fc.property(panels, (panel) => {
        const best = bruteForcePieces(panel);
        fc.pre(best !== undefined && best.alongLength < 50 && best.alongWidth < 50);
        const plan = piecePlan(panel);
        expect(plan.crossCutFt).toBeCloseTo(best.crossCutFt, 8);
        expect(plan.pieces).toBe(best.alongLength * best.alongWidth);
        expect(plan.alongLength + plan.alongWidth).toBe(best.alongLength + best.alongWidth);
        const longest = (grid: Grid) =>
          Math.max(panel.lengthFt / grid.alongLength, panel.widthFt / grid.alongWidth);
        expect(Math.max(plan.pieceLengthFt, plan.pieceWidthFt)).toBeCloseTo(longest(best), 9);
      }),
      { numRuns: 400 },
    );
  });

  it('obeys every limit, and adds up', () => {
    fc.assert(
      fc.property(panels, (panel) => {
        const plan = piecePlan(panel);
        expect(plan.pieceLb).toBeLessThanOrEqual(panel.maxPieceLb * slack);
        expect(Math.max(plan.pieceLengthFt, plan.pieceWidthFt)).toBeLessThanOrEqual(
          (panel.maxSideFt ?? 99) * slack,
        );
        expect(Math.min(plan.pieceLengthFt, plan.pieceWidthFt)).toBeLessThanOrEqual(
          (panel.maxShortSideFt ?? 99) * slack,
        );
        const panelLb =
          panel.lengthFt * panel.widthFt * panel.thicknessIn * 12.5 * (1 + panel.allowancePct / 100);
        expect(plan.pieceLb * plan.pieces).toBeCloseTo(panelLb, 6);
        expect(plan.crossCutInchFeet).toBeCloseTo(plan.crossCutFt * panel.thicknessIn, 9);
      }),
    );
  });

  it('cuts no less when the slab grows or a limit tightens', () => {
    fc.assert(
      fc.property(panels, fc.constantFrom('lengthFt', 'widthFt', 'thicknessIn'), (panel, dimension) => {
        const base = piecePlan(panel).crossCutFt;
        const larger = piecePlan({ ...panel, [dimension]: panel[dimension] * 1.5 });
        expect(larger.crossCutFt).toBeGreaterThanOrEqual(base / slack);
        const lighter = piecePlan({ ...panel, maxPieceLb: panel.maxPieceLb * 0.7 });
        expect(lighter.crossCutFt).toBeGreaterThanOrEqual(base / slack);
      }),
    );
  });

  it('forgives the hair of a binary fraction: 4.2 ft in 1.4-ft pieces is three', () => {
    const plan = piecePlan({ lengthFt: 4.2, widthFt: 1, thicknessIn: 1, maxPieceLb: 1_000, maxSideFt: 1.4 });
    expect(plan.alongLength).toBe(3);
  });

  it('a slab light enough stays whole', () => {
    expect(piecePlan({ lengthFt: 4, widthFt: 4, thicknessIn: 6, maxPieceLb: 1_200 })).toMatchObject({
      pieces: 1,
      crossCutFt: 0,
      pieceLb: 1_200,
    });
  });

  it('refuses over 10,000 pieces, naming the limit', () => {
    const slab = { lengthFt: 1_000, widthFt: 1_000, thicknessIn: 12 };
    expect(() => piecePlan({ ...slab, maxPieceLb: 50 })).toThrow(
      expect.objectContaining({ field: 'maxPieceLb' }),
    );
    expect(() => piecePlan({ ...slab, maxPieceLb: 1e7, maxSideFt: 0.5 })).toThrow(
      expect.objectContaining({ field: 'maxSideFt' }),
    );
    expect(() => piecePlan({ ...slab, maxPieceLb: 1e7, maxShortSideFt: 0.001 })).toThrow(
      expect.objectContaining({ field: 'maxShortSideFt' }),
    );
  });
});

interface Slab {
  readonly baysAlongLengthFt: readonly number[];
  readonly baysAlongWidthFt: readonly number[];
  readonly thicknessIn: number;
  readonly spacingFactor: number;
  readonly capFt: number;
  readonly maxAspect: number;
}

const sum = (numbers: readonly number[]) => numbers.reduce((total, number) => total + number, 0);

/** Every choice of up to `most` panels for each bay. */
function divisions(baysFt: readonly number[], most: number): readonly (readonly number[])[] {
  const counts = Array.from({ length: most }, (_, index) => index + 1);
  return baysFt.reduce<readonly (readonly number[])[]>(
    (choices) => choices.flatMap((choice) => counts.map((count) => [...choice, count])),
    [[]],
  );
}

function bruteForceJoints(slab: Slab): number | undefined {
  const { baysAlongLengthFt, baysAlongWidthFt, maxAspect } = slab;
  const spacingFt = Math.min((slab.spacingFactor * slab.thicknessIn) / 12, slab.capFt);
  const describeSide = (baysFt: readonly number[]) =>
    divisions(baysFt, 8)
      .map((counts) => {
        const panelsFt = baysFt.map((bayFt, bay) => bayFt / (counts[bay] ?? 1));
        return { lines: sum(counts) - 1, widest: Math.max(...panelsFt), narrowest: Math.min(...panelsFt) };
      })
      .filter(({ widest }) => widest <= spacingFt * slack);
  const acrossWidths = describeSide(baysAlongWidthFt);
  const feet = describeSide(baysAlongLengthFt).flatMap((along) =>
    acrossWidths
      .filter(
        (across) =>
          along.widest <= maxAspect * across.narrowest * slack &&
          across.widest <= maxAspect * along.narrowest * slack,
      )
      .map((across) => along.lines * sum(baysAlongWidthFt) + across.lines * sum(baysAlongLengthFt)),
  );
  return feet.length === 0 ? undefined : Math.min(...feet);
}

function planOf(slab: Slab, withBays: boolean) {
  const { baysAlongLengthFt, baysAlongWidthFt, ...rest } = slab;
  const sides = { lengthFt: sum(baysAlongLengthFt), widthFt: sum(baysAlongWidthFt) };
  return jointPlan({ ...rest, ...sides, ...(withBays ? { baysAlongLengthFt, baysAlongWidthFt } : {}) });
}

const slabs = (maxBays: number, maxBayFt: number): fc.Arbitrary<Slab> =>
  fc.record({
    baysAlongLengthFt: fc.array(planFt(maxBayFt), { minLength: 1, maxLength: maxBays }),
    baysAlongWidthFt: fc.array(planFt(maxBayFt), { minLength: 1, maxLength: maxBays }),
    thicknessIn: fc.integer({ min: 4, max: 8 }),
    spacingFactor: fc.integer({ min: 24, max: 36 }),
    capFt: fc.constantFrom(12, 15, 18),
    maxAspect: fc.constantFrom(1.25, 1.5, 2),
  });

describe('jointPlan', () => {
  it('saws no more than any grid, with and without bays', () => {
    fc.assert(
      fc.property(slabs(2, 40), (slab) => {
        const leastFt = bruteForceJoints(slab);
        fc.pre(leastFt !== undefined);
        // Only eight panels a bay are tried, so the search may do better with more; never worse.
        const plan = planOf(slab, true);
        expect(plan.sawFt).toBeLessThanOrEqual(leastFt * slack);
        if (Math.max(plan.panelsAlongLength, plan.panelsAlongWidth) <= 8)
          expect(plan.sawFt).toBeCloseTo(leastFt, 8);
      }),
      { numRuns: 300 },
    );
  });

  it('equals the brute force on plain slabs', () => {
    fc.assert(
      fc.property(slabs(1, 60), (slab) => {
        const leastFt = bruteForceJoints(slab);
        fc.pre(leastFt !== undefined);
        expect(planOf(slab, false).sawFt).toBeCloseTo(leastFt, 8);
      }),
      { numRuns: 300 },
    );
  });

  it('obeys spacing and aspect, and puts a joint on every bay line', () => {
    fc.assert(
      fc.property(slabs(4, 40), (slab) => {
        const plan = planOf(slab, true);
        expect(Math.max(plan.panelLengthFt, plan.panelWidthFt)).toBeLessThanOrEqual(
          plan.maxSpacingFt * slack,
        );
        expect(plan.aspect).toBeLessThanOrEqual(slab.maxAspect * slack);
        expect(plan.jointsAlongLengthFt).toHaveLength(plan.panelsAlongLength - 1);
        expect(plan.jointsAlongWidthFt).toHaveLength(plan.panelsAlongWidth - 1);
        let bayLineFt = 0;
        for (const bayFt of slab.baysAlongLengthFt.slice(0, -1)) {
          bayLineFt += bayFt;
          expect(plan.jointsAlongLengthFt.some((joint) => Math.abs(joint - bayLineFt) < 1e-6)).toBe(true);
        }
      }),
    );
  });

  it('saws no less when spacing tightens', () => {
    fc.assert(
      fc.property(slabs(1, 80), (slab) => {
        const base = planOf(slab, false).sawFt;
        expect(planOf({ ...slab, capFt: slab.capFt - 3 }, false).sawFt).toBeGreaterThanOrEqual(base / slack);
      }),
    );
  });

  it('refuses bays that do not make up the side and an aspect no grid obeys', () => {
    const slab = { lengthFt: 60, widthFt: 40, thicknessIn: 6 };
    expect(() => jointPlan({ ...slab, baysAlongLengthFt: [20, 20] })).toThrow(
      expect.objectContaining({ field: 'baysAlongLengthFt' }),
    );
    expect(() => jointPlan({ ...slab, lengthFt: Math.PI * 10, maxAspect: 1 })).toThrow(
      expect.objectContaining({ field: 'maxAspect' }),
    );
    expect(() => jointPlan({ ...slab, lengthFt: 100_000, capFt: 5 })).toThrow(CuttingInputError);
  });
});

describe('passPlan', () => {
  it('starts at the score, ends at the depth, deepens, and takes the fewest passes', () => {
    const inch = (min: number, max: number) =>
      fc.integer({ min: min * 16, max: max * 16 }).map((part) => part / 16);
    fc.assert(
      fc.property(
        inch(1, 24),
        inch(1, 4),
        fc.double({ min: 0.05, max: 1, noNaN: true }),
        (depthIn, maxPassIn, share) => {
          const scoreIn = share * Math.min(depthIn, maxPassIn);
          const { depthsIn } = passPlan({ depthIn, maxPassIn, scoreIn });
          expect(depthsIn[0]).toBe(scoreIn);
          expect(depthsIn.at(-1)).toBe(depthIn);
          const steps = depthsIn.slice(1).map((depth, index) => depth - (depthsIn[index] ?? 0));
          for (const step of steps) {
            expect(step).toBeGreaterThan(0);
            expect(step).toBeLessThanOrEqual(maxPassIn * slack);
            expect(step).toBeCloseTo(steps[0] ?? 0, 9);
          }
          // One step fewer would be too deep.
          expect((depthIn - scoreIn) / Math.max(1, steps.length - 1)).toBeGreaterThan(
            steps.length > 1 ? maxPassIn : -1,
          );
        },
      ),
    );
  });

  it('refuses a score over the depth or over one pass, and endless passes', () => {
    expect(() => passPlan({ depthIn: 2, maxPassIn: 3, scoreIn: 2.5 })).toThrow(
      expect.objectContaining({ field: 'scoreIn' }),
    );
    expect(() => passPlan({ depthIn: 1_000, maxPassIn: 1e-6, scoreIn: 1e-7 })).toThrow(
      expect.objectContaining({ field: 'maxPassIn' }),
    );
  });
});
