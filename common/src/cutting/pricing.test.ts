import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { priceCuts, tabulateBids, type PriceLine } from './index.ts';

const noExtras = { extras: [], minimumCents: 0, mobilizationCents: 0 };

function line(overrides: Partial<PriceLine> = {}): PriceLine {
  return { id: 'a', trip: 1, quantity: 100, unit: 'in-ft', rate: 10_000, factors: [], ...overrides };
}

describe('priceCuts', () => {
  it('multiplies quantity by rate and factors, and rounds half up to a cent once a line', () => {
    // 1.00 × 50 hundredths of a cent is half a cent; 49 is not.
    expect(priceCuts({ ...noExtras, lines: [line({ rate: 50 })] }).totalCents).toBe(1);
    expect(priceCuts({ ...noExtras, lines: [line({ rate: 49 })] }).totalCents).toBe(0);
    // 612 in-ft at $1.25, heavy bar 1.5: 612 × 125 × 1.5
    const job = priceCuts({ ...noExtras, lines: [line({ quantity: 61_200, rate: 12_500, factors: [150] })] });
    expect(job.lines[0]).toEqual({ id: 'a', cents: 114_750, factorPct: 150, isFactorCapped: false });
  });

  it('stops factors at the cap and says so', () => {
    // 1.5 × 1.75 × 1.4 = 3.675, capped at 2.5
    const job = priceCuts({ ...noExtras, lines: [line({ factors: [150, 175, 140] })] });
    expect(job.lines[0]).toEqual({ id: 'a', cents: 250, factorPct: 250, isFactorCapped: true });
    expect(job.working[0]?.inputs.at(-1)?.name).toContain('cap');
    const open = priceCuts({ ...noExtras, factorCapPct: 400, lines: [line({ factors: [150, 175, 140] })] });
    // 100 × 3.675 = 367.5, half up
    expect(open.lines[0]).toMatchObject({ cents: 368, isFactorCapped: false });
  });

  it('applies one minimum a trip, extras counted in, and mobilization only when the minimum leaves it out', () => {
    const input = {
      lines: [
        line({ id: 'a', trip: 'Monday', quantity: 10_000 }),
        line({ id: 'b', trip: 'Tuesday', quantity: 100_000 }),
      ],
      extras: [{ id: 'x', trip: 'Monday', cents: 2_500 }],
      minimumCents: 45_000,
      mobilizationCents: 15_000,
    };
    const included = priceCuts(input);
    expect(included.trips).toEqual([
      { trip: 'Monday', computedCents: 12_500, minimumApplied: true, cents: 45_000 },
      { trip: 'Tuesday', computedCents: 100_000, minimumApplied: false, cents: 100_000 },
    ]);
    expect(included.totalCents).toBe(145_000);
    expect(priceCuts({ ...input, minimumIncludesMobilization: false }).totalCents).toBe(175_000);
  });

  it('a sum equal to the minimum is not the minimum applied', () => {
    const job = priceCuts({ ...noExtras, minimumCents: 100, lines: [line()] });
    expect(job.trips[0]).toMatchObject({ computedCents: 100, minimumApplied: false });
  });

  it('nothing to do costs nothing, not even a trip', () => {
    expect(priceCuts({ lines: [], extras: [], minimumCents: 45_000, mobilizationCents: 1 }).totalCents).toBe(
      0,
    );
  });

  it('agrees with exact fractions of large numbers, and adds up', () => {
    const lines = fc.array(
      fc.record({
        id: fc.integer({ min: 0, max: 9_999 }),
        trip: fc.integer({ min: 1, max: 4 }),
        quantity: fc.integer({ min: 0, max: 5_000_000 }),
        unit: fc.constant('ft'),
        rate: fc.integer({ min: 0, max: 5_000_000 }),
        factors: fc.array(fc.integer({ min: 50, max: 200 }), { maxLength: 4 }),
      }),
      { maxLength: 12 },
    );
    fc.assert(
      fc.property(lines, (priced) => {
        const job = priceCuts({ ...noExtras, lines: priced });
        for (const [index, { quantity, rate, factors }] of priced.entries()) {
          const exact = factors.reduce(
            (product, factor) => product * BigInt(factor),
            BigInt(quantity) * BigInt(rate),
          );
          const scale = 10_000n * 100n ** BigInt(factors.length);
          const product = factors.reduce((share, factor) => (share * factor) / 100, 1);
          const [top, bottom] =
            product > 2.5 ? [BigInt(quantity) * BigInt(rate) * 250n, 1_000_000n] : [exact, scale];
          const cents = top / bottom + ((top % bottom) * 2n >= bottom ? 1n : 0n);
          expect(BigInt(job.lines[index]?.cents ?? -1)).toBe(cents);
        }
        const total = job.lines.reduce((sum, { cents }) => sum + cents, 0);
        expect(job.totalCents).toBe(total);
        expect(job.trips.reduce((sum, { cents }) => sum + cents, 0)).toBe(total);
      }),
    );
  });

  it('says whose numbers it used', () => {
    const job = priceCuts({ ...noExtras, lines: [line()] });
    expect(job.working.map((step) => step.source.origin)).toEqual(['company', 'company', 'arithmetic']);
  });
});

describe('tabulateBids', () => {
  const rows = [
    { id: 'haul', plugCents: 120_000 },
    { id: 'scan', plugCents: 60_000 },
    { id: 'slurry', plugCents: 25_000 },
  ];

  it('adds the plug of each excluded row, counts the unclear, and sorts by what is comparable', () => {
    const table = tabulateBids({
      rows,
      bids: [
        { id: 'low', baseCents: 400_000, answers: { haul: 'excluded', scan: 'excluded', slurry: 'unclear' } },
        {
          id: 'whole',
          baseCents: 500_000,
          answers: { haul: 'included', scan: 'included', slurry: 'included' },
        },
        { id: 'silent', baseCents: 500_000, answers: { haul: 'included' } },
      ],
    });
    expect(table.map(({ working: _working, ...bid }) => bid)).toEqual([
      { id: 'silent', baseCents: 500_000, plugsCents: 0, unclear: 2, adjustedCents: 500_000 },
      { id: 'whole', baseCents: 500_000, plugsCents: 0, unclear: 0, adjustedCents: 500_000 },
      { id: 'low', baseCents: 400_000, plugsCents: 180_000, unclear: 1, adjustedCents: 580_000 },
    ]);
  });

  it('refuses an answer to no row, a row twice, and an unknown answer', () => {
    const bid = { id: 'b', baseCents: 1, answers: {} };
    expect(() => tabulateBids({ rows, bids: [{ ...bid, answers: { patch: 'included' } }] })).toThrow(
      expect.objectContaining({ field: 'bids[0].answers.patch' }),
    );
    expect(() => tabulateBids({ rows: [...rows, ...rows], bids: [] })).toThrow(
      expect.objectContaining({ field: 'rows[3].id' }),
    );
    expect(() => tabulateBids({ rows, bids: [{ ...bid, answers: { haul: 'maybe' as 'unclear' } }] })).toThrow(
      expect.objectContaining({ field: 'bids[0].answers.haul' }),
    );
  });
});
