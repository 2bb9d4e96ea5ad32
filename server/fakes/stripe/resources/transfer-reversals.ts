import type { Stripe } from 'stripe';
import { balanceInsufficient, invalidRequest } from '../errors.ts';
import { newId } from '../ids.ts';
import { pageOf } from '../lists.ts';
import { cents, mergeMetadata, metadata, pagingParams, params, text } from '../params.ts';
import type { Kinds } from '../records.ts';
import { route } from '../router.ts';
import { idOf } from '../work.ts';
import type { Work } from '../work.ts';
import { availableCents } from './balance.ts';
import { recordMovement } from './balance-transactions.ts';
import { requireTransfer } from './transfers.ts';

type TransferRecord = Kinds['transfer'];

/** Takes the money from the connected account and shows there as a refund of the payment it came by. */
function takeBack(work: Work, transfer: TransferRecord, reversalId: string, amountCents: number): string {
  const accountId = idOf(transfer.api.destination);
  const payment = work.edit('charge', idOf(transfer.api.destination_payment));
  const id = newId('bank_refund');
  const api: Stripe.Refund = {
    id,
    object: 'refund',
    amount: amountCents,
    balance_transaction: recordMovement(work, accountId, {
      type: 'payment_refund',
      amount: -amountCents,
      source: id,
      sourceType: transfer.notes.sourceType,
    }),
    charge: payment.id,
    created: work.now(),
    currency: 'usd',
    customer: null,
    customer_account: null,
    metadata: {},
    payment_intent: null,
    payment_method: null,
    reason: null,
    receipt_number: null,
    source_transfer_reversal: reversalId,
    status: 'succeeded',
    transfer_reversal: null,
  };
  payment.api.amount_refunded += amountCents;
  payment.api.refunded = payment.api.amount_refunded === payment.api.amount;
  work.put('refund', {
    id,
    owner: accountId,
    api,
    notes: { sourceType: transfer.notes.sourceType, outcome: 'succeeds' },
  });
  return id;
}

function reverse(
  work: Work,
  transfer: TransferRecord,
  input: { amount?: number | undefined; metadata: Record<string, string> },
): Stripe.TransferReversal {
  const left = transfer.api.amount - transfer.api.amount_reversed;
  const amountCents = input.amount ?? left;
  if (left === 0) throw invalidRequest(`Transfer ${transfer.id} has already been fully reversed.`);
  if (amountCents > left) {
    throw invalidRequest(
      `Transfer reversal amount (${amountCents}) is greater than the unreversed amount on the transfer (${left}).`,
      { param: 'amount' },
    );
  }
  // Only what the account has available can be taken back; waiting for more is a private preview of the provider.
  if (availableCents(work, idOf(transfer.api.destination), transfer.notes.sourceType) < amountCents) {
    throw balanceInsufficient(
      'The connected account has insufficient available funds to reverse this transfer.',
    );
  }
  const id = newId('transfer_reversal');
  const api: Stripe.TransferReversal = {
    id,
    object: 'transfer_reversal',
    amount: amountCents,
    balance_transaction: recordMovement(work, transfer.owner, {
      type: 'transfer_refund',
      amount: amountCents,
      source: id,
      sourceType: transfer.notes.sourceType,
    }),
    created: work.now(),
    currency: 'usd',
    destination_payment_refund: takeBack(work, transfer, id, amountCents),
    metadata: input.metadata,
    source_refund: null,
    transfer: transfer.id,
  };
  transfer.api.amount_reversed += amountCents;
  transfer.api.reversed = transfer.api.amount_reversed === transfer.api.amount;
  transfer.api.reversals.data.unshift(api);
  if (transfer.api.source_transaction) {
    work.edit('charge', idOf(transfer.api.source_transaction)).notes.transferredCents -= amountCents;
  }
  work.put('transfer_reversal', { id, owner: transfer.owner, api, notes: {} });
  work.emit('transfer.reversed', transfer.api, transfer.owner);
  return api;
}

export const transferReversalRoutes = [
  route(
    'POST /v1/transfers/:id/reversals',
    'TransferCreateReversalParams',
    params({ amount: cents.optional(), description: text.optional(), metadata: metadata.optional() }),
    ({ work, owner, path, params: input }) => {
      const transfer = requireTransfer(work, path['id']!, owner);
      return reverse(work, transfer, { amount: input.amount, metadata: mergeMetadata({}, input.metadata) });
    },
  ),
  route(
    'GET /v1/transfers/:id/reversals',
    'TransferListReversalsParams',
    pagingParams,
    ({ work, owner, path, params: wanted }) => {
      const transfer = requireTransfer(work, path['id']!, owner);
      return pageOf(work, 'transfer_reversal', {
        owner,
        url: `/v1/transfers/${transfer.id}/reversals`,
        request: wanted,
        matches: ({ api }) => api.transfer === transfer.id,
      });
    },
  ),
  route(
    'GET /v1/transfers/:id/reversals/:reversal',
    'TransferRetrieveReversalParams',
    params({}),
    ({ work, owner, path }) =>
      work.require('transfer_reversal', path['reversal']!, owner, { noun: 'transfer reversal' }).api,
  ),
];
