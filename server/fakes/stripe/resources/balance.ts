import type { Stripe } from 'stripe';
import { params } from '../params.ts';
import { PLATFORM } from '../records.ts';
import type { SourceType } from '../records.ts';
import { route } from '../router.ts';
import type { Work } from '../work.ts';

type Sides = Record<SourceType, number>;

export interface Standing {
  available: Sides;
  pending: Sides;
}

/** An owner's balance in cents: always the sum of its balance transactions, never a number kept beside them. */
export function standingOf(work: Work, owner: string): Standing {
  const standing: Standing = {
    available: { bank_account: 0, card: 0 },
    pending: { bank_account: 0, card: 0 },
  };
  for (const { api, notes } of work.list('balance_transaction', owner)) {
    const side = api.available_on <= work.now() ? standing.available : standing.pending;
    side[notes.sourceType] += api.net;
  }
  return standing;
}

/** Available cents, of one side or of both. */
export function availableCents(work: Work, owner: string, side?: SourceType): number {
  const { available } = standingOf(work, owner);
  return side ? available[side] : available.card + available.bank_account;
}

function amountOf(sides: Sides): Stripe.Balance.Available {
  const source_types = sides.bank_account === 0 ? { card: sides.card } : { ...sides };
  return { amount: sides.card + sides.bank_account, currency: 'usd', source_types };
}

/** The balance object of the API. */
export function presentBalance(work: Work, owner: string): Stripe.Balance {
  const { available, pending } = standingOf(work, owner);
  return {
    object: 'balance',
    available: [amountOf(available)],
    ...(owner === PLATFORM && { connect_reserved: [{ amount: 0, currency: 'usd' }] }),
    livemode: false,
    pending: [amountOf(pending)],
  };
}

export const balanceRoutes = [
  route('GET /v1/balance', 'BalanceRetrieveParams', params({}), ({ work, owner }) =>
    presentBalance(work, owner),
  ),
];

/** Money of `owner@availableOn` has become available. */
export function onSettle(work: Work, subject: string): void {
  const owner = subject.slice(0, subject.indexOf('@'));
  work.emit('balance.available', presentBalance(work, owner), owner);
}
