import { checkList, checkNumber, checkObject } from './check.ts';
import { CuttingInputError } from './input-error.ts';

const dayMs = 86_400_000;
const maxHolidays = 1_000;

/**
 * Earliest date to dig after a one-call notice, as an ISO date: the day of notice is not counted, then the full
 * business days pass (no Saturday, Sunday or holiday), and digging may start the next day, whatever day that is.
 * State law sets the number of days.
 * @throws CuttingInputError
 */
export function earliestDigDate(input: {
  readonly notifiedOn: string;
  readonly fullBusinessDays: number;
  readonly holidays: readonly string[];
}): string {
  const fields = checkObject(input, 'input');
  const notifiedMs = checkDate(fields.notifiedOn, 'notifiedOn');
  const fullBusinessDays = checkNumber(fields.fullBusinessDays, 'fullBusinessDays', {
    min: 1,
    max: 60,
    integer: true,
    unit: 'days',
  });
  const holidays = new Set(
    checkList(fields.holidays, 'holidays', maxHolidays).map((holiday, index) =>
      checkDate(holiday, `holidays[${index}]`),
    ),
  );
  let dateMs = notifiedMs;
  let passed = 0;
  while (passed < fullBusinessDays) {
    dateMs += dayMs;
    if (isBusinessDay(dateMs, holidays)) passed += 1;
  }
  return isoDate(dateMs + dayMs);
}

function isBusinessDay(dateMs: number, holidays: ReadonlySet<number>): boolean {
  const weekday = new Date(dateMs).getUTCDay();
  return weekday !== 0 && weekday !== 6 && !holidays.has(dateMs);
}

// Dates without a time are counted as days of UTC, where every day has 24 hours.
function checkDate(value: unknown, field: string): number {
  const isShaped = typeof value === 'string' && /^\d{4}-\d{2}-\d{2}$/.test(value);
  const dateMs = isShaped ? Date.parse(`${value}T00:00:00Z`) : Number.NaN;
  // Date.parse turns 30 February into March; reading it back shows that.
  if (
    !Number.isFinite(dateMs) ||
    isoDate(dateMs) !== value ||
    dateMs < Date.UTC(1900, 0) ||
    dateMs >= Date.UTC(9000, 0)
  ) {
    throw new CuttingInputError({ field, allowed: 'a date as YYYY-MM-DD from 1900 to 8999', given: value });
  }
  return dateMs;
}

function isoDate(dateMs: number): string {
  return new Date(dateMs).toISOString().slice(0, 10);
}
