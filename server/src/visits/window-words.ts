import { DateTime } from 'luxon';
import type { VisitWindow } from '@kerfyard/common/visits';

/** A window in words, read on a clock at the site: "Mon, Jan 11, 7:00 PM to Tue, Jan 12, 5:00 AM EST". */
export function windowWords(window: VisitWindow, timeZone: string): string {
  const from = DateTime.fromISO(window.startsAt, { zone: timeZone, locale: 'en-US' });
  const to = DateTime.fromISO(window.endsAt, { zone: timeZone, locale: 'en-US' });
  const end = to.hasSame(from, 'day') ? to.toFormat('h:mm a ZZZZ') : to.toFormat('ccc, LLL d, h:mm a ZZZZ');
  return `${from.toFormat('ccc, LLL d, h:mm a')} to ${end}`;
}
