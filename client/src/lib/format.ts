import { nowMs } from './clock.ts';

/** The one place that formats by `Intl`. US English figures; words around them come from the catalogues. */
const LOCALE = 'en-US';
const numberFormats = new Map<string, Intl.NumberFormat>();
const dateFormats = new Map<string, Intl.DateTimeFormat>();

function numberFormat(options: Intl.NumberFormatOptions): Intl.NumberFormat {
  const key = JSON.stringify(options);
  const found = numberFormats.get(key) ?? new Intl.NumberFormat(LOCALE, options);
  numberFormats.set(key, found);
  return found;
}

function dateFormat(options: Intl.DateTimeFormatOptions): Intl.DateTimeFormat {
  const key = JSON.stringify(options);
  const found = dateFormats.get(key) ?? new Intl.DateTimeFormat(LOCALE, options);
  dateFormats.set(key, found);
  return found;
}

/** `$1,234.50`; whole dollars drop the cents only when asked, since a column must line up. */
export function formatMoney(cents: number, options: { dropZeroCents?: boolean } = {}): string {
  const whole = options.dropZeroCents === true && cents % 100 === 0;
  return numberFormat({
    style: 'currency',
    currency: 'USD',
    minimumFractionDigits: whole ? 0 : 2,
    maximumFractionDigits: whole ? 0 : 2,
  }).format(cents / 100);
}

/** `$2.90`, `$0.0425`: a rate in cents, which may have parts of a cent. */
export function formatRate(cents: number): string {
  return numberFormat({
    style: 'currency',
    currency: 'USD',
    minimumFractionDigits: 2,
    maximumFractionDigits: 4,
  }).format(cents / 100);
}

/** A figure with at most `digits` decimals (one unless told), grouped by thousands. */
export function formatNumber(value: number, digits = 1): string {
  return numberFormat({ maximumFractionDigits: digits }).format(value);
}

/** `62 %` of a ratio 0.62. */
export function formatPercent(ratio: number, digits = 0): string {
  return numberFormat({ style: 'percent', maximumFractionDigits: digits }).format(ratio);
}

/** `3.4 MB`: decimal megabytes and kilobytes, as file managers show them. */
export function formatBytes(bytes: number): string {
  if (bytes < 1000) return `${bytes} B`;
  if (bytes < 1_000_000) return `${formatNumber(bytes / 1000, 0)} kB`;
  return `${formatNumber(bytes / 1_000_000, 1)} MB`;
}

/** `Tue, Dec 1, 2:00 PM EST`: an instant in the zone of the site, the zone always named. */
export function formatDateTime(instant: string | Date, timeZone: string): string {
  return dateFormat({
    weekday: 'short',
    month: 'short',
    day: 'numeric',
    hour: 'numeric',
    minute: '2-digit',
    timeZoneName: 'short',
    timeZone,
  }).format(new Date(instant));
}

/** `Dec 1, 2026` in a zone; a bare date (`2026-12-01`) is taken as it stands. */
export function formatDate(value: string | Date, timeZone = 'UTC'): string {
  return dateFormat({ month: 'short', day: 'numeric', year: 'numeric', timeZone }).format(new Date(value));
}

/** `Tuesday, Dec 1` in a zone. */
export function formatDay(value: string | Date, timeZone: string): string {
  return dateFormat({ weekday: 'long', month: 'short', day: 'numeric', timeZone }).format(new Date(value));
}

/** `2:00 PM` in a zone, the zone not named: for rows under a heading that names it. */
export function formatTime(value: string | Date, timeZone: string): string {
  return dateFormat({ hour: 'numeric', minute: '2-digit', timeZone }).format(new Date(value));
}

/** The short name of a zone at an instant: `EST`, `PDT`. */
export function zoneName(timeZone: string, at: string | Date = new Date(nowMs())): string {
  const parts = dateFormat({ timeZoneName: 'short', timeZone }).formatToParts(new Date(at));
  return parts.find((part) => part.type === 'timeZoneName')?.value ?? timeZone;
}

/** Wall-clock fields of an instant in a zone, two digits each: what `<input type="datetime-local">` wants. */
export function toLocalInput(instant: string | Date, timeZone: string): string {
  const parts = dateFormat({
    year: 'numeric',
    month: '2-digit',
    day: '2-digit',
    hour: '2-digit',
    minute: '2-digit',
    hourCycle: 'h23',
    timeZone,
  }).formatToParts(new Date(instant));
  const part = (type: Intl.DateTimeFormatPartTypes) => parts.find((item) => item.type === type)?.value ?? '';
  return `${part('year').padStart(4, '0')}-${part('month')}-${part('day')}T${part('hour')}:${part('minute')}`;
}

/**
 * The instant of a wall-clock time in a zone, as ISO in UTC. A time that occurs twice (clocks going back) is the first
 * of the two; one that does not exist (clocks going forward) moves on by the missing hour.
 * @param local `YYYY-MM-DDTHH:mm`
 */
export function fromLocalInput(local: string, timeZone: string): string | null {
  const match = /^(\d{4})-(\d{2})-(\d{2})T(\d{2}):(\d{2})$/.exec(local);
  if (match === null) return null;
  const asUtc = Date.parse(`${local}:00Z`);
  if (!Number.isFinite(asUtc)) return null;
  // Offsets of the day before and after cover both sides of any change of the clocks.
  const offsets = [asUtc - 86_400_000, asUtc + 86_400_000].map((at) => offsetMs(at, timeZone));
  const candidates = offsets.map((offset) => asUtc - offset).sort((a, b) => a - b);
  const exact = candidates.find((at) => at + offsetMs(at, timeZone) === asUtc);
  const instant = exact ?? asUtc - Math.min(...offsets);
  return new Date(instant).toISOString();
}

function offsetMs(at: number, timeZone: string): number {
  return Date.parse(`${toLocalInput(new Date(at), timeZone)}:00Z`) - Math.floor(at / 60_000) * 60_000;
}

/** Whole days, hours, minutes and seconds of a span, none negative. */
export function splitDuration(ms: number): { days: number; hours: number; minutes: number; seconds: number } {
  const total = Math.max(0, Math.floor(ms / 1000));
  return {
    days: Math.floor(total / 86_400),
    hours: Math.floor((total % 86_400) / 3600),
    minutes: Math.floor((total % 3600) / 60),
    seconds: total % 60,
  };
}
