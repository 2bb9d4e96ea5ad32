import { createHash, randomBytes } from 'node:crypto';
import { toBase32 } from './totp.ts';

export const RECOVERY_CODES = 10;
/** 120 bits: above the 112 from which ASVS 6.5.2 lets a plain hash stand. 24 letters in base32. */
const BYTES = 15;

/** Fresh codes as a person keeps them, in groups of four. */
export function newRecoveryCodes(): string[] {
  return Array.from({ length: RECOVERY_CODES }, () =>
    (toBase32(randomBytes(BYTES)).match(/.{4}/g) ?? []).join('-'),
  );
}

/** What the database holds. Small letters, spaces and dashes are as people type them. */
export function hashRecoveryCode(code: string): Buffer {
  return createHash('sha256').update(code.toUpperCase().replace(/[\s-]/g, '')).digest();
}
