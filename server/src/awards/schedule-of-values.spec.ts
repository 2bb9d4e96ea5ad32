import fc from 'fast-check';
import type { PricedLine } from '@kerfyard/common/bids';
import type { CutLine } from '@kerfyard/common/scopes';
import { scheduleOfValues, type SovRow } from './schedule-of-values.ts';

const id = (n: number): string => `00000000-0000-4000-8000-${String(n).padStart(12, '0')}`;

// 80 ft² of 6 in: 2 × 40 + 2 × 2 = 84 ft × 6 in = 504 in-ft → 67.2 min of work.
const trench: CutLine = {
  id: id(1),
  mark: 'T1',
  note: '',
  cut: { kind: 'trench', lengthFt: 40, widthFt: 2, thicknessIn: 6, sideCuts: 2, endCuts: 2, count: 1 },
};
// 6 holes × (10 min + 8 in at 0.8 in/min) = 120 min of work.
const cores: CutLine = {
  id: id(2),
  mark: 'C1',
  note: '',
  cut: { kind: 'core', diameterIn: 4, depthIn: 8, count: 6 },
};
const cuts = [trench, cores];

function priced(cents: Record<string, number>): PricedLine[] {
  return Object.entries(cents).map(([cutId, lineCents]) => ({
    cutId,
    unit: 'in_ft',
    quantity: 100,
    rate: 1,
    factors: [],
    cents: lineCents,
  }));
}

const amounts = (rows: readonly SovRow[]): number[] => rows.map((row) => row.amountCents);
const sum = (values: readonly number[]): number => values.reduce((a, b) => a + b, 0);

describe('schedule of values', () => {
  it('splits a lump by the minutes of work in each cut', () => {
    const rows = scheduleOfValues(cuts, { totalCents: 187_200, lines: [], mobilizationCents: 0 });
    expect(amounts(rows)).toEqual([67_200, 120_000]);
    expect(rows.map((row) => row.cutIds)).toEqual([[trench.id], [cores.id]]);
    expect(rows[0]?.description).toBe('T1: trench 40 × 2 ft, 6 in thick');
    expect(rows[1]?.description).toBe('C1: 6 × core 4 in dia., 8 in deep');
  });

  it('splits a lump also over a wire cut and bars, which have no inch-feet', () => {
    // 33 sq ft at 16.5 sq ft an hour → 120 min; 30 bars at 2 min → 60 min.
    const wire: CutLine = {
      ...trench,
      cut: { kind: 'wire', areaSqFt: 33, pilotCores: 0, pilotDiameterIn: 2, depthIn: 24, count: 1 },
    };
    const bars: CutLine = { ...cores, cut: { kind: 'bar', diameterIn: 0.625, count: 30 } };
    const rows = scheduleOfValues([wire, bars], { totalCents: 90_000, lines: [], mobilizationCents: 0 });
    expect(amounts(rows)).toEqual([60_000, 30_000]);
  });

  it('takes the lines of a bid as they are, with mobilization as a line of its own', () => {
    const rows = scheduleOfValues(cuts, {
      totalCents: 85_000,
      lines: priced({ [trench.id]: 42_840, [cores.id]: 17_160 }),
      mobilizationCents: 25_000,
    });
    expect(amounts(rows)).toEqual([42_840, 17_160, 25_000]);
    expect(rows[2]).toEqual({ description: 'Mobilization', cutIds: [], amountCents: 25_000 });
  });

  it('spreads what a minimum adds by the cents of the lines', () => {
    const rows = scheduleOfValues(cuts, {
      totalCents: 60_000,
      lines: priced({ [trench.id]: 20_000, [cores.id]: 10_000 }),
      mobilizationCents: 0,
    });
    expect(amounts(rows)).toEqual([40_000, 20_000]);
  });

  it('joins a cut that is worth nothing to the most valuable line', () => {
    const rows = scheduleOfValues(cuts, {
      totalCents: 500,
      lines: priced({ [trench.id]: 500 }),
      mobilizationCents: 0,
    });
    expect(rows).toHaveLength(1);
    expect(rows[0]?.cutIds).toEqual([trench.id, cores.id]);
    expect(rows[0]?.description).toContain('C1: 6 × core');
  });

  it('refuses lines that come to more than the total', () => {
    expect(() =>
      scheduleOfValues(cuts, { totalCents: 10, lines: priced({ [trench.id]: 11 }), mobilizationCents: 0 }),
    ).toThrow(RangeError);
  });

  it('always sums to the total, names each cut once and has no line without money', () => {
    const line = fc.record({ cents: fc.integer({ min: 0, max: 5_000_000 }) });
    fc.assert(
      fc.property(
        fc.array(line, { minLength: 1, maxLength: 20 }),
        fc.integer({ min: 0, max: 900_000 }),
        fc.integer({ min: 0, max: 900_000 }),
        fc.boolean(),
        (lines, minimumCents, mobilizationCents, isLump) => {
          const list = lines.map((_, index) => ({
            ...(index % 2 === 0 ? trench : cores),
            id: id(index + 10),
            mark: `M${index}`,
          }));
          const lineCents = sum(lines.map((entry) => entry.cents));
          const totalCents = Math.max(minimumCents, lineCents) + mobilizationCents;
          fc.pre(totalCents > 0);
          const cents = Object.fromEntries(list.map((cut, index) => [cut.id, lines[index]?.cents ?? 0]));
          const rows = scheduleOfValues(list, {
            totalCents,
            lines: isLump ? [] : priced(cents),
            mobilizationCents: isLump ? 0 : mobilizationCents,
          });
          expect(sum(amounts(rows))).toBe(totalCents);
          expect(rows.flatMap((row) => row.cutIds).sort()).toEqual(list.map((cut) => cut.id).sort());
          expect(Math.min(...amounts(rows))).toBeGreaterThan(0);
        },
      ),
    );
  });
});
