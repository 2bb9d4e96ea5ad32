import type { RateCard } from '@kerfyard/common/people';
import { openBytes, sealBytes } from '../platform/crypto/sealing.ts';

/** The length of a ciphertext says how many rates there are; in steps this coarse it says no more than that. */
const PADDING_BYTES = 4096;

const contextOf = (companyId: string) => `rate-card|${companyId}`;

/** A card as it lies in the database: under the company's own key, bound to its company. */
export function sealRateCard(card: RateCard, companyId: string, companyKey: Buffer): Buffer {
  const json = Buffer.from(JSON.stringify(card), 'utf8');
  const length = Math.ceil(json.length / PADDING_BYTES) * PADDING_BYTES;
  // JSON does not mind spaces at its end.
  const padded = Buffer.concat([json], length).fill(' ', json.length);
  return sealBytes(companyKey, padded, contextOf(companyId));
}

/** The reverse. @throws Error when the key or the company is another, or a byte was altered */
export function openRateCard(sealed: Buffer, companyId: string, companyKey: Buffer): RateCard {
  return JSON.parse(openBytes(companyKey, sealed, contextOf(companyId)).toString('utf8')) as RateCard;
}
