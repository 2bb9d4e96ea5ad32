import { createHmac, timingSafeEqual } from 'node:crypto';

/** RFC 6238, 4.1 and 5.2: thirty seconds a step; one step either way makes up for clocks and slow typing. */
export const STEP_SECONDS = 30;
const STEPS_AROUND = 1;
const DIGITS = 6;

/** The time step of an instant (milliseconds since 1970). */
export const stepAt = (ms: number): number => Math.floor(ms / (STEP_SECONDS * 1_000));

/**
 * The code of one time step: HMAC-SHA-1 and dynamic truncation (RFC 4226, 5.3), as authenticator apps count it.
 * @param digits 6, or 8 as in the RFC's test vectors
 */
export function totpCode(secret: Buffer, step: number, digits: 6 | 8 = DIGITS): string {
  const counter = Buffer.alloc(8);
  counter.writeBigUInt64BE(BigInt(step));
  const mac = createHmac('sha1', secret).update(counter).digest();
  const offset = mac.readUInt8(mac.length - 1) & 0x0f;
  const number = mac.readUInt32BE(offset) & 0x7fff_ffff;
  return String(number % 10 ** digits).padStart(digits, '0');
}

/** The step whose code this is, among those around now; null when it is none of them. */
export function matchingStep(secret: Buffer, code: string, nowMs: number): number | null {
  const now = stepAt(nowMs);
  const steps = Array.from({ length: 2 * STEPS_AROUND + 1 }, (_, n) => now - STEPS_AROUND + n);
  // All of them are compared, whichever fits: the time says nothing.
  const fitting = steps.filter((step) => isSame(totpCode(secret, step), code));
  return fitting.at(-1) ?? null;
}

function isSame(one: string, other: string): boolean {
  return one.length === other.length && timingSafeEqual(Buffer.from(one), Buffer.from(other));
}

const BASE32 = 'ABCDEFGHIJKLMNOPQRSTUVWXYZ234567';

/** RFC 4648, 6, without padding: how authenticator apps take a secret. */
export function toBase32(bytes: Buffer): string {
  const bits = [...bytes].map((byte) => byte.toString(2).padStart(8, '0')).join('');
  const groups = bits.match(/.{1,5}/g) ?? [];
  return groups.map((group) => BASE32.charAt(Number.parseInt(group.padEnd(5, '0'), 2))).join('');
}

/** The address that authenticator apps read from a QR code. */
export function totpAddress(secret: Buffer, account: string): string {
  const parameters = new URLSearchParams({
    secret: toBase32(secret),
    issuer: 'Kerfyard',
    algorithm: 'SHA1',
    digits: String(DIGITS),
    period: String(STEP_SECONDS),
  });
  return `otpauth://totp/Kerfyard:${encodeURIComponent(account)}?${parameters.toString()}`;
}
