import { createCipheriv, createDecipheriv, randomBytes } from 'node:crypto';

const ALGORITHM = 'aes-256-gcm';
const NONCE_BYTES = 12;
const TAG_BYTES = 16;

export const KEY_BYTES = 32;

/**
 * Encrypt with AES-256-GCM (NIST SP 800-38D) under a fresh random nonce.
 * @param context what the bytes belong to; decrypting under another context fails, so that a row cannot be moved
 * @returns nonce (12 bytes), ciphertext, tag (16 bytes), in that order
 */
export function encrypt(key: Buffer, plaintext: Buffer, context: string): Buffer {
  const nonce = randomBytes(NONCE_BYTES);
  const cipher = createCipheriv(ALGORITHM, key, nonce, { authTagLength: TAG_BYTES });
  cipher.setAAD(Buffer.from(context, 'utf8'));
  return Buffer.concat([nonce, cipher.update(plaintext), cipher.final(), cipher.getAuthTag()]);
}

/**
 * The reverse of `encrypt`.
 * @throws Error on another key, another context or altered bytes
 */
export function decrypt(key: Buffer, sealed: Buffer, context: string): Buffer {
  if (sealed.length < NONCE_BYTES + TAG_BYTES) throw new Error('Too short to be ciphertext');
  const decipher = createDecipheriv(ALGORITHM, key, sealed.subarray(0, NONCE_BYTES), {
    authTagLength: TAG_BYTES,
  });
  decipher.setAAD(Buffer.from(context, 'utf8'));
  decipher.setAuthTag(sealed.subarray(sealed.length - TAG_BYTES));
  const body = sealed.subarray(NONCE_BYTES, sealed.length - TAG_BYTES);
  return Buffer.concat([decipher.update(body), decipher.final()]);
}
