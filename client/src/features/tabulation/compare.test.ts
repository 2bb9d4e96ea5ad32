import { expect, it } from 'vitest';
import { priceScale } from './compare.ts';

it('holds every amount between its ends, with round ticks', () => {
  const amounts = [783_600, 790_000, 965_000];
  const { at, ticks } = priceScale(amounts);
  for (const cents of amounts) {
    expect(at(cents)).toBeGreaterThan(0);
    expect(at(cents)).toBeLessThan(1);
  }
  expect(ticks.map((tick) => tick / 100)).toEqual([7000, 8000, 9000, 10_000]);
  expect(at(ticks[0] ?? 0)).toBe(0);
  expect(at(ticks.at(-1) ?? 0)).toBe(1);
});

it('spreads one bid, or equal bids, without dividing by nothing', () => {
  for (const amounts of [[500_000], [500_000, 500_000], [0]]) {
    const { at, ticks } = priceScale(amounts);
    expect(at(amounts[0] ?? 0)).toBeGreaterThanOrEqual(0);
    expect(at(amounts[0] ?? 0)).toBeLessThanOrEqual(1);
    expect(ticks.length).toBeGreaterThan(1);
  }
});
