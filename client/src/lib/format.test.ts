import { describe, expect, it } from 'vitest';
import { toCsv } from './csv.ts';
import {
  formatBytes,
  formatDateTime,
  formatMoney,
  formatNumber,
  fromLocalInput,
  toLocalInput,
} from './format.ts';

describe('figures', () => {
  it('writes cents as dollars and drops zero cents only when asked', () => {
    expect(formatMoney(123450)).toBe('$1,234.50');
    expect(formatMoney(500_000)).toBe('$5,000.00');
    expect(formatMoney(500_000, { dropZeroCents: true })).toBe('$5,000');
    expect(formatMoney(-1)).toBe('-$0.01');
  });
  it('rounds to the digits asked for', () => {
    expect(formatNumber(6.8284)).toBe('6.8');
    expect(formatNumber(612)).toBe('612');
    expect(formatBytes(25 * 1024 * 1024)).toBe('26.2 MB');
  });
});

describe('times', () => {
  it('names the zone of the site', () => {
    expect(formatDateTime('2026-12-01T19:00:00.000Z', 'America/New_York')).toBe('Tue, Dec 1, 2:00 PM EST');
    expect(formatDateTime('2026-07-01T19:00:00.000Z', 'America/Phoenix')).toBe('Wed, Jul 1, 12:00 PM MST');
  });
  it('turns wall-clock time in a zone into an instant and back', () => {
    const zone = 'America/Chicago';
    expect(fromLocalInput('2026-12-01T07:30', zone)).toBe('2026-12-01T13:30:00.000Z');
    expect(toLocalInput('2026-12-01T13:30:00.000Z', zone)).toBe('2026-12-01T07:30');
    expect(fromLocalInput('2026-07-01T07:30', zone)).toBe('2026-07-01T12:30:00.000Z');
    expect(fromLocalInput('', zone)).toBeNull();
    expect(fromLocalInput('2026-13-01T07:30', zone)).toBeNull();
  });
  it('takes the first of two equal wall-clock times and moves a missing one on', () => {
    const zone = 'America/Chicago';
    // 2026: clocks go back on November 1 at 2:00 and forward on March 8 at 2:00 (15 U.S.C. 260a).
    expect(fromLocalInput('2026-11-01T01:30', zone)).toBe('2026-11-01T06:30:00.000Z');
    expect(fromLocalInput('2026-03-08T02:30', zone)).toBe('2026-03-08T08:30:00.000Z');
  });
});

describe('CSV', () => {
  it('quotes, and disarms what a spreadsheet would run (D-50)', () => {
    expect(
      toCsv([
        ['name', 'cents'],
        ['=HYPERLINK("x")', -5],
        ['a, "b"', null],
        ['-12.5', '+1'],
      ]),
    ).toBe('name,cents\r\n"\'=HYPERLINK(""x"")",-5\r\n"a, ""b""",\r\n-12.5,\'+1\r\n');
  });
});
