import { windowWords } from './window-words.ts';

describe('a window in words', () => {
  it('is read on a clock at the site, over midnight with both days', () => {
    const night = { startsAt: '2027-01-12T00:00:00.000Z', endsAt: '2027-01-12T10:00:00.000Z' };
    expect(windowWords(night, 'America/New_York')).toBe('Mon, Jan 11, 7:00 PM to Tue, Jan 12, 5:00 AM EST');
    expect(windowWords(night, 'America/Denver')).toBe('Mon, Jan 11, 5:00 PM to Tue, Jan 12, 3:00 AM MST');
  });

  it('names a single day once, with the zone of its season', () => {
    const day = { startsAt: '2027-07-06T13:00:00.000Z', endsAt: '2027-07-06T21:30:00.000Z' };
    expect(windowWords(day, 'America/New_York')).toBe('Tue, Jul 6, 9:00 AM to 5:30 PM EDT');
  });
});
