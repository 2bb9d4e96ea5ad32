import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { cutSchema, readCutList, type CutInput, type CutLine } from './index.ts';

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
});
