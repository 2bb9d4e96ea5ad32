import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { bidUnitsOfKind, cutQuantity } from '../bids/index.ts';
import { cutKinds, cutSchema, methodsOfCuts, readCutList, type CutInput, type CutLine } from './index.ts';

const CUT_ID = '0192f000-0000-7000-8000-000000000001';

function lineOf(cut: CutInput, id = CUT_ID): CutLine {
  return { id, mark: 'A1', note: '', cut: cutSchema.parse(cut) };
}

/** Numbers a person types: up to three decimals, within a schema's own bounds. */
const typed = (min: number, max: number) =>
  fc.integer({ min: Math.ceil(min * 1000), max: Math.floor(max * 1000) }).map((n) => n / 1000);
const count = fc.integer({ min: 1, max: 10_000 });
const lengthFt = fc.oneof(typed(0.1, 100_000), typed(0.1, 60));
const widthFt = fc.oneof(typed(0.1, 10_000), typed(0.1, 20));
const thicknessIn = fc.oneof(typed(0.5, 240), typed(2, 14));
const blade = fc.option(typed(4, 84), { nil: undefined });
const passThrough = fc.option(typed(0, 12), { nil: undefined });
const removal = fc.option(
  fc.record({
    densityPcf: typed(20, 600),
    allowancePct: fc.option(typed(0, 100), { nil: undefined }),
    maxPieceLb: typed(10, 200_000),
    maxSideFt: fc.option(typed(0.5, 1000), { nil: undefined }),
    maxShortSideFt: fc.option(typed(0.5, 1000), { nil: undefined }),
  }),
  { nil: undefined },
);
const line = fc.record({ kind: fc.constant('line' as const), lengthFt, depthIn: typed(0.1, 240), count });
const core = fc.record({
  kind: fc.constant('core' as const),
  diameterIn: typed(0.25, 96),
  depthIn: typed(0.1, 240),
  count,
});
const panel = { lengthFt, widthFt, thicknessIn, count };
const trench = fc.record({
  kind: fc.constant('trench' as const),
  ...panel,
  sideCuts: fc.constantFrom(1 as const, 2 as const),
  endCuts: fc.constantFrom(0 as const, 1 as const, 2 as const),
});
const opening = fc.record({
  kind: fc.constant('opening' as const),
  ...panel,
  uncutSides: fc.option(fc.uniqueArray(fc.constantFrom('top', 'bottom', 'left', 'right'), { maxLength: 3 }), {
    nil: undefined,
  }),
  corners: fc.constantFrom('overcut' as const, 'cored' as const, 'square' as const),
});

const small = typed(0.1, 240);
const further = fc.oneof(
  fc.record({
    kind: fc.constant('stitch' as const),
    lengthIn: typed(0.5, 120_000),
    bitDiameterIn: typed(0.25, 96),
    overlapIn: fc.oneof(typed(0, 120), typed(0, 2)),
    closed: fc.boolean(),
    depthIn: typed(0.1, 240),
    count,
  }),
  fc.record({
    kind: fc.constant('joints' as const),
    lengthFt,
    widthFt,
    thicknessIn: typed(2, 60),
    spacingFactor: typed(24, 36),
    capFt: typed(2, 30),
    count,
  }),
  fc.record({
    kind: fc.constant('wire' as const),
    areaSqFt: typed(0.1, 1_000_000),
    pilotCores: fc.integer({ min: 0, max: 10_000 }),
    pilotDiameterIn: typed(0.25, 96),
    depthIn: typed(0.1, 240),
    count,
  }),
  fc.record({ kind: fc.constant('curb' as const), lengthFt, heightIn: small, count }),
  fc.record({ kind: fc.constant('chase' as const), lengthFt, widthIn: small, depthIn: small, count }),
  fc.record({ kind: fc.constant('block' as const), cutLengthIn: small, depthIn: small, count }),
  fc.record({ kind: fc.constant('pipe' as const), outsideDiameterIn: small, count }),
  fc.record({ kind: fc.constant('bar' as const), diameterIn: typed(0.1, 12), count }),
  fc.record({
    kind: fc.constant('lip' as const),
    widthFt,
    heightIn: typed(0.05, 60),
    runPerRise: typed(8, 20),
    count,
  }),
);
const place = {
  face: 'wall',
  below: 'unknown',
  indoors: true,
  enginesAllowed: false,
  overcutsAllowed: false,
} as const;

describe('a cut list through the engine', () => {
  it('sums the worked list: trench 40 × 2 ft of 6 in with 4-ft pieces, two lines and six cores', () => {
    // Common practice: trench 40 × 2 ft, pieces 4 ft long → 2·40 + 2·2 + 9·2 = 102 LF, × 6 in = 612 in-ft.
    const trenchCut = lineOf({
      kind: 'trench',
      lengthFt: 40,
      widthFt: 2,
      thicknessIn: 6,
      count: 1,
      removal: { maxPieceLb: 600, maxSideFt: 4 },
    });
    const saw = lineOf({ kind: 'line', lengthFt: 10, depthIn: 5, count: 2 });
    const cores = lineOf({ kind: 'core', diameterIn: 4, depthIn: 8, count: 6 });
    const reading = readCutList([trenchCut, { ...saw, id: 'b' }, { ...cores, id: 'c' }]);
    if (!reading.ok) throw new Error(JSON.stringify(reading.issues));
    expect(reading.totals).toMatchObject({
      sawFt: 122,
      crossCutFt: 18,
      inchFeet: 712,
      coreHoles: 6,
      coreInches: 48,
      pieces: 10,
    });
    expect(reading.byCutId.get(CUT_ID)?.sawFt).toBe(102);
  });

  it('tells every cut that makes no sense, at its own field', () => {
    const reading = readCutList([
      lineOf({ kind: 'line', lengthFt: 10, depthIn: 5, count: 1 }),
      lineOf({
        kind: 'opening',
        lengthFt: 4,
        widthFt: 8,
        thicknessIn: 8,
        corners: 'overcut',
        bladeDiameterIn: 14,
        count: 1,
      }),
      lineOf({
        kind: 'trench',
        lengthFt: 10_000,
        widthFt: 2,
        thicknessIn: 6,
        count: 1,
        removal: { maxPieceLb: 10 },
      }),
    ]);
    expect(reading.ok).toBe(false);
    if (reading.ok) return;
    expect(reading.issues.map((issue) => issue.path.split('.').slice(0, 3).join('.'))).toEqual([
      'cuts.1.cut',
      'cuts.2.cut',
    ]);
    expect(reading.issues.every((issue) => issue.path.split('.').length > 3)).toBe(true);
  });

  it('takes off every cut its schema accepts when no blade and no removal tie fields together', () => {
    fc.assert(
      fc.property(fc.oneof(line, core, trench, opening), (cut) => {
        const parsed = cutSchema.safeParse(cut);
        expect(parsed.success).toBe(true);
        const reading = readCutList([lineOf(cut)]);
        expect(reading.ok).toBe(true);
        if (!reading.ok) return;
        for (const total of Object.values(reading.totals)) expect(Number.isFinite(total)).toBe(true);
      }),
      { numRuns: 500 },
    );
  });

  it('answers every other accepted cut with totals or with an issue at one of its fields, never with a crash', () => {
    const tied = fc
      .tuple(fc.oneof(trench, opening), blade, passThrough, removal)
      .map(([cut, bladeDiameterIn, passThroughIn, wanted]) => ({
        ...cut,
        bladeDiameterIn,
        passThroughIn,
        removal: wanted,
      }));
    let taken = 0;
    fc.assert(
      fc.property(tied, (cut) => {
        const reading = readCutList([lineOf(cut)]);
        if (reading.ok) {
          taken += 1;
          return;
        }
        for (const { path, message } of reading.issues) {
          const field = path.split('.')[3] ?? '';
          expect([...Object.keys(cut)]).toContain(field);
          expect(message.length).toBeGreaterThan(10);
        }
      }),
      { numRuns: 500 },
    );
    expect(taken).toBeGreaterThan(50);
  });

  it('sums the further kinds: joints, wire, chase, blocks, bars', () => {
    const reading = readCutList(
      (
        [
          // Joint arithmetic: 60 × 40 ft, 4 in, factor 36 → spacing 12 ft, 340 ft of joints 1 in deep.
          { kind: 'joints', lengthFt: 60, widthFt: 40, thicknessIn: 4, spacingFactor: 36, count: 1 },
          { kind: 'wire', areaSqFt: 50, pilotCores: 2, pilotDiameterIn: 2, depthIn: 30, count: 1 },
          // Two lines of 20 ft, 2 in deep.
          { kind: 'chase', lengthFt: 20, widthIn: 1, depthIn: 2, count: 1 },
          { kind: 'block', cutLengthIn: 12, depthIn: 8, count: 10 },
          { kind: 'bar', diameterIn: 0.75, count: 5 },
        ] satisfies CutInput[]
      ).map((cut, index) => lineOf(cut, String(index))),
    );
    if (!reading.ok) throw new Error(JSON.stringify(reading.issues));
    expect(reading.totals).toMatchObject({
      sawFt: 340 + 40 + 10,
      inchFeet: 340 * 1 + 40 * 2 + 10 * 8,
      coreHoles: 2,
      coreInches: 60,
      pieceCuts: 15,
    });
  });

  it('answers every accepted cut of the further kinds with totals, methods and a price, or an issue at its field', () => {
    const taken = new Map<string, number>();
    fc.assert(
      fc.property(further, (typedCut) => {
        const parsed = cutSchema.safeParse(typedCut);
        expect(parsed.success).toBe(true);
        if (!parsed.success) return;
        expect(methodsOfCuts([parsed.data], place).length).toBeGreaterThan(0);
        const cutLine = lineOf(typedCut);
        const reading = readCutList([cutLine]);
        if (!reading.ok) {
          for (const { path } of reading.issues) expect(Object.keys(typedCut)).toContain(path.split('.')[3]);
          return;
        }
        taken.set(typedCut.kind, (taken.get(typedCut.kind) ?? 0) + 1);
        for (const total of Object.values(reading.totals)) expect(Number.isFinite(total)).toBe(true);
        const takeoff = reading.byCutId.get(CUT_ID);
        if (takeoff === undefined) throw new Error('not taken off');
        for (const unit of bidUnitsOfKind[typedCut.kind]) {
          expect(Number.isSafeInteger(cutQuantity(cutLine, takeoff, unit))).toBe(true);
        }
        expect(cutQuantity(cutLine, takeoff, 'each')).toBe(typedCut.count * 100);
      }),
      { numRuns: 1500 },
    );
    expect([...taken.keys()].sort()).toEqual(
      ['bar', 'block', 'chase', 'curb', 'joints', 'lip', 'pipe', 'stitch', 'wire'].sort(),
    );
  });

  it('says of joints too many for their panels which field of the cut to change', () => {
    const reading = readCutList([
      lineOf({ kind: 'joints', lengthFt: 100_000, widthFt: 0.1, thicknessIn: 6, count: 1 }),
    ]);
    expect(reading.ok).toBe(false);
    if (reading.ok) return;
    expect(reading.issues[0]?.path).toBe('cuts.0.cut.widthFt');
  });

  it('refuses fields of another kind, and sizes beyond the engine', () => {
    const bar = { kind: 'bar', diameterIn: 0.5, count: 1 };
    expect(cutSchema.safeParse({ ...bar, depthIn: 3 }).success).toBe(false);
    expect(cutSchema.safeParse({ ...bar, diameterIn: 13 }).success).toBe(false);
    expect(cutSchema.safeParse({ kind: 'notch', count: 1 }).success).toBe(false);
    expect(cutKinds.map((kind) => bidUnitsOfKind[kind].length > 1)).toEqual(cutKinds.map(() => true));
  });
});
