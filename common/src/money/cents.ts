/** Money is whole cents, US dollars, in a safe integer. */
export type Cents = number;

/** The largest amount any single field takes: ten million dollars. */
export const MAX_CENTS = 1_000_000_000;

/** Basis points: 100 = 1 %. */
export type BasisPoints = number;

/** Whether a value is whole cents that a number holds exactly. */
export function isCents(value: unknown): value is Cents {
  return Number.isSafeInteger(value);
}

/**
 * Split a total over weights by largest remainder: floor each share, hand the left-over cents to the largest
 * fractions (ties to the earlier line). The shares always sum to the total, so no rounding account exists.
 * @param total cents, zero or more
 * @param weights non-negative numbers; all zero means equal shares
 * @throws RangeError on an empty list, a negative weight or a total that is no whole non-negative number of cents
 */
export function splitByLargestRemainder(total: Cents, weights: readonly number[]): Cents[] {
  if (weights.length === 0) throw new RangeError('weights: at least one is needed');
  if (!isCents(total) || total < 0) throw new RangeError('total: whole cents, zero or more');
  if (weights.some((weight) => !Number.isFinite(weight) || weight < 0)) {
    throw new RangeError('weights: finite and not negative');
  }
  // Weights are scaled to whole numbers so that the arithmetic below is exact.
  const sum = weights.reduce((a, b) => a + b, 0);
  const scaled = weights.map((weight) => (sum === 0 ? 1n : BigInt(Math.round((weight / sum) * 1e12))));
  const whole = scaled.reduce((a, b) => a + b, 0n);
  const shares = scaled.map((weight) => (BigInt(total) * weight) / whole);
  const rests = scaled.map((weight, index) => ({ index, rest: (BigInt(total) * weight) % whole }));
  let left = total - Number(shares.reduce((a, b) => a + b, 0n));
  rests.sort((a, b) => (a.rest === b.rest ? a.index - b.index : a.rest < b.rest ? 1 : -1));
  const result = shares.map(Number);
  for (const { index } of rests) {
    if (left === 0) break;
    result[index] = (result[index] ?? 0) + 1;
    left -= 1;
  }
  return result;
}

/** The floor of a percentage in basis points: what is left over always stays with the other share. */
export function shareFloor(total: Cents, basisPoints: BasisPoints): Cents {
  return Number((BigInt(total) * BigInt(basisPoints)) / 10_000n);
}
