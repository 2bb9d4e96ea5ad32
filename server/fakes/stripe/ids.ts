import { randomBytes } from 'node:crypto';

const ALPHABET = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789';

function randomText(length: number): string {
  return Array.from(randomBytes(length), (byte) => ALPHABET[byte % ALPHABET.length]).join('');
}

/** Prefixes by kind, as in the provider's ids. */
export const PREFIXES = {
  account: 'acct',
  account_link: 'alink',
  balance_transaction: 'txn',
  bank_account: 'ba',
  bank_charge: 'py',
  bank_refund: 'pyr',
  capability: 'cap',
  charge: 'ch',
  checkout_session: 'cs_test',
  customer: 'cus',
  dispute: 'dp',
  event: 'evt',
  item: 'li',
  mandate: 'mandate',
  payment_intent: 'pi',
  payment_method: 'pm',
  payout: 'po',
  price: 'price',
  product: 'prod',
  refund: 're',
  request: 'req',
  source: 'src',
  topup: 'tu',
  transfer: 'tr',
  transfer_reversal: 'trr',
  webhook_endpoint: 'we',
} as const;

export type IdKind = keyof typeof PREFIXES;

/** A new random id, for example `ch_3f…`. */
export function newId(kind: IdKind): string {
  const length = kind === 'checkout_session' ? 58 : kind === 'account' ? 16 : 24;
  return `${PREFIXES[kind]}_${randomText(length)}`;
}

/** A new secret with the given prefix, for example a webhook's signing secret. */
export function newSecret(prefix: string): string {
  return `${prefix}_${randomText(32)}`;
}
