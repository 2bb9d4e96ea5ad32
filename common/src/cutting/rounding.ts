// Binary fractions make 4.2 / 1.4 come out a hair above 3. One part in a billion is far below anything that
// can be measured on concrete and far above that hair.
const hair = 1e-9;

/** The next whole number up, forgiving one part in a billion, so that 4.2 ft in 1.4-ft pieces is 3 pieces. */
export function wholeUp(value: number): number {
  return Math.ceil(value - Math.abs(value) * hair);
}

/** True when `value` is not over `limit`, forgiving one part in a billion. */
export function isWithin(value: number, limit: number): boolean {
  return value <= limit + Math.abs(limit) * hair;
}

/** Negative, zero or positive like a sort comparison; numbers one part in a billion apart are equal. */
export function compareNearly(left: number, right: number): number {
  if (Math.abs(left - right) <= Math.max(Math.abs(left), Math.abs(right)) * hair) return 0;
  return left - right;
}
