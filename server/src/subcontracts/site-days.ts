import { DateTime } from 'luxon';

/**
 * The last instant of the day that lies a number of calendar days after an instant, by the site's calendar: a date of
 * expiry ends in the site's zone, not in the server's.
 * @throws RangeError for a zone that is not known
 */
export function endOfDayAfter(from: Date, days: number, timeZone: string): Date {
  const end = DateTime.fromJSDate(from, { zone: timeZone }).plus({ days }).endOf('day');
  if (!end.isValid) throw new RangeError(`time zone: ${timeZone}`);
  return end.toJSDate();
}
