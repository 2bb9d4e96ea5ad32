import type { Stripe } from 'stripe';
import { z } from 'zod';
import { invalidRequest } from '../errors.ts';
import { newId } from '../ids.ts';
import { pageOf, pageOfItems } from '../lists.ts';
import {
  cents,
  currency,
  integer,
  listParams,
  mergeMetadata,
  metadata,
  pagingParams,
  params,
  text,
} from '../params.ts';
import type { Kinds } from '../records.ts';
import { route } from '../router.ts';
import { idOf } from '../work.ts';
import type { Work } from '../work.ts';
import { completeSession, expireSession } from './checkout-payment.ts';
import { attemptPayment } from './payment-attempt.ts';
import { assertChargeable, createIntent, methodTypes } from './payment-intents.ts';

export type SessionRecord = Kinds['checkout_session'];

const DAY_SECONDS = 86_400;

const webAddress = text.refine((value) => /^https?:\/\//.test(value), 'not a valid URL');

const lineItem = z.strictObject({
  quantity: integer.pipe(z.number().min(1)),
  price_data: z.strictObject({
    currency,
    unit_amount: cents,
    product_data: z.strictObject({
      name: text,
      description: text.optional(),
      metadata: metadata.optional(),
    }),
  }),
});

const createParams = params({
  mode: z.literal('payment'),
  line_items: z.array(lineItem).min(1).max(100),
  success_url: webAddress,
  cancel_url: webAddress.optional(),
  allowed_payment_method_types: methodTypes.optional(),
  client_reference_id: text.max(200).optional(),
  customer: text.optional(),
  customer_email: text.optional(),
  expires_at: integer.optional(),
  locale: text.optional(),
  metadata: metadata.optional(),
  payment_intent_data: z
    .strictObject({
      description: text.optional(),
      metadata: metadata.optional(),
      transfer_group: text.optional(),
    })
    .optional(),
  submit_type: z.enum(['auto', 'book', 'donate', 'pay']).optional(),
  ui_mode: z.literal('hosted_page').optional(),
});

type CreateInput = z.output<typeof createParams>;

function lineItemsOf(work: Work, input: CreateInput): Stripe.LineItem[] {
  return input.line_items.map(({ quantity, price_data: price }) => {
    const amount = quantity * price.unit_amount;
    return {
      id: newId('item'),
      object: 'item',
      adjustable_quantity: null,
      amount_discount: 0,
      amount_subtotal: amount,
      amount_tax: 0,
      amount_total: amount,
      currency: 'usd',
      description: price.product_data.name,
      metadata: {},
      price: {
        id: newId('price'),
        object: 'price',
        active: false,
        billing_scheme: 'per_unit',
        created: work.now(),
        currency: 'usd',
        custom_unit_amount: null,
        livemode: false,
        lookup_key: null,
        metadata: {},
        nickname: null,
        product: newId('product'),
        recurring: null,
        tax_behavior: 'unspecified',
        tiers_mode: null,
        transform_quantity: null,
        type: 'one_time',
        unit_amount: price.unit_amount,
        unit_amount_decimal: String(price.unit_amount) as unknown as Stripe.Price['unit_amount_decimal'],
      },
      quantity,
    };
  });
}

/** 30 minutes to 24 hours from now (docs.stripe.com/api/checkout/sessions/create, expires_at). */
function expiryOf(work: Work, wanted: number | undefined): number {
  const latest = work.now() + DAY_SECONDS;
  if (wanted === undefined) return latest;
  // A minute of grace on both sides: the caller's clock is not this one.
  if (wanted >= work.now() + 1740 && wanted <= latest + 60) return wanted;
  throw invalidRequest(
    'The `expires_at` timestamp must be at least 30 minutes and less than 24 hours from Checkout Session creation.',
    { param: 'expires_at' },
  );
}

function buildSession(work: Work, input: CreateInput, totalCents: number): Stripe.Checkout.Session {
  const id = newId('checkout_session');
  return {
    id,
    object: 'checkout.session',
    adaptive_pricing: { enabled: false },
    after_expiration: null,
    allow_promotion_codes: null,
    allowed_payment_method_types: input.allowed_payment_method_types ?? null,
    amount_subtotal: totalCents,
    amount_total: totalCents,
    automatic_tax: { enabled: false, liability: null, provider: null, status: null },
    billing_address_collection: null,
    cancel_url: input.cancel_url ?? null,
    client_reference_id: input.client_reference_id ?? null,
    client_secret: null,
    collected_information: { business_name: null, individual_name: null, shipping_details: null },
    consent: null,
    consent_collection: null,
    created: work.now(),
    currency: 'usd',
    currency_conversion: null,
    custom_fields: [],
    custom_text: {
      after_submit: null,
      shipping_address: null,
      submit: null,
      terms_of_service_acceptance: null,
    },
    customer: input.customer ?? null,
    customer_account: null,
    customer_creation: 'if_required',
    customer_details: null,
    customer_email: input.customer_email ?? null,
    discounts: [],
    expires_at: expiryOf(work, input.expires_at),
    integration_identifier: null,
    invoice: null,
    invoice_creation: null,
    livemode: false,
    locale: input.locale ?? null,
    managed_payments: null,
    metadata: mergeMetadata({}, input.metadata),
    mode: 'payment',
    origin_context: null,
    payment_intent: null,
    payment_link: null,
    payment_method_collection: 'if_required',
    payment_method_configuration_details: null,
    payment_method_options: {},
    payment_method_types: input.allowed_payment_method_types ?? ['card'],
    payment_status: 'unpaid',
    permissions: null,
    phone_number_collection: { enabled: false },
    recovered_from: null,
    saved_payment_method_options: null,
    setup_intent: null,
    shipping_address_collection: null,
    shipping_cost: null,
    shipping_options: [],
    status: 'open',
    submit_type: input.submit_type ?? null,
    subscription: null,
    success_url: input.success_url,
    total_details: { amount_discount: 0, amount_shipping: 0, amount_tax: 0 },
    ui_mode: 'hosted_page',
    url: `${work.origin}/pay/${id}`,
    wallet_options: null,
  };
}

const create = route(
  'POST /v1/checkout/sessions',
  'Checkout.SessionCreateParams',
  createParams,
  ({ work, owner, params: input }) => {
    if (input.customer !== undefined)
      work.require('customer', input.customer, owner, { noun: 'customer', param: 'customer' });
    const lineItems = lineItemsOf(work, input);
    const totalCents = lineItems.reduce((sum, item) => sum + item.amount_total, 0);
    assertChargeable(totalCents, 'line_items');
    const api = buildSession(work, input, totalCents);
    const data = input.payment_intent_data ?? {};
    work.put('checkout_session', {
      id: api.id,
      owner,
      api,
      notes: {
        lineItems,
        paymentIntentData: {
          metadata: mergeMetadata({}, data.metadata),
          ...(data.description !== undefined && { description: data.description }),
          ...(data.transfer_group !== undefined && { transfer_group: data.transfer_group }),
        },
      },
    });
    work.schedule('session_expiry', api.id, api.expires_at);
    return api;
  },
);

const expire = route(
  'POST /v1/checkout/sessions/:id/expire',
  'Checkout.SessionExpireParams',
  params({}),
  ({ work, owner, path }) => {
    const session = requireSession(work, path['id']!, owner);
    if (session.api.status !== 'open') {
      throw invalidRequest(
        `Only Checkout Sessions with a status in ["open"] can be expired. This Checkout Session has a status of \`${String(session.api.status)}\`.`,
      );
    }
    expireSession(work, session.id);
    return work.edit('checkout_session', session.id).api;
  },
);

function requireSession(work: Work, id: string, owner: string): SessionRecord {
  return work.require('checkout_session', id, owner, { noun: 'checkout.session' });
}

export const checkoutSessionRoutes = [
  create,
  route(
    'GET /v1/checkout/sessions',
    'Checkout.SessionListParams',
    listParams({ customer: text.optional(), payment_intent: text.optional(), status: text.optional() }),
    ({ work, owner, params: wanted }) =>
      pageOf(work, 'checkout_session', {
        owner,
        url: '/v1/checkout/sessions',
        request: wanted,
        matches: ({ api }) =>
          (wanted.customer === undefined || api.customer === wanted.customer) &&
          (wanted.payment_intent === undefined || api.payment_intent === wanted.payment_intent) &&
          (wanted.status === undefined || api.status === wanted.status),
      }),
  ),
  route(
    'GET /v1/checkout/sessions/:id',
    'Checkout.SessionRetrieveParams',
    params({}),
    ({ work, owner, path }) => requireSession(work, path['id']!, owner).api,
  ),
  route(
    'GET /v1/checkout/sessions/:id/line_items',
    'Checkout.SessionListLineItemsParams',
    pagingParams,
    ({ work, owner, path, params: wanted }) => {
      const session = requireSession(work, path['id']!, owner);
      return pageOfItems(session.notes.lineItems, wanted, `/v1/checkout/sessions/${session.id}/line_items`);
    },
  ),
  expire,
];

function intentOf(work: Work, session: SessionRecord): string {
  if (session.api.payment_intent) return idOf(session.api.payment_intent);
  const { description, metadata: given, transfer_group } = session.notes.paymentIntentData;
  const intent = createIntent(work, session.owner, {
    amount: session.api.amount_total ?? 0,
    description,
    metadata: given ?? {},
    transferGroup: transfer_group ?? null,
    customer: session.api.customer ? idOf(session.api.customer) : null,
    methodTypes: session.api.payment_method_types,
    sessionId: session.id,
  });
  session.api.payment_intent = intent.id;
  return intent.id;
}

/**
 * Pays a session with a method, as its hosted page does. Throws the provider's 402 on a decline (the session stays
 * open). Returns whether the card holder must still confirm.
 */
export function paySession(
  work: Work,
  sessionId: string,
  method: Kinds['payment_method'],
): { needsConfirmation: boolean } {
  const session = work.edit('checkout_session', sessionId);
  const { name, email } = method.api.billing_details;
  session.api.customer_details = {
    address: null,
    business_name: null,
    email: session.api.customer_email ?? email,
    individual_name: null,
    name,
    phone: null,
    tax_exempt: 'none',
    tax_ids: [],
  };
  const intentId = intentOf(work, session);
  attemptPayment(work, intentId, method.id);
  const { status } = work.edit('payment_intent', intentId).api;
  if (status === 'processing') completeSession(work, sessionId, 'unpaid');
  return { needsConfirmation: status === 'requires_action' };
}

/** Where the hosted page sends the payer, with the session's id filled in. */
export function successUrlOf(session: SessionRecord): string {
  return (session.api.success_url ?? '/').replaceAll('{CHECKOUT_SESSION_ID}', session.id);
}
