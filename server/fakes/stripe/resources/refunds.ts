import type { Stripe } from 'stripe';
import { z } from 'zod';
import { addBusinessDays } from '../clock.ts';
import { invalidRequest } from '../errors.ts';
import { newId } from '../ids.ts';
import { pageOf } from '../lists.ts';
import { cents, listParams, mergeMetadata, metadata, params, text } from '../params.ts';
import type { Kinds } from '../records.ts';
import { route } from '../router.ts';
import { idOf } from '../work.ts';
import type { Work } from '../work.ts';
import { availableCents } from './balance.ts';
import { availableOnOf, recordMovement } from './balance-transactions.ts';

type RefundRecord = Kinds['refund'];
type ChargeRecord = Kinds['charge'];

/** Bank debit refunds take up to 3 business days and start within 180 days (docs.stripe.com/payments/ach-direct-debit). */
const BANK_REFUND_BUSINESS_DAYS = 3;
const BANK_REFUND_WINDOW_SECONDS = 180 * 86_400;
/** Test card 5126: the refund succeeds and fails "some time later" (docs.stripe.com/testing#refunds). */
const LATE_FAILURE_SECONDS = 3600;

const createParams = params({
  amount: cents.optional(),
  charge: text.optional(),
  payment_intent: text.optional(),
  metadata: metadata.optional(),
  reason: z.enum(['duplicate', 'fraudulent', 'requested_by_customer']).optional(),
});

type CreateInput = z.output<typeof createParams>;

function chargeToRefund(work: Work, owner: string, input: CreateInput): ChargeRecord {
  if (input.charge !== undefined) {
    work.require('charge', input.charge, owner, { noun: 'charge', param: 'charge' });
    return work.edit('charge', input.charge);
  }
  if (input.payment_intent === undefined) {
    throw invalidRequest(
      'One of the following params should be provided for this request: payment_intent or charge.',
      {
        code: 'parameter_missing',
      },
    );
  }
  const intent = work.require('payment_intent', input.payment_intent, owner, {
    noun: 'payment_intent',
    param: 'payment_intent',
  });
  if (!intent.api.latest_charge) {
    throw invalidRequest('This PaymentIntent does not have a successful charge to refund.', {
      param: 'payment_intent',
    });
  }
  return work.edit('charge', idOf(intent.api.latest_charge));
}

/** What a dispute has taken cannot be refunded as well; an inquiry and a won dispute leave the money here. */
function assertNotTaken(work: Work, charge: ChargeRecord): void {
  const harmless = ['won', 'warning_needs_response', 'warning_under_review', 'warning_closed'];
  const taking = work
    .list('dispute', charge.owner)
    .find(({ api }) => api.charge === charge.id && !harmless.includes(String(api.status)));
  if (!taking) return;
  throw invalidRequest(`Charge ${charge.id} has been charged back; cannot issue a refund.`, {
    code: 'charge_disputed',
  });
}

function assertRefundable(work: Work, charge: ChargeRecord, amountCents: number): void {
  const { api } = charge;
  if (api.disputed) assertNotTaken(work, charge);
  const left = api.amount - api.amount_refunded;
  if (api.status === 'failed' || (api.status === 'succeeded' && !api.captured)) {
    throw invalidRequest(`Charge ${api.id} cannot be refunded.`, { param: 'charge' });
  }
  if (left === 0) {
    throw invalidRequest(`Charge ${api.id} has already been refunded.`, { code: 'charge_already_refunded' });
  }
  if (amountCents > left) {
    throw invalidRequest(
      `Refund amount (${amountCents}) is greater than unrefunded amount on charge (${left})`,
      {
        param: 'amount',
      },
    );
  }
  if (charge.notes.sourceType !== 'bank_account') return;
  if (work.now() > api.created + BANK_REFUND_WINDOW_SECONDS) {
    throw invalidRequest('This payment can no longer be refunded: 180 days have passed.', {
      param: 'charge',
    });
  }
  if (work.settings().partialBankRefunds === 'refuse' && amountCents < api.amount) {
    throw invalidRequest('Partial refunds are not supported for this payment method.', { param: 'amount' });
  }
}

function outcomeOf(charge: ChargeRecord): 'fails' | 'succeeds' {
  return charge.notes.behaviour === 'refund_fails' ? 'fails' : 'succeeds';
}

function createRefund(work: Work, owner: string, input: CreateInput): RefundRecord {
  const charge = chargeToRefund(work, owner, input);
  const amountCents = input.amount ?? charge.api.amount - charge.api.amount_refunded;
  assertRefundable(work, charge, amountCents);
  const isBank = charge.notes.sourceType === 'bank_account';
  const api: Stripe.Refund = {
    id: newId(isBank ? 'bank_refund' : 'refund'),
    object: 'refund',
    amount: amountCents,
    balance_transaction: null,
    charge: charge.id,
    created: work.now(),
    currency: 'usd',
    customer: null,
    customer_account: null,
    destination_details: isBank
      ? { type: 'us_bank_transfer', us_bank_transfer: { reference: null, reference_status: 'pending' } }
      : {
          type: 'card',
          card: { reference_status: 'pending', reference_type: 'acquirer_reference_number', type: 'refund' },
        },
    metadata: mergeMetadata({}, input.metadata),
    payment_intent: charge.api.payment_intent,
    payment_method: charge.notes.paymentMethodId,
    reason: input.reason ?? null,
    receipt_number: null,
    source_transfer_reversal: null,
    status: 'pending',
    transfer_reversal: null,
  };
  const refund = work.put('refund', {
    id: api.id,
    owner,
    api,
    notes: { sourceType: charge.notes.sourceType, outcome: outcomeOf(charge) },
  });
  charge.api.amount_refunded += amountCents;
  charge.api.refunded = charge.api.amount_refunded === charge.api.amount;
  startRefund(work, refund);
  work.emit('refund.created', refund.api, owner);
  work.emit('charge.refunded', charge.api, owner);
  return refund;
}

/** Takes the money from the balance if it is there; else the refund waits and says why. */
function startRefund(work: Work, refund: RefundRecord): void {
  const charge = work.edit('charge', idOf(refund.api.charge));
  if (charge.api.status === 'pending') return wait(refund, 'charge_pending');
  const availableOn = charge.api.balance_transaction
    ? availableOnOf(work, idOf(charge.api.balance_transaction))
    : 0;
  // Money that has not settled yet is given back out of the pending balance it is part of.
  const isUnsettled = availableOn > work.now();
  if (!isUnsettled && availableCents(work, refund.owner) < refund.api.amount) {
    work.schedule('refund_retry', refund.id, work.now() + 3600);
    return wait(refund, 'insufficient_funds');
  }
  const isBank = refund.notes.sourceType === 'bank_account';
  refund.api.balance_transaction = recordMovement(work, refund.owner, {
    type: isBank ? 'payment_refund' : 'refund',
    amount: -refund.api.amount,
    source: refund.id,
    sourceType: refund.notes.sourceType,
    availableOn,
    description: 'REFUND FOR CHARGE',
  });
  const isSlow = isBank || charge.notes.behaviour === 'refund_pending';
  if (isSlow) {
    wait(refund, 'processing');
    work.schedule('refund_outcome', refund.id, addBusinessDays(work.now(), BANK_REFUND_BUSINESS_DAYS));
    return;
  }
  refund.api.status = 'succeeded';
  delete refund.api.pending_reason;
  if (refund.notes.outcome === 'fails')
    work.schedule('refund_outcome', refund.id, work.now() + LATE_FAILURE_SECONDS);
}

function wait(refund: RefundRecord, reason: 'charge_pending' | 'insufficient_funds' | 'processing'): void {
  refund.api.status = 'pending';
  refund.api.pending_reason = reason;
}

function tellUpdated(work: Work, refund: RefundRecord): void {
  work.emit('refund.updated', refund.api, refund.owner);
  work.emit('charge.refund.updated', refund.api, refund.owner);
}

/** Ends a refund that is on its way, or fails one that had seemed to succeed; its money comes back to the balance. */
export function settleRefund(work: Work, refundId: string, outcome: 'fails' | 'succeeds'): void {
  const refund = work.edit('refund', refundId);
  const { api } = refund;
  work.unschedule('refund_outcome', refundId);
  if (outcome === 'succeeds') {
    if (api.status !== 'pending' || api.balance_transaction === null) return;
    api.status = 'succeeded';
    delete api.pending_reason;
    return tellUpdated(work, refund);
  }
  if (api.status === 'failed' || api.status === 'canceled') return;
  endUnpaid(work, refund, 'failed', 'unknown');
  tellUpdated(work, refund);
  work.emit('refund.failed', api, refund.owner);
}

function endUnpaid(work: Work, refund: RefundRecord, status: 'canceled' | 'failed', reason: string): void {
  const { api } = refund;
  if (api.balance_transaction !== null) {
    api.failure_balance_transaction = recordMovement(work, refund.owner, {
      type: 'refund_failure',
      amount: api.amount,
      source: api.id,
      sourceType: refund.notes.sourceType,
      description: 'REFUND FAILURE',
    });
  }
  api.status = status;
  api.failure_reason = status === 'canceled' ? 'merchant_request' : reason;
  delete api.pending_reason;
  const charge = work.edit('charge', idOf(api.charge));
  charge.api.amount_refunded -= api.amount;
  charge.api.refunded = false;
}

/** A bank debit has succeeded: refunds that waited for it begin. */
export function startPendingRefunds(work: Work, chargeId: string): void {
  for (const waiting of pendingRefundsOf(work, chargeId)) {
    const refund = work.edit('refund', waiting.id);
    startRefund(work, refund);
    tellUpdated(work, refund);
  }
}

/** A bank debit has failed: there is nothing to refund. */
export function failPendingRefunds(work: Work, chargeId: string): void {
  for (const waiting of pendingRefundsOf(work, chargeId)) settleRefund(work, waiting.id, 'fails');
}

function pendingRefundsOf(work: Work, chargeId: string): RefundRecord[] {
  return work
    .list('refund', null)
    .filter(
      ({ api }) => api.charge === chargeId && api.status === 'pending' && api.balance_transaction === null,
    );
}

export function onRefundOutcome(work: Work, refundId: string): void {
  const refund = work.get('refund', refundId);
  if (refund) settleRefund(work, refundId, refund.notes.outcome);
}

/** Looks again whether the balance covers a refund that waits for money. */
export function onRefundRetry(work: Work, refundId: string): void {
  const refund = work.edit('refund', refundId);
  if (refund.api.status !== 'pending' || refund.api.balance_transaction !== null) return;
  startRefund(work, refund);
  if (refund.api.balance_transaction !== null) tellUpdated(work, refund);
}

export const refundRoutes = [
  route(
    'POST /v1/refunds',
    'RefundCreateParams',
    createParams,
    ({ work, owner, params: input }) => createRefund(work, owner, input).api,
  ),
  route(
    'GET /v1/refunds',
    'RefundListParams',
    listParams({ charge: text.optional(), payment_intent: text.optional() }),
    ({ work, owner, params: wanted }) =>
      pageOf(work, 'refund', {
        owner,
        url: '/v1/refunds',
        request: wanted,
        matches: ({ api }) =>
          (wanted.charge === undefined || api.charge === wanted.charge) &&
          (wanted.payment_intent === undefined || api.payment_intent === wanted.payment_intent),
      }),
  ),
  route(
    'GET /v1/refunds/:id',
    'RefundRetrieveParams',
    params({}),
    ({ work, owner, path }) => work.require('refund', path['id']!, owner, { noun: 'refund' }).api,
  ),
  route(
    'POST /v1/refunds/:id',
    'RefundUpdateParams',
    params({ metadata: metadata.optional() }),
    ({ work, owner, path, params: change }) => {
      work.require('refund', path['id']!, owner, { noun: 'refund' });
      const refund = work.edit('refund', path['id']!);
      refund.api.metadata = mergeMetadata(refund.api.metadata ?? {}, change.metadata);
      tellUpdated(work, refund);
      return refund.api;
    },
  ),
  route('POST /v1/refunds/:id/cancel', 'RefundCancelParams', params({}), ({ work, owner, path }) => {
    work.require('refund', path['id']!, owner, { noun: 'refund' });
    const refund = work.edit('refund', path['id']!);
    // Only a refund that has not left yet can be stopped; bank debit refunds never (docs.stripe.com/refunds).
    if (refund.api.status !== 'pending' || refund.api.balance_transaction !== null) {
      throw invalidRequest(`Refund ${refund.id} cannot be canceled.`, { param: 'id' });
    }
    work.unschedule('refund_retry', refund.id);
    endUnpaid(work, refund, 'canceled', 'merchant_request');
    tellUpdated(work, refund);
    return refund.api;
  }),
];
