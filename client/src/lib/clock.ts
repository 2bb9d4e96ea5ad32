/**
 * The one clock of the client. The server's clock decides what is due; each answer carries the server's time
 * and `syncClock` moves ours to it, so that a countdown on a badly set phone still ends at the right moment.
 */
let offsetMs = 0;

/** Now, as the server sees it, in milliseconds since 1970. */
export function nowMs(): number {
  return Date.now() + offsetMs;
}

/** Now, as the server sees it. */
export function now(): Date {
  return new Date(nowMs());
}

/** The device's own clock, never moved: for spans between two moments on this device. */
export function deviceMs(): number {
  return Date.now();
}

/** An answer's `Date` has whole seconds and was some way off: a smaller difference says nothing. */
const TOLERANCE_MS = 3000;

/** @param serverDate the `Date` header of an answer that has just come (RFC 9110, 6.6.1), or null */
export function syncClock(serverDate: string | null): void {
  const server = serverDate === null ? Number.NaN : Date.parse(serverDate);
  if (!Number.isFinite(server)) return;
  const difference = server - Date.now();
  offsetMs = Math.abs(difference) < TOLERANCE_MS ? 0 : difference;
}

/** The zone of this device, an IANA name. */
export function deviceTimeZone(): string {
  return Intl.DateTimeFormat().resolvedOptions().timeZone;
}
