import type { Stripe } from 'stripe';
import { newId } from '../ids.ts';
import { pageOf } from '../lists.ts';
import { listParams, mergeMetadata, metadata, params, text } from '../params.ts';
import type { Kinds } from '../records.ts';
import { route } from '../router.ts';
import { sourceTypeOf } from '../work.ts';
import type { Work } from '../work.ts';

export type ChargeRecord = Kinds['charge'];

/** Card: 2.9 % + 30 cents, rounded half up (stripe.com/pricing). */
export function cardFeeCents(amountCents: number): number {
  return Math.round((amountCents * 29) / 1000) + 30;
}

/** Bank debit: 0.8 %, at most $5 (stripe.com/pricing). */
export function bankDebitFeeCents(amountCents: number): number {
  return Math.min(500, Math.round((amountCents * 8) / 1000));
}

function cardDetails(
  card: Stripe.PaymentMethod.Card,
  amountCents: number,
): Stripe.Charge.PaymentMethodDetails.Card {
  return {
    amount_authorized: amountCents,
    authorization_code: null,
    brand: card.brand,
    checks: { address_line1_check: null, address_postal_code_check: null, cvc_check: 'pass' },
    country: card.country,
    electronic_commerce_indicator: null,
    exp_month: card.exp_month,
    exp_year: card.exp_year,
    ...(card.fingerprint && { fingerprint: card.fingerprint }),
    funding: card.funding,
    installments: null,
    last4: card.last4,
    mandate: null,
    network: card.brand,
    network_transaction_id: null,
    regulated_status: 'unregulated',
    three_d_secure: null,
    transaction_link_id: null,
    wallet: null,
  };
}

function bankDetails(
  bank: Stripe.PaymentMethod.UsBankAccount,
): Stripe.Charge.PaymentMethodDetails.UsBankAccount {
  return {
    account_holder_type: bank.account_holder_type,
    account_type: bank.account_type,
    bank_name: bank.bank_name,
    fingerprint: bank.fingerprint,
    last4: bank.last4,
    mandate: newId('mandate'),
    payment_reference: null,
    routing_number: bank.routing_number,
  };
}

function methodDetails(
  method: Stripe.PaymentMethod,
  amountCents: number,
): Stripe.Charge.PaymentMethodDetails {
  if (method.card) return { type: 'card', card: cardDetails(method.card, amountCents) };
  if (method.us_bank_account) {
    return { type: 'us_bank_account', us_bank_account: bankDetails(method.us_bank_account) };
  }
  return { type: method.type };
}

/** What the card network and the risk check said. */
export function outcomeOf(
  type: 'authorized' | 'blocked' | 'issuer_declined',
  reason: string | null,
): Stripe.Charge.Outcome {
  const networkStatus = {
    authorized: 'approved_by_network',
    blocked: 'not_sent_to_network',
    issuer_declined: 'declined_by_network',
  };
  const message = {
    authorized: 'Payment complete.',
    blocked: 'Stripe blocked this payment as too risky.',
    issuer_declined: 'The bank did not accept the payment.',
  };
  return {
    advice_code: null,
    network_advice_code: null,
    network_decline_code: null,
    network_status: networkStatus[type],
    reason,
    risk_level: type === 'blocked' ? 'highest' : 'normal',
    risk_score: type === 'blocked' ? 90 : 20,
    seller_message: message[type],
    type,
  };
}

/** The fields every charge has; the caller adds what makes this one different. */
export function blankCharge(id: string, created: number, amountCents: number): Stripe.Charge {
  return {
    id,
    object: 'charge',
    amount: amountCents,
    amount_captured: 0,
    amount_refunded: 0,
    application: null,
    application_fee: null,
    application_fee_amount: null,
    balance_transaction: null,
    billing_details: { address: null, email: null, name: null, phone: null, tax_id: null },
    calculated_statement_descriptor: null,
    captured: false,
    created,
    currency: 'usd',
    customer: null,
    description: null,
    disputed: false,
    failure_balance_transaction: null,
    failure_code: null,
    failure_message: null,
    fraud_details: {},
    livemode: false,
    metadata: {},
    on_behalf_of: null,
    outcome: null,
    paid: false,
    payment_intent: null,
    payment_method: null,
    payment_method_details: null,
    receipt_email: null,
    receipt_number: null,
    receipt_url: null,
    refunded: false,
    review: null,
    shipping: null,
    source: null,
    source_transfer: null,
    statement_descriptor: null,
    statement_descriptor_suffix: null,
    status: 'pending',
    transfer_data: null,
    transfer_group: null,
  };
}

/** A new charge of a payment, not yet succeeded or failed. */
export function createCharge(
  work: Work,
  intent: Kinds['payment_intent'],
  method: Kinds['payment_method'],
): ChargeRecord {
  const isBank = method.api.type === 'us_bank_account';
  const id = newId(isBank ? 'bank_charge' : 'charge');
  const { api } = intent;
  const charge: Stripe.Charge = {
    ...blankCharge(id, work.now(), api.amount),
    billing_details: structuredClone(method.api.billing_details),
    calculated_statement_descriptor: 'LOCAL STAND-IN',
    customer: api.customer,
    description: api.description,
    metadata: { ...api.metadata },
    payment_intent: api.id,
    payment_method: method.id,
    payment_method_details: methodDetails(method.api, api.amount),
    transfer_group: api.transfer_group,
  };
  return work.put('charge', {
    id,
    owner: intent.owner,
    api: charge,
    notes: {
      sourceType: sourceTypeOf(method.api),
      paymentMethodId: method.id,
      behaviour: method.notes.behaviour,
      transferredCents: 0,
      isBypassingPending: method.notes.behaviour === 'bypass_pending',
    },
  });
}

export const chargeRoutes = [
  route(
    'GET /v1/charges',
    'ChargeListParams',
    listParams({
      customer: text.optional(),
      payment_intent: text.optional(),
      transfer_group: text.optional(),
    }),
    ({ work, owner, params: wanted }) =>
      pageOf(work, 'charge', {
        owner,
        url: '/v1/charges',
        request: wanted,
        matches: ({ api }) =>
          (wanted.customer === undefined || api.customer === wanted.customer) &&
          (wanted.payment_intent === undefined || api.payment_intent === wanted.payment_intent) &&
          (wanted.transfer_group === undefined || api.transfer_group === wanted.transfer_group),
      }),
  ),
  route(
    'GET /v1/charges/:id',
    'ChargeRetrieveParams',
    params({}),
    ({ work, owner, path }) => work.require('charge', path['id']!, owner, { noun: 'charge' }).api,
  ),
  route(
    'POST /v1/charges/:id',
    'ChargeUpdateParams',
    params({ description: text.optional(), metadata: metadata.optional(), transfer_group: text.optional() }),
    ({ work, owner, path, params: change }) => {
      work.require('charge', path['id']!, owner, { noun: 'charge' });
      const { api } = work.edit('charge', path['id']!);
      api.metadata = mergeMetadata(api.metadata, change.metadata);
      if (change.description !== undefined) api.description = change.description;
      if (change.transfer_group !== undefined) api.transfer_group = change.transfer_group;
      work.emit('charge.updated', api, owner);
      return api;
    },
  ),
];
