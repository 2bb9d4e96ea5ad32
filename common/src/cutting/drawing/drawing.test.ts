import { describe, expect, it } from 'vitest';
import {
  cutSketch,
  depthSection,
  jointSketch,
  overcutIn,
  passPlan,
  sketchNote,
  trenchSection,
  type Cut,
  type LineRole,
  type OpeningCut,
  type SketchedCut,
} from '../index.ts';

const door: OpeningCut = {
  kind: 'opening',
  lengthFt: 3,
  widthFt: 7,
  thicknessIn: 8,
  uncutSides: ['bottom'],
  corners: 'overcut',
  bladeDiameterIn: 24,
  passThroughIn: 1,
  count: 2,
};
const cuts: readonly Cut[] = [
  {
    kind: 'trench',
    lengthFt: 40,
    widthFt: 2,
    thicknessIn: 6,
    endCuts: 2,
    count: 1,
    removal: { densityPcf: 150, maxPieceLb: 5_000, maxSideFt: 4 },
  },
  door,
  { ...door, uncutSides: [], corners: 'cored' },
  { kind: 'core', diameterIn: 6, depthIn: 8, count: 4 },
  { kind: 'stitch', lengthIn: 96, bitDiameterIn: 4, overlapIn: 0.5, closed: true, depthIn: 12, count: 1 },
  { kind: 'stitch', lengthIn: 96, bitDiameterIn: 4, overlapIn: 0.5, closed: false, depthIn: 12, count: 1 },
  { kind: 'joints', lengthFt: 60, widthFt: 40, thicknessIn: 4, spacingFactor: 36, capFt: 15, count: 1 },
  { kind: 'line', lengthFt: 12, depthIn: 4, count: 1 },
  { kind: 'wire', areaSqFt: 25, pilotCores: 4, pilotDiameterIn: 2, depthIn: 36, count: 1 },
  { kind: 'curb', lengthFt: 10, heightIn: 6, count: 1 },
  { kind: 'chase', lengthFt: 8, widthIn: 1.5, depthIn: 1, count: 1 },
  { kind: 'block', cutLengthIn: 8, depthIn: 8, count: 30 },
  { kind: 'pipe', outsideDiameterIn: 12, count: 1 },
  { kind: 'bar', diameterIn: 0.625, count: 80 },
  { kind: 'lip', widthFt: 5, heightIn: 1, runPerRise: 12, count: 1 },
];

function sketched(index: number, list: readonly Cut[] = cuts): SketchedCut {
  const cut = cutSketch(list).cuts[index];
  if (cut === undefined) throw new Error(`cut ${index} is not drawn`);
  return cut;
}

function lengths(cut: SketchedCut, role: LineRole): readonly number[] {
  return cut.lines
    .filter((line) => line.role === role)
    .map(({ from, to }) => Math.hypot(to.x - from.x, to.y - from.y));
}

const total = (numbers: readonly number[]) => numbers.reduce((sum, number) => sum + number, 0);

describe('cutSketch', () => {
  it('draws every kind inside the box, no shape over another', () => {
    const sketch = cutSketch(cuts);
    expect(sketch.cuts).toHaveLength(cuts.length);
    for (const { lines, circles, box } of sketch.cuts) {
      expect(lines.length + circles.length).toBeGreaterThan(0);
      for (const point of lines.flatMap(({ from, to }) => [from, to])) {
        expect(point.x).toBeGreaterThanOrEqual(box.x - 1e-9);
        expect(point.x).toBeLessThanOrEqual(box.x + box.width + 1e-9);
        expect(point.y).toBeGreaterThanOrEqual(box.y - 1e-9);
        expect(point.y).toBeLessThanOrEqual(box.y + box.height + 1e-9);
      }
      expect(box.x + box.width).toBeLessThan(sketch.box.width);
      expect(box.y + box.height).toBeLessThan(sketch.bar.line.from.y);
    }
    for (const [index, one] of sketch.cuts.entries()) {
      for (const other of sketch.cuts.slice(index + 1)) {
        const apart =
          one.box.x + one.box.width < other.box.x ||
          other.box.x + other.box.width < one.box.x ||
          one.box.y + one.box.height < other.box.y ||
          other.box.y + other.box.height < one.box.y;
        expect(apart, `${index} over ${other.index}`).toBe(true);
      }
    }
  });

  it('draws a trench as two sides, two ends and its cross cuts, to scale', () => {
    const trench = sketched(0);
    expect(lengths(trench, 'cut').toSorted((left, right) => right - left)).toEqual([40, 40, 2, 2]);
    expect(lengths(trench, 'cross_cut')).toEqual(Array.from({ length: 9 }, () => 2));
  });

  it('runs overcuts past the corners of a door, and leaves its sill uncut', () => {
    const shape = sketched(1);
    const runPastFt = overcutIn({ bladeDiameterIn: 24, thicknessIn: 8, passThroughIn: 1 }) / 12;
    expect(lengths(shape, 'overcut')).toHaveLength(4);
    expect(total(lengths(shape, 'overcut'))).toBeCloseTo(4 * runPastFt, 9);
    expect(total(lengths(shape, 'cut'))).toBeCloseTo(17, 9);
    expect(lengths(shape, 'edge')).toEqual([3]);
    expect(shape.box.width).toBeCloseTo(3 + 2 * runPastFt, 9);
  });

  it('draws corner cores inside, tangent to both lines', () => {
    const shape = sketched(2);
    expect(shape.circles).toHaveLength(4);
    expect(lengths(shape, 'overcut')).toEqual([]);
    for (const { centre, radiusFt } of shape.circles) {
      const fromSideFt = Math.min(centre.x - shape.box.x, shape.box.x + shape.box.width - centre.x);
      expect(fromSideFt).toBeCloseTo(radiusFt, 9);
    }
  });

  it('draws cores, stitched holes and a joint grid', () => {
    expect(sketched(3).circles.map(({ radiusFt }) => radiusFt)).toEqual([0.25]);
    expect(sketched(4).circles).toHaveLength(28);
    expect(sketched(5).circles).toHaveLength(28);
    expect(lengths(sketched(6), 'joint')).toHaveLength(7);
    expect(total(lengths(sketched(6), 'joint'))).toBeCloseTo(340, 9);
    expect(total(lengths(sketched(6), 'edge'))).toBeCloseTo(200, 9);
  });

  it('has a 10-ft bar, a 1-ft one where everything is small', () => {
    const { from, to } = cutSketch(cuts).bar.line;
    expect(to.x - from.x).toBeCloseTo(10, 9);
    expect(cutSketch([{ kind: 'core', diameterIn: 6, depthIn: 8, count: 1 }]).bar.label).toBe('1 ft');
  });

  it('says the same in words, ending with the note', () => {
    const { text, note } = cutSketch([...cuts.slice(0, 2)]);
    expect(text[0]).toBe('1. Trench 40 × 2 ft, 6 in thick: 102 ft sawn, 612 in-ft, 18 ft of it cross cuts.');
    expect(text[1]).toContain('Opening 3 × 7 ft, 8 in thick, corners overcut, not cut: bottom, 2 of them');
    expect(text.at(-1)).toBe(sketchNote);
    expect(note).toBe('Shapes to scale, positions not; not for layout.');
  });

  it('draws what fits of a long list and says what is left out', () => {
    const many = Array.from({ length: 500 }, (): Cut => ({
      kind: 'line',
      lengthFt: 5,
      depthIn: 4,
      count: 1,
    }));
    const sketch = cutSketch(many);
    expect(sketch.cuts).toHaveLength(60);
    expect(sketch.omitted).toBe(440);
    expect(sketch.text).toContain('And 440 more cuts that are not drawn.');
    expect(cutSketch(many, { maxCuts: 500 }).omitted).toBe(0);
  });

  it('draws only the outline of what has too many lines', () => {
    const slab: Cut = {
      kind: 'joints',
      lengthFt: 5_000,
      widthFt: 5_000,
      thicknessIn: 4,
      spacingFactor: 24,
      capFt: 15,
      count: 1,
    };
    const shape = sketched(0, [slab]);
    expect(shape.isSimplified).toBe(true);
    expect(shape.lines).toHaveLength(4);
  });

  it('an empty list is an empty sheet with its bar', () => {
    const sketch = cutSketch([]);
    expect(sketch.cuts).toEqual([]);
    expect(sketch.bar.lengthFt).toBe(10);
    expect(sketch.box.width).toBeGreaterThan(10);
  });
});

describe('depthSection', () => {
  const slab = {
    element: 'slab',
    thicknessIn: 8,
    passDepthsIn: passPlan({ depthIn: 9, maxPassIn: 3, scoreIn: 0.5 }).depthsIn,
    mats: [{ coverIn: 1.5, barDiameterIn: 0.625, spacingIn: 12 }],
    embedded: [{ name: '1-in conduit', depthIn: 4, diameterIn: 1.315 }],
    beyond: 'occupied',
  } as const;

  it('steps the passes down, one beside the other', () => {
    const { passes, body } = depthSection(slab);
    expect(passes.map(({ depthIn }) => depthIn)).toEqual([...slab.passDepthsIn]);
    for (const [index, { box }] of passes.entries()) {
      expect(box.height).toBe(slab.passDepthsIn[index]);
      expect(box.x).toBeGreaterThan(body.x);
      expect(box.x + box.width).toBeLessThan(body.width);
    }
    const [first, second] = passes;
    expect((first?.box.x ?? 0) + (first?.box.width ?? 0)).toBeCloseTo(second?.box.x ?? -1, 9);
  });

  it('marks what the cut reaches', () => {
    const section = depthSection(slab);
    expect(section.mats[0]?.bars.every(({ isReached }) => isReached)).toBe(true);
    expect(section.embedded[0]?.isReached).toBe(true);
    const shallow = depthSection({ ...slab, passDepthsIn: [1] });
    expect(shallow.mats[0]?.bars.some(({ isReached }) => isReached)).toBe(false);
    expect(shallow.text.join(' ')).toContain('below the cut');
  });

  it('is louder the less is known of what lies beyond', () => {
    const loudness = (['soil', 'unoccupied', 'occupied', 'unknown'] as const).map(
      (beyond) => depthSection({ ...slab, beyond }).beyond.loudness,
    );
    expect(loudness).toEqual([1, 2, 3, 4]);
    expect(depthSection({ ...slab, beyond: 'unknown' }).text.at(-1)).toContain('UNKNOWN');
  });

  it('turns a wall on its side', () => {
    const wall = depthSection({ ...slab, element: 'wall' });
    expect(wall.body.width).toBe(8);
    expect(wall.passes[0]?.box.width).toBe(0.5);
    expect(wall.beyond.box.x).toBe(8);
    expect(wall.text.at(-1)).toContain('Behind');
  });

  it('refuses passes that do not deepen', () => {
    expect(() => depthSection({ ...slab, passDepthsIn: [2, 2] })).toThrow(
      expect.objectContaining({ field: 'passDepthsIn[1]' }),
    );
  });
});

describe('jointSketch', () => {
  it('draws every joint where the plan puts it, bay lines too', () => {
    const sketch = jointSketch({
      lengthFt: 60,
      widthFt: 40,
      thicknessIn: 4,
      spacingFactor: 36,
      baysAlongLengthFt: [25, 35],
    });
    const acrossFt = sketch.joints.filter(({ from, to }) => from.x === to.x).map(({ from }) => from.x);
    expect(acrossFt).toContain(25);
    expect(
      Math.max(...[...acrossFt, 60].map((x, index) => x - (acrossFt[index - 1] ?? 0))),
    ).toBeLessThanOrEqual(12);
    expect(sketch.box).toEqual({ x: 0, y: 0, width: 60, height: 40 });
    expect(sketch.text.join(' ')).toContain('ft of joints, 1 in deep');
  });
});

describe('trenchSection', () => {
  const input = {
    lengthFt: 100,
    widthIn: 24,
    slabThicknessIn: 6,
    location: 'under_roads_parking',
    wiring: 'nonmetallic',
    conduitKind: 'pvc',
    tradeSize: '2',
    beddingIn: 2,
    swellPct: 25,
  } as const;

  it('puts the conduit under its cover and on its bedding', () => {
    const section = trenchSection(input);
    expect(section.conduit.centre.y - section.conduit.radiusIn).toBeCloseTo(24, 9);
    expect(section.conduit.centre.y + section.conduit.radiusIn).toBeCloseTo(section.bedding?.y ?? 0, 9);
    expect(section.trench.height).toBe(28.375);
    expect(section.slabs.map(({ x, width }) => [x, x + width])).toEqual([
      [0, 12],
      [36, 48],
    ]);
    expect(section.text.join(' ')).toContain('dug 28.375 in deep');
  });

  it('measures cover from the underside where asked, and draws no bedding where there is none', () => {
    const section = trenchSection({ ...input, beddingIn: 0, coverFrom: 'underside_of_slab' });
    expect(section.bedding).toBeNull();
    expect(section.dimensions.find(({ name }) => name === 'cover')).toEqual({
      name: 'cover',
      fromIn: 6,
      toIn: 30,
    });
  });
});
