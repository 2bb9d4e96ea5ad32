/**
 * BIGINT and COUNT come back from the driver as strings: as a number, refused when JavaScript would round it.
 * Null stays null.
 */
export function toNumber(value: string | number): number;
export function toNumber(value: string | number | null): number | null;
export function toNumber(value: string | number | null): number | null {
  if (value === null) return null;
  const number = Number(value);
  if (!Number.isSafeInteger(number)) throw new Error('A database integer is outside the safe range');
  return number;
}

/** An instant as every answer carries it: UTC with milliseconds. Null stays null. */
export function toInstant(value: Date): string;
export function toInstant(value: Date | null): string | null;
export function toInstant(value: Date | null): string | null {
  return value === null ? null : value.toISOString();
}
