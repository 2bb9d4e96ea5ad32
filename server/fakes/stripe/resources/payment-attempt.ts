import type { Stripe } from 'stripe';
import { addBusinessDays } from '../clock.ts';
import { StripeError } from '../errors.ts';
import type { Kinds } from '../records.ts';
import { BANK_FAILURES, DECLINES } from '../test-values.ts';
import type { BankBehaviour, DeclineReason } from '../test-values.ts';
import { idOf } from '../work.ts';
import type { Work } from '../work.ts';
import { recordMovement } from './balance-transactions.ts';
import { bankDebitFeeCents, cardFeeCents, createCharge, outcomeOf } from './charges.ts';
import type { ChargeRecord } from './charges.ts';
import { openDisputeLater } from './disputes.ts';
import { startPendingRefunds, failPendingRefunds } from './refunds.ts';
import { onSessionPaymentFailed, onSessionPaymentSucceeded } from './checkout-payment.ts';

/** Bank debits succeed or fail after this many business days (docs.stripe.com/payments/ach-direct-debit: up to 4). */
const BANK_DEBIT_BUSINESS_DAYS = 4;
const CARD_SETTLEMENT_BUSINESS_DAYS = 2;

function declineError(
  intent: Kinds['payment_intent'],
  charge: ChargeRecord,
  decline: { code: string; reason: string; message: string },
): StripeError {
  return new StripeError(
    402,
    {
      type: 'card_error',
      code: decline.code,
      message: decline.message,
      charge: charge.id,
      payment_intent: structuredClone(intent.api),
      ...(decline.code === 'card_declined' && { decline_code: decline.reason }),
    },
    true,
  );
}

/** Declines leave the payment open for another method, with the error and a failed charge to show for it. */
function declineCard(
  work: Work,
  intent: Kinds['payment_intent'],
  method: Kinds['payment_method'],
  reason: DeclineReason | 'fraudulent',
): never {
  const known =
    reason === 'fraudulent'
      ? { code: 'card_declined', message: 'Your card was declined.' }
      : DECLINES[reason];
  const charge = createCharge(work, intent, method);
  charge.api.status = 'failed';
  charge.api.failure_code = known.code;
  charge.api.failure_message = known.message;
  charge.api.outcome = outcomeOf(reason === 'fraudulent' ? 'blocked' : 'issuer_declined', reason);
  intent.api.status = 'requires_payment_method';
  intent.api.latest_charge = charge.id;
  intent.api.payment_method = null;
  intent.api.next_action = null;
  intent.api.last_payment_error = {
    type: 'card_error',
    code: known.code,
    message: known.message,
    charge: charge.id,
    payment_method: structuredClone(method.api),
    ...(known.code === 'card_declined' && { decline_code: reason }),
  };
  work.emit('charge.failed', charge.api, intent.owner);
  work.emit('payment_intent.payment_failed', intent.api, intent.owner);
  throw declineError(intent, charge, { ...known, reason });
}

function cardAvailableOn(work: Work, charge: ChargeRecord): number {
  if (charge.notes.isBypassingPending || work.settings().cardSettlement === 'instant') return work.now();
  return addBusinessDays(work.now(), CARD_SETTLEMENT_BUSINESS_DAYS);
}

/** Takes the money of a card charge: `amountCents` of what was authorized. */
export function captureCard(work: Work, charge: ChargeRecord, amountCents: number): void {
  charge.api.captured = true;
  charge.api.amount_captured = amountCents;
  if (amountCents < charge.api.amount) charge.api.amount_refunded = charge.api.amount - amountCents;
  charge.api.balance_transaction = recordMovement(work, charge.owner, {
    type: 'charge',
    amount: amountCents,
    fee: cardFeeCents(amountCents),
    source: charge.id,
    sourceType: 'card',
    availableOn: cardAvailableOn(work, charge),
    description: charge.api.description,
  });
}

/** Marks a payment as succeeded and tells everybody, the Checkout Session included. */
export function succeedIntent(work: Work, intent: Kinds['payment_intent'], charge: ChargeRecord): void {
  intent.api.status = 'succeeded';
  intent.api.amount_received = charge.api.amount_captured;
  intent.api.amount_capturable = 0;
  intent.api.latest_charge = charge.id;
  intent.api.last_payment_error = null;
  intent.api.next_action = null;
  work.emit('payment_intent.succeeded', intent.api, intent.owner);
  onSessionPaymentSucceeded(work, intent);
  openDisputeLater(work, charge);
}

function authorizeCard(work: Work, intent: Kinds['payment_intent'], method: Kinds['payment_method']): void {
  const charge = createCharge(work, intent, method);
  charge.api.status = 'succeeded';
  charge.api.paid = true;
  charge.api.outcome = outcomeOf('authorized', null);
  intent.api.latest_charge = charge.id;
  intent.api.next_action = null;
  if (intent.api.capture_method === 'manual') {
    intent.api.status = 'requires_capture';
    intent.api.amount_capturable = intent.api.amount;
    work.emit('charge.succeeded', charge.api, intent.owner);
    work.emit('payment_intent.amount_capturable_updated', intent.api, intent.owner);
    // Authorizations that nobody captures lapse after 7 days (docs.stripe.com/payments/place-a-hold-on-a-payment-method).
    work.schedule('authorization_lapse', intent.id, work.now() + 7 * 86_400);
    return;
  }
  captureCard(work, charge, intent.api.amount);
  work.emit('charge.succeeded', charge.api, intent.owner);
  succeedIntent(work, intent, charge);
}

function startBankDebit(work: Work, intent: Kinds['payment_intent'], method: Kinds['payment_method']): void {
  const charge = createCharge(work, intent, method);
  intent.api.status = 'processing';
  intent.api.latest_charge = charge.id;
  work.emit('charge.pending', charge.api, intent.owner);
  work.emit('payment_intent.processing', intent.api, intent.owner);
  if (charge.notes.behaviour === 'processing') return;
  const isInstant = work.settings().bankDebits === 'instant';
  const dueAt = isInstant ? work.now() : addBusinessDays(work.now(), BANK_DEBIT_BUSINESS_DAYS);
  work.schedule('bank_debit', charge.id, dueAt);
}

function askForAuthentication(work: Work, intent: Kinds['payment_intent']): void {
  intent.api.status = 'requires_action';
  intent.api.next_action = {
    type: 'redirect_to_url',
    redirect_to_url: { url: `${work.origin}/confirm/${intent.id}`, return_url: intent.notes.returnUrl },
  };
  work.emit('payment_intent.requires_action', intent.api, intent.owner);
}

/**
 * Pays with a method. `isConfirmed`: the card holder has already said yes. A decline throws the provider's 402 and
 * keeps the failed charge.
 */
export function attemptPayment(
  work: Work,
  intentId: string,
  methodId: string,
  options: { isConfirmed?: boolean; isOffSession?: boolean } = {},
): void {
  const intent = work.edit('payment_intent', intentId);
  const method = work.get('payment_method', methodId)!;
  intent.api.payment_method = method.id;
  if (method.api.type === 'us_bank_account') return startBankDebit(work, intent, method);
  const { behaviour } = method.notes;
  if (behaviour === 'block') declineCard(work, intent, method, 'fraudulent');
  if (behaviour.startsWith('decline:'))
    declineCard(work, intent, method, behaviour.slice(8) as DeclineReason);
  if (behaviour === 'authenticate' && !options.isConfirmed) {
    if (options.isOffSession) refuseOffSession(work, intent, method);
    return askForAuthentication(work, intent);
  }
  authorizeCard(work, intent, method);
}

/** Without the card holder there is nobody to ask (docs.stripe.com/declines/codes, authentication_required). */
function refuseOffSession(
  work: Work,
  intent: Kinds['payment_intent'],
  method: Kinds['payment_method'],
): never {
  const message = 'Your card was declined. This transaction requires authentication.';
  const charge = createCharge(work, intent, method);
  charge.api.status = 'failed';
  charge.api.failure_code = 'authentication_required';
  charge.api.failure_message = message;
  intent.api.status = 'requires_payment_method';
  intent.api.payment_method = null;
  intent.api.latest_charge = charge.id;
  intent.api.last_payment_error = {
    type: 'card_error',
    code: 'authentication_required',
    decline_code: 'authentication_required',
    message,
    charge: charge.id,
    payment_method: structuredClone(method.api),
  };
  work.emit('charge.failed', charge.api, intent.owner);
  work.emit('payment_intent.payment_failed', intent.api, intent.owner);
  throw declineError(intent, charge, {
    code: 'authentication_required',
    reason: 'authentication_required',
    message,
  });
}

/** The card holder refused to confirm: back to choosing a method (docs.stripe.com/payments/paymentintents/lifecycle). */
export function failAuthentication(work: Work, intentId: string): void {
  const intent = work.edit('payment_intent', intentId);
  const method = work.get('payment_method', idOf(intent.api.payment_method));
  intent.api.status = 'requires_payment_method';
  intent.api.next_action = null;
  intent.api.payment_method = null;
  intent.api.last_payment_error = {
    type: 'invalid_request_error',
    code: 'payment_intent_authentication_failure',
    message: 'The provided PaymentMethod has failed authentication.',
    ...(method && { payment_method: structuredClone(method.api) }),
  };
  work.emit('payment_intent.payment_failed', intent.api, intent.owner);
}

function succeedBankDebit(work: Work, charge: ChargeRecord): void {
  charge.api.status = 'succeeded';
  charge.api.paid = true;
  charge.api.captured = true;
  charge.api.amount_captured = charge.api.amount;
  charge.api.outcome = outcomeOf('authorized', null);
  charge.api.balance_transaction = recordMovement(work, charge.owner, {
    type: 'payment',
    amount: charge.api.amount,
    fee: bankDebitFeeCents(charge.api.amount),
    source: charge.id,
    sourceType: 'bank_account',
    description: charge.api.description,
  });
  work.emit('charge.succeeded', charge.api, charge.owner);
  succeedIntent(work, work.edit('payment_intent', idOf(charge.api.payment_intent)), charge);
  startPendingRefunds(work, charge.id);
}

function failBankDebit(work: Work, charge: ChargeRecord, code: keyof typeof BANK_FAILURES): void {
  const message = BANK_FAILURES[code];
  charge.api.status = 'failed';
  charge.api.failure_code = code;
  charge.api.failure_message = message;
  const intent = work.edit('payment_intent', idOf(charge.api.payment_intent));
  const method = work.get('payment_method', charge.notes.paymentMethodId ?? '');
  intent.api.status = 'requires_payment_method';
  intent.api.payment_method = null;
  intent.api.last_payment_error = {
    type: 'invalid_request_error',
    code: code as Stripe.PaymentIntent.LastPaymentError.Code,
    message,
    charge: charge.id,
    ...(method && { payment_method: structuredClone(method.api) }),
  };
  work.emit('charge.failed', charge.api, charge.owner);
  work.emit('payment_intent.payment_failed', intent.api, intent.owner);
  onSessionPaymentFailed(work, intent);
  failPendingRefunds(work, charge.id);
}

/** Ends a bank debit that is still on its way; nothing happens when it has ended already. */
export function settleBankDebit(work: Work, chargeId: string, outcome: BankBehaviour): void {
  const charge = work.edit('charge', chargeId);
  if (charge.api.status !== 'pending') return;
  work.unschedule('bank_debit', chargeId);
  if (outcome === 'success' || outcome === 'dispute' || outcome === 'processing')
    succeedBankDebit(work, charge);
  else failBankDebit(work, charge, outcome);
}

/** The day of a bank debit has come. */
export function onBankDebitDue(work: Work, chargeId: string): void {
  const charge = work.get('charge', chargeId);
  if (charge) settleBankDebit(work, chargeId, charge.notes.behaviour as BankBehaviour);
}
