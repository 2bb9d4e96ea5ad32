import { fromLocalInput, toLocalInput } from './format.ts';

const DAY_MS = 86_400_000;

/** One day of a week view: its date and the instants it runs between, in one zone. */
export interface WeekDay {
  date: string;
  startsAt: string;
  endsAt: string;
}

/**
 * The seven days from Monday of the week that holds a date, in a zone; days of 23 and 25 hours included.
 * @param date `YYYY-MM-DD`
 */
export function weekOf(date: string, timeZone: string): WeekDay[] {
  const noon = Date.parse(`${date}T12:00:00Z`);
  const sinceMonday = (new Date(noon).getUTCDay() + 6) % 7;
  const monday = noon - sinceMonday * DAY_MS;
  const dates = Array.from({ length: 8 }, (_, index) =>
    new Date(monday + index * DAY_MS).toISOString().slice(0, 10),
  );
  const starts = dates.map((day) => fromLocalInput(`${day}T00:00`, timeZone) ?? `${day}T00:00:00.000Z`);
  return dates.slice(0, 7).map((day, index) => ({
    date: day,
    startsAt: starts[index] ?? '',
    endsAt: starts[index + 1] ?? '',
  }));
}

/** The date of an instant in a zone. */
export function dateIn(instant: string | Date, timeZone: string): string {
  return toLocalInput(instant, timeZone).slice(0, 10);
}

/** A date some days on. */
export function addDays(date: string, days: number): string {
  return new Date(Date.parse(`${date}T12:00:00Z`) + days * DAY_MS).toISOString().slice(0, 10);
}
