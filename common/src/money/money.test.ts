import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  MAX_CENTS,
  platformChargeCents,
  shareFloor,
  splitByLargestRemainder,
  splitRelease,
} from './index.ts';

const manyTimes = { numRuns: 100_000 };
const cents = fc.integer({ min: 0, max: MAX_CENTS });
const basisPoints = fc.integer({ min: 0, max: 10_000 });

describe('dividing a release', () => {
  it('gives the worked example: 400,000 cents, 10 % retainage, 5 % fee on the rest', () => {
    // 400,000 × 10 % = 40,000 held; (400,000 − 40,000) × 5 % = 18,000; 400,000 − 40,000 − 18,000 = 342,000.
    expect(splitRelease(400_000, { retainageBasisPoints: 1000, feeBasisPoints: 500 })).toEqual({
      grossCents: 400_000,
      retainageCents: 40_000,
      feeCents: 18_000,
      crewCents: 342_000,
    });
  });

  it('B-I12: fee, crew and retainage are whole, not negative and sum to the gross, for 100,000 amounts and rates', () => {
    fc.assert(
      fc.property(cents, basisPoints, basisPoints, (grossCents, retainageBasisPoints, feeBasisPoints) => {
        const split = splitRelease(grossCents, { retainageBasisPoints, feeBasisPoints });
        const parts = [split.retainageCents, split.feeCents, split.crewCents];
        return (
          parts.every((part) => Number.isSafeInteger(part) && part >= 0) &&
          parts[0]! + parts[1]! + parts[2]! === grossCents
        );
      }),
      manyTimes,
    );
  });

  it('takes no more than the rate says, and less than a cent below it', () => {
    fc.assert(
      fc.property(cents, basisPoints, (total, rate) => {
        const share = BigInt(shareFloor(total, rate)) * 10_000n;
        const exact = BigInt(total) * BigInt(rate);
        return share <= exact && exact - share < 10_000n;
      }),
      manyTimes,
    );
  });
});

describe('splitting by largest remainder', () => {
  it('hands the left-over cent to the largest fraction, ties to the earlier line', () => {
    // 100 / 3 = 33 1/3 each: one cent is left, and the first line has it.
    expect(splitByLargestRemainder(100, [1, 1, 1])).toEqual([34, 33, 33]);
    // 10 × 5/8 = 6.25, 10 × 3/8 = 3.75: the second fraction is larger.
    expect(splitByLargestRemainder(10, [5, 3])).toEqual([6, 4]);
    expect(splitByLargestRemainder(5, [0, 0])).toEqual([3, 2]);
  });

  it('sums to the total, each share less than a cent from its exact part, nothing for no weight', () => {
    const weights = fc.array(fc.nat(1_000_000), { minLength: 1, maxLength: 12 });
    fc.assert(
      fc.property(cents, weights, (total, chosen) => {
        const shares = splitByLargestRemainder(total, chosen);
        const sum = chosen.reduce((all, weight) => all + weight, 0);
        const isNear = (share: number, index: number) => {
          const exact = sum === 0 ? total / chosen.length : (total * chosen[index]!) / sum;
          return Math.abs(share - exact) < 1 + 1e-3 && (sum === 0 || chosen[index] !== 0 || share === 0);
        };
        return shares.reduce((all, share) => all + share, 0) === total && shares.every(isNear);
      }),
      { numRuns: 20_000 },
    );
  });

  it.each([
    [-1, [1]],
    [0.5, [1]],
    [100, []],
    [100, [-1, 2]],
    [100, [Number.NaN]],
    [100, [Number.POSITIVE_INFINITY]],
  ])('refuses %s over %j', (total, weights) => {
    expect(() => splitByLargestRemainder(total, weights)).toThrow(RangeError);
  });
});

describe('the charge for setting money aside', () => {
  it('is the least that leaves the held amount whole after 2.9 % and 30 cents', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: MAX_CENTS }), (net) => {
        const gross = net + platformChargeCents(net, 'card');
        const covers = (paid: number) => BigInt(paid) * 971n >= (BigInt(net) + 30n) * 1000n;
        return covers(gross) && !covers(gross - 1);
      }),
      manyTimes,
    );
  });

  it('by card and by bank debit, worked out', () => {
    // ⌈1,000,030 / 0.971⌉ − 1,000,000 = 1,029,897.01… → 29,898.
    expect(platformChargeCents(1_000_000, 'card')).toBe(29_898);
    // ⌈10,000 / 0.992⌉ − 10,000 = 81; never more than five dollars.
    expect(platformChargeCents(10_000, 'bank_debit')).toBe(81);
    expect(platformChargeCents(1_000_000, 'bank_debit')).toBe(500);
  });
});
