import { createHmac } from 'node:crypto';
import { deriveKey } from '../platform/crypto/sealing.ts';

/** What a link in a mail is for; a token made for one purpose fits no other. */
const purposes = {
  reset: 'kerfyard reset password',
  email: 'kerfyard change e-mail',
  invitation: 'kerfyard invitation',
} as const;
export type LinkPurpose = keyof typeof purposes;

/** 256 bits that only this server can make from the row's id; see verify-token.ts for why it is made and not stored. */
export function linkToken(signingSecret: string, purpose: LinkPurpose, rowId: string): string {
  return createHmac('sha256', deriveKey(signingSecret, purposes[purpose])).update(rowId).digest('base64url');
}
