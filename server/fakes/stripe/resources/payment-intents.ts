import type { Stripe } from 'stripe';
import { z } from 'zod';
import { invalidRequest, StripeError } from '../errors.ts';
import { newId, newSecret } from '../ids.ts';
import { pageOf } from '../lists.ts';
import {
  cents,
  clearable,
  currency,
  flag,
  listParams,
  mergeMetadata,
  metadata,
  params,
  text,
} from '../params.ts';
import type { Kinds } from '../records.ts';
import { route } from '../router.ts';
import { idOf } from '../work.ts';
import type { Work } from '../work.ts';
import { attemptPayment, captureCard, succeedIntent } from './payment-attempt.ts';
import { materializeMethod } from './payment-methods.ts';

type IntentRecord = Kinds['payment_intent'];

export const METHOD_TYPES = ['card', 'us_bank_account'] as const;
export const methodTypes = z.array(z.enum(METHOD_TYPES)).min(1);

/** Charges start at 50 cents (docs.stripe.com/currencies#minimum-and-maximum-charge-amounts). */
export function assertChargeable(amountCents: number, param: string): void {
  if (amountCents >= 50) return;
  throw invalidRequest('Amount must be at least $0.50 usd', { code: 'amount_too_small', param });
}

export interface IntentInput {
  amount: number;
  description?: string | undefined;
  metadata?: Record<string, string>;
  transferGroup?: string | null;
  customer?: string | null;
  methodTypes?: readonly string[] | undefined;
  captureMethod?: string;
  sessionId?: string | null;
}

/** A payment that waits for a method. */
export function createIntent(work: Work, owner: string, input: IntentInput): IntentRecord {
  const id = newId('payment_intent');
  const types = input.methodTypes ?? ['card'];
  const api: Stripe.PaymentIntent = {
    id,
    object: 'payment_intent',
    allowed_payment_method_types: input.methodTypes ? [...input.methodTypes] : null,
    amount: input.amount,
    amount_capturable: 0,
    amount_details: { tip: {} },
    amount_received: 0,
    application: null,
    application_fee_amount: null,
    automatic_payment_methods: input.methodTypes ? null : { allow_redirects: 'always', enabled: true },
    canceled_at: null,
    cancellation_reason: null,
    capture_method: input.captureMethod ?? 'automatic',
    client_secret: newSecret(`${id}_secret`),
    confirmation_method: 'automatic',
    created: work.now(),
    currency: 'usd',
    customer: input.customer ?? null,
    customer_account: null,
    description: input.description ?? null,
    excluded_payment_method_types: null,
    last_payment_error: null,
    latest_charge: null,
    livemode: false,
    managed_payments: null,
    metadata: input.metadata ?? {},
    next_action: null,
    on_behalf_of: null,
    payment_method: null,
    payment_method_configuration_details: null,
    payment_method_options: null,
    payment_method_types: [...types],
    payment_record: null,
    processing: null,
    receipt_email: null,
    review: null,
    setup_future_usage: null,
    shipping: null,
    source: null,
    statement_descriptor: null,
    statement_descriptor_suffix: null,
    status: 'requires_payment_method',
    transfer_group: input.transferGroup ?? null,
  };
  const notes = { sessionId: input.sessionId ?? null, returnUrl: null };
  const record = work.put('payment_intent', { id, owner, api, notes });
  work.emit('payment_intent.created', api, owner);
  return record;
}

function unexpectedState(intent: IntentRecord, doing: string): StripeError {
  return new StripeError(400, {
    type: 'invalid_request_error',
    code: 'payment_intent_unexpected_state',
    message: `You cannot ${doing} this PaymentIntent because it has a status of ${String(intent.api.status)}.`,
    payment_intent: structuredClone(intent.api),
  });
}

function requireIntent(work: Work, id: string, owner: string): IntentRecord {
  work.require('payment_intent', id, owner, { noun: 'payment_intent' });
  return work.edit('payment_intent', id);
}

interface ConfirmInput {
  payment_method?: string | undefined;
  off_session?: boolean | undefined;
  return_url?: string | undefined;
  receipt_email?: string | undefined;
}

function confirmIntent(work: Work, intent: IntentRecord, input: ConfirmInput): void {
  const { status } = intent.api;
  if (!['requires_payment_method', 'requires_confirmation', 'requires_action'].includes(String(status))) {
    throw unexpectedState(intent, 'confirm');
  }
  const chosen = input.payment_method ?? (intent.api.payment_method ? idOf(intent.api.payment_method) : null);
  if (!chosen) {
    throw invalidRequest(
      "You cannot confirm this PaymentIntent because it's missing a payment method. Update the PaymentIntent with a payment method and then confirm.",
      { code: 'payment_intent_unexpected_state' },
    );
  }
  const method = materializeMethod(work, chosen, intent.owner);
  assertMethodAllowed(intent, String(method.api.type));
  if (input.return_url !== undefined) intent.notes.returnUrl = input.return_url;
  if (input.receipt_email !== undefined) intent.api.receipt_email = input.receipt_email;
  attemptPayment(work, intent.id, method.id, { isOffSession: input.off_session ?? false });
}

function assertMethodAllowed(intent: IntentRecord, type: string): void {
  const types = intent.api.payment_method_types;
  if (types.includes(type)) return;
  throw invalidRequest(
    `The PaymentMethod provided (${type}) is not allowed for this PaymentIntent. Allowed: ${types.join(', ')}.`,
    { param: 'payment_method' },
  );
}

const shared = {
  allowed_payment_method_types: methodTypes.optional(),
  customer: text.optional(),
  description: text.optional(),
  metadata: metadata.optional(),
  payment_method: text.optional(),
  receipt_email: text.optional(),
  transfer_group: text.optional(),
};

const createParams = params({
  ...shared,
  amount: cents,
  currency,
  automatic_payment_methods: z
    .strictObject({ enabled: flag, allow_redirects: z.enum(['always', 'never']).optional() })
    .optional(),
  capture_method: z.enum(['automatic', 'automatic_async', 'manual']).optional(),
  confirm: flag.optional(),
  off_session: flag.optional(),
  return_url: text.optional(),
});

const create = route(
  'POST /v1/payment_intents',
  'PaymentIntentCreateParams',
  createParams,
  ({ work, owner, params: input }) => {
    assertChargeable(input.amount, 'amount');
    if (
      input.capture_method === 'manual' &&
      input.allowed_payment_method_types?.includes('us_bank_account')
    ) {
      throw invalidRequest('us_bank_account does not support manual capture.', { param: 'capture_method' });
    }
    if (input.customer !== undefined)
      work.require('customer', input.customer, owner, { noun: 'customer', param: 'customer' });
    const intent = createIntent(work, owner, {
      amount: input.amount,
      description: input.description,
      metadata: mergeMetadata({}, input.metadata),
      transferGroup: input.transfer_group ?? null,
      customer: input.customer ?? null,
      methodTypes: input.allowed_payment_method_types,
      captureMethod: input.capture_method ?? 'automatic',
    });
    intent.api.receipt_email = input.receipt_email ?? null;
    if (input.payment_method !== undefined) {
      const method = materializeMethod(work, input.payment_method, owner);
      assertMethodAllowed(intent, String(method.api.type));
      intent.api.payment_method = method.id;
      intent.api.status = 'requires_confirmation';
    }
    if (input.confirm)
      confirmIntent(work, intent, { off_session: input.off_session, return_url: input.return_url });
    return intent.api;
  },
);

const update = route(
  'POST /v1/payment_intents/:id',
  'PaymentIntentUpdateParams',
  params({
    ...shared,
    amount: cents.optional(),
    currency: currency.optional(),
    description: clearable.optional(),
  }),
  ({ work, owner, path, params: change }) => {
    const intent = requireIntent(work, path['id']!, owner);
    const { api } = intent;
    const isOpen = ['requires_payment_method', 'requires_confirmation', 'requires_action'].includes(
      String(api.status),
    );
    const touchesMoney = change.amount !== undefined || change.payment_method !== undefined;
    if (touchesMoney && !isOpen) throw unexpectedState(intent, 'update');
    if (change.amount !== undefined) {
      assertChargeable(change.amount, 'amount');
      api.amount = change.amount;
    }
    if (change.payment_method !== undefined) {
      const method = materializeMethod(work, change.payment_method, owner);
      api.payment_method = method.id;
      api.status = 'requires_confirmation';
    }
    if (change.allowed_payment_method_types) {
      api.allowed_payment_method_types = [...change.allowed_payment_method_types];
      api.payment_method_types = [...change.allowed_payment_method_types];
    }
    api.metadata = mergeMetadata(api.metadata, change.metadata);
    if (change.description !== undefined) api.description = change.description || null;
    if (change.customer !== undefined) api.customer = change.customer;
    if (change.receipt_email !== undefined) api.receipt_email = change.receipt_email;
    if (change.transfer_group !== undefined) api.transfer_group = change.transfer_group;
    return api;
  },
);

const confirm = route(
  'POST /v1/payment_intents/:id/confirm',
  'PaymentIntentConfirmParams',
  params({
    payment_method: text.optional(),
    off_session: flag.optional(),
    return_url: text.optional(),
    receipt_email: text.optional(),
  }),
  ({ work, owner, path, params: input }) => {
    const intent = requireIntent(work, path['id']!, owner);
    confirmIntent(work, intent, input);
    return intent.api;
  },
);

const capture = route(
  'POST /v1/payment_intents/:id/capture',
  'PaymentIntentCaptureParams',
  params({ amount_to_capture: cents.optional(), metadata: metadata.optional() }),
  ({ work, owner, path, params: input }) => {
    const intent = requireIntent(work, path['id']!, owner);
    if (intent.api.status !== 'requires_capture') throw unexpectedState(intent, 'capture');
    const amountCents = input.amount_to_capture ?? intent.api.amount;
    if (amountCents > intent.api.amount_capturable) {
      throw invalidRequest('The amount to capture is greater than the amount you can capture.', {
        code: 'amount_too_large',
        param: 'amount_to_capture',
      });
    }
    const charge = work.edit('charge', idOf(intent.api.latest_charge));
    work.unschedule('authorization_lapse', intent.id);
    intent.api.metadata = mergeMetadata(intent.api.metadata, input.metadata);
    captureCard(work, charge, amountCents);
    work.emit('charge.captured', charge.api, owner);
    succeedIntent(work, intent, charge);
    return intent.api;
  },
);

function cancelIntent(work: Work, intent: IntentRecord, reason: string | null): void {
  intent.api.status = 'canceled';
  intent.api.canceled_at = work.now();
  intent.api.cancellation_reason = reason as Stripe.PaymentIntent.CancellationReason | null;
  intent.api.amount_capturable = 0;
  intent.api.next_action = null;
  work.unschedule('authorization_lapse', intent.id);
  if (intent.api.latest_charge) {
    const charge = work.edit('charge', idOf(intent.api.latest_charge));
    if (charge.api.status === 'succeeded' && !charge.api.captured) {
      // An authorization given back reads as a refund without a movement of money.
      charge.api.amount_refunded = charge.api.amount;
      charge.api.refunded = true;
      work.emit('charge.refunded', charge.api, intent.owner);
    }
  }
  work.emit('payment_intent.canceled', intent.api, intent.owner);
}

const cancel = route(
  'POST /v1/payment_intents/:id/cancel',
  'PaymentIntentCancelParams',
  params({
    cancellation_reason: z.enum(['abandoned', 'duplicate', 'fraudulent', 'requested_by_customer']).optional(),
  }),
  ({ work, owner, path, params: input }) => {
    const intent = requireIntent(work, path['id']!, owner);
    const cancelable = [
      'requires_payment_method',
      'requires_confirmation',
      'requires_action',
      'requires_capture',
    ];
    if (!cancelable.includes(String(intent.api.status))) throw unexpectedState(intent, 'cancel');
    cancelIntent(work, intent, input.cancellation_reason ?? null);
    return intent.api;
  },
);

export const paymentIntentRoutes = [
  create,
  route(
    'GET /v1/payment_intents',
    'PaymentIntentListParams',
    listParams({ customer: text.optional() }),
    ({ work, owner, params: wanted }) =>
      pageOf(work, 'payment_intent', {
        owner,
        url: '/v1/payment_intents',
        request: wanted,
        matches: ({ api }) => wanted.customer === undefined || api.customer === wanted.customer,
      }),
  ),
  route(
    'GET /v1/payment_intents/:id',
    'PaymentIntentRetrieveParams',
    params({ client_secret: text.optional() }),
    ({ work, owner, path }) =>
      work.require('payment_intent', path['id']!, owner, { noun: 'payment_intent' }).api,
  ),
  update,
  confirm,
  capture,
  cancel,
];

/** Nobody captured an authorization in time. */
export function onAuthorizationLapse(work: Work, intentId: string): void {
  const intent = work.edit('payment_intent', intentId);
  if (intent.api.status === 'requires_capture') cancelIntent(work, intent, 'automatic');
}
