import { endOfDayAfter } from './site-days.ts';

describe('days by the site’s calendar', () => {
  it('ends with the day at the site, not in UTC', () => {
    // 11 pm on December 1 in New York is already December 2 in UTC.
    const late = new Date('2026-12-02T04:00:00.000Z');
    expect(endOfDayAfter(late, 7, 'America/New_York').toISOString()).toBe('2026-12-09T04:59:59.999Z');
    expect(endOfDayAfter(late, 7, 'UTC').toISOString()).toBe('2026-12-09T23:59:59.999Z');
  });

  it('counts calendar days over a change of the clocks', () => {
    // United States, March 14, 2027: the day has 23 hours.
    const before = new Date('2027-03-13T15:00:00.000Z');
    expect(endOfDayAfter(before, 1, 'America/New_York').toISOString()).toBe('2027-03-15T03:59:59.999Z');
  });

  it('refuses a zone that is none', () => {
    expect(() => endOfDayAfter(new Date(), 1, 'Nowhere/None')).toThrow(RangeError);
  });
});
