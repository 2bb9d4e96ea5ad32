/**
 * The one clock of the client. The server's clock decides what is due; where an answer carries the server's time,
 * `syncClock` moves ours to it, so that a countdown on a badly set phone still ends at the right moment.
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

/** @param serverInstant an ISO instant just received from the server */
export function syncClock(serverInstant: string): void {
  const server = Date.parse(serverInstant);
  if (Number.isFinite(server)) offsetMs = server - Date.now();
}

/** The zone of this device, an IANA name. */
export function deviceTimeZone(): string {
  return Intl.DateTimeFormat().resolvedOptions().timeZone;
}
