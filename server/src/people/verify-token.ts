import { createHash, createHmac } from 'node:crypto';
import { deriveKey } from '../platform/crypto/sealing.ts';

/**
 * The secret of a sign-up's link: 256 bits that only this server can make from the sign-up's id. So the mail can be
 * built, and built again, when it is sent; the database and the job hold only the id and the token's hash.
 */
export function verifyToken(signingSecret: string, signUpId: string): string {
  return createHmac('sha256', deriveKey(signingSecret, 'kerfyard verify e-mail'))
    .update(signUpId)
    .digest('base64url');
}

/** What is stored of a token from a mail: its SHA-256, since 256 bits that nobody can guess need no slower hash. */
export const hashToken = (token: string): Buffer => createHash('sha256').update(token).digest();
