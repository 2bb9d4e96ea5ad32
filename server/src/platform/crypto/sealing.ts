import { createCipheriv, createDecipheriv, hkdfSync, randomBytes } from 'node:crypto';

/**
 * AES-256-GCM (NIST SP 800-38D) with a random 96-bit nonce per message. Layout of a sealed value:
 * one version byte, 12 bytes nonce, 16 bytes tag, ciphertext. `context` is authenticated but not stored: a value moved
 * to another row, or opened for another purpose, does not open.
 */
const VERSION = 1;
const NONCE_BYTES = 12;
const TAG_BYTES = 16;
export const KEY_BYTES = 32;

/** A fresh random key of 32 bytes. */
export const newKey = (): Buffer => randomBytes(KEY_BYTES);

/** Encrypt `plain` under a 32-byte key, bound to `context` (for example `company:<id>`). */
export function sealBytes(key: Buffer, plain: Buffer, context: string): Buffer {
  const nonce = randomBytes(NONCE_BYTES);
  const cipher = createCipheriv('aes-256-gcm', key, nonce);
  cipher.setAAD(Buffer.from(context, 'utf8'));
  const body = Buffer.concat([cipher.update(plain), cipher.final()]);
  return Buffer.concat([Buffer.of(VERSION), nonce, cipher.getAuthTag(), body]);
}

/**
 * Decrypt what `sealBytes` made.
 * @throws Error when the key or context differ or a bit was changed
 */
export function openBytes(key: Buffer, sealed: Buffer, context: string): Buffer {
  const head = 1 + NONCE_BYTES + TAG_BYTES;
  if (sealed.length < head || sealed[0] !== VERSION) throw new Error('Not a sealed value of this version');
  const decipher = createDecipheriv('aes-256-gcm', key, sealed.subarray(1, 1 + NONCE_BYTES), {
    authTagLength: TAG_BYTES,
  });
  decipher.setAAD(Buffer.from(context, 'utf8'));
  decipher.setAuthTag(sealed.subarray(1 + NONCE_BYTES, head));
  return Buffer.concat([decipher.update(sealed.subarray(head)), decipher.final()]);
}

/** A key of its own for one purpose, derived from a longer-lived secret (HKDF-SHA256, RFC 5869). */
export function deriveKey(secret: string | Buffer, purpose: string): Buffer {
  return Buffer.from(hkdfSync('sha256', secret, Buffer.alloc(0), purpose, KEY_BYTES));
}
