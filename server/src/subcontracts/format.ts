import { DateTime } from 'luxon';

const usDollars = new Intl.NumberFormat('en-US', { style: 'currency', currency: 'USD' });

/** Whole cents as dollars: "$1,234.50". */
export function dollars(cents: number): string {
  return usDollars.format(cents / 100);
}

/** A calendar date in words: "March 4, 2027". */
export function dateWords(isoDate: string): string {
  return DateTime.fromISO(isoDate, { zone: 'utc', locale: 'en-US' }).toFormat('LLLL d, yyyy');
}

/** An instant as read on a clock in the zone, with the zone's name: "March 4, 2027, 5:00 PM EST". */
export function instantWords(at: Date, timeZone: string): string {
  return DateTime.fromJSDate(at, { zone: timeZone }).setLocale('en-US').toFormat('LLLL d, yyyy, h:mm a ZZZZ');
}
