import { describe, expect, it } from 'vitest';
import { bidBand, isAllowedStepDown } from './index.ts';

describe('ranked bids go down by a real step', () => {
  it.each([
    ['exactly $10 and over 1 %', 50_000, 49_000, true],
    ['a cent short of $10', 50_000, 49_001, false],
    ['exactly 1 % of $5,000', 500_000, 495_000, true],
    ['a cent short of 1 %', 500_000, 495_001, false],
    ['$10 but under 1 %', 500_000, 499_000, false],
    ['the same price', 50_000, 50_000, false],
    ['a higher price', 50_000, 60_000, false],
  ])('%s', (_, from, to, allowed) => {
    expect(isAllowedStepDown(from, to)).toBe(allowed);
  });
});

describe('the band a losing bid is told', () => {
  it.each([
    [100_000, 'within_5'],
    [105_000, 'within_5'],
    [105_001, 'within_15'],
    [115_000, 'within_15'],
    [115_001, 'within_30'],
    [130_000, 'within_30'],
    [130_001, 'over_30'],
    [99_999, 'below'],
  ])('%d cents against an award of $1,000 is %s', (bid, band) => {
    expect(bidBand(bid, 100_000)).toBe(band);
  });
});
