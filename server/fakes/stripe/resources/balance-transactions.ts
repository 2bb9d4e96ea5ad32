import type { Stripe } from 'stripe';
import { newId } from '../ids.ts';
import { pageOf } from '../lists.ts';
import { listParams, params, text } from '../params.ts';
import type { SourceType } from '../records.ts';
import { route } from '../router.ts';
import type { Work } from '../work.ts';

/** Reporting categories by type (docs.stripe.com/reports/reporting-categories). */
const REPORTING_CATEGORY: Record<string, string> = {
  adjustment: 'dispute',
  charge: 'charge',
  payment: 'charge',
  payment_refund: 'refund',
  payout: 'payout',
  payout_cancel: 'payout_reversal',
  payout_failure: 'payout_reversal',
  refund: 'refund',
  refund_failure: 'refund_failure',
  stripe_fee: 'fee',
  topup: 'topup',
  transfer: 'transfer',
  transfer_refund: 'transfer_reversal',
};

export interface BalanceMovement {
  type: string;
  /** Cents, signed: positive is money coming in. */
  amount: number;
  /** Cents kept by the provider; the balance changes by `amount − fee`. */
  fee?: number;
  source: string;
  sourceType: SourceType;
  /** Seconds; left out: available at once. */
  availableOn?: number;
  description?: string | null;
  reportingCategory?: string;
}

/** Records a movement of an owner's balance and returns its id. All money moves only here. */
export function recordMovement(work: Work, owner: string, movement: BalanceMovement): string {
  const { type, amount, fee = 0, source, sourceType, description = null } = movement;
  const availableOn = Math.max(movement.availableOn ?? 0, work.now());
  const api: Stripe.BalanceTransaction = {
    id: newId('balance_transaction'),
    object: 'balance_transaction',
    amount,
    available_on: availableOn,
    balance_type: 'payments',
    created: work.now(),
    currency: 'usd',
    description,
    exchange_rate: null,
    fee,
    fee_details:
      fee === 0
        ? []
        : [
            {
              amount: fee,
              application: null,
              currency: 'usd',
              description: 'Stripe processing fees',
              type: 'stripe_fee',
            },
          ],
    net: amount - fee,
    reporting_category: movement.reportingCategory ?? REPORTING_CATEGORY[type] ?? type,
    source,
    status: availableOn <= work.now() ? 'available' : 'pending',
    type,
  };
  work.put('balance_transaction', { id: api.id, owner, api, notes: { sourceType, payoutId: null } });
  if (availableOn > work.now()) work.schedule('settle', `${owner}@${availableOn}`, availableOn);
  return api.id;
}

/** A balance transaction as it stands now: what was pending becomes available by the clock alone. */
export function presentBalanceTransaction(work: Work, id: string): Stripe.BalanceTransaction | undefined {
  const record = work.get('balance_transaction', id);
  if (!record) return undefined;
  const status = record.api.available_on <= work.now() ? 'available' : 'pending';
  return { ...record.api, status };
}

/** When the money of a balance transaction is available, in seconds. */
export function availableOnOf(work: Work, id: string): number {
  return work.get('balance_transaction', id)?.api.available_on ?? 0;
}

export const balanceTransactionRoutes = [
  route(
    'GET /v1/balance_transactions',
    'BalanceTransactionListParams',
    listParams({
      currency: text.optional(),
      payout: text.optional(),
      source: text.optional(),
      type: text.optional(),
    }),
    ({ work, owner, params: wanted }) => {
      const page = pageOf(work, 'balance_transaction', {
        owner,
        url: '/v1/balance_transactions',
        request: wanted,
        matches: ({ api, notes }) =>
          (wanted.type === undefined || api.type === wanted.type) &&
          (wanted.source === undefined || api.source === wanted.source) &&
          (wanted.currency === undefined || api.currency === wanted.currency) &&
          (wanted.payout === undefined || notes.payoutId === wanted.payout),
      });
      return { ...page, data: page.data.map((api) => presentBalanceTransaction(work, api.id)) };
    },
  ),
  route(
    'GET /v1/balance_transactions/:id',
    'BalanceTransactionRetrieveParams',
    params({}),
    ({ work, owner, path }) => {
      work.require('balance_transaction', path['id']!, owner, { noun: 'balance transaction' });
      return presentBalanceTransaction(work, path['id']!)!;
    },
  ),
];
