import type { Stripe } from 'stripe';
import { resourceMissing } from '../errors.ts';
import { newId } from '../ids.ts';
import type { BankBehaviour, CardBehaviour, TestBank, TestCard } from '../test-values.ts';
import { findBankByToken, findCardByToken, TEST_ROUTING_NUMBER } from '../test-values.ts';
import type { Work } from '../work.ts';
import type { Kinds } from '../records.ts';

type MethodRecord = Kinds['payment_method'];

const NO_BILLING_DETAILS: Stripe.PaymentMethod.BillingDetails = {
  address: { city: null, country: null, line1: null, line2: null, postal_code: null, state: null },
  email: null,
  name: null,
  phone: null,
  tax_id: null,
};

interface MethodInput {
  owner: string;
  name?: string | null;
  email?: string | null;
}

function putMethod(
  work: Work,
  input: MethodInput,
  details: Pick<Stripe.PaymentMethod, 'card' | 'type' | 'us_bank_account'>,
  behaviour: BankBehaviour | CardBehaviour,
): MethodRecord {
  const api: Stripe.PaymentMethod = {
    id: newId('payment_method'),
    object: 'payment_method',
    allow_redisplay: 'unspecified',
    billing_details: { ...NO_BILLING_DETAILS, name: input.name ?? null, email: input.email ?? null },
    created: work.now(),
    customer: null,
    customer_account: null,
    livemode: false,
    metadata: {},
    ...details,
  };
  return work.put('payment_method', { id: api.id, owner: input.owner, api, notes: { behaviour } });
}

/** A fresh payment method from a test card. */
export function createCardMethod(
  work: Work,
  input: MethodInput & { card: TestCard; expMonth: number; expYear: number },
): MethodRecord {
  const { card, expMonth, expYear } = input;
  const details: Stripe.PaymentMethod.Card = {
    brand: card.brand,
    checks: { address_line1_check: null, address_postal_code_check: null, cvc_check: 'pass' },
    country: 'US',
    display_brand: card.brand,
    exp_month: expMonth,
    exp_year: expYear,
    fingerprint: `card${card.number.slice(-12)}`,
    funding: 'credit',
    generated_from: null,
    last4: card.number.slice(-4),
    networks: { available: [card.brand], preferred: null },
    regulated_status: 'unregulated',
    three_d_secure_usage: { supported: true },
    wallet: null,
  };
  return putMethod(work, input, { type: 'card', card: details }, card.behaviour);
}

/** A fresh payment method from a test bank account. */
export function createBankMethod(work: Work, input: MethodInput & { bank: TestBank }): MethodRecord {
  const details: Stripe.PaymentMethod.UsBankAccount = {
    account_holder_type: 'company',
    account_type: 'checking',
    bank_name: 'Test Bank',
    financial_connections_account: null,
    fingerprint: `bank${input.bank.accountNumber}`,
    last4: input.bank.accountNumber.slice(-4),
    networks: { preferred: 'ach', supported: ['ach'] },
    routing_number: TEST_ROUTING_NUMBER,
    status_details: null,
  };
  return putMethod(work, input, { type: 'us_bank_account', us_bank_account: details }, input.bank.behaviour);
}

/** A payment method by id, or a fresh one from a test token such as `pm_card_visa`. Throws 400 for any other text. */
export function materializeMethod(work: Work, idOrToken: string, owner: string): MethodRecord {
  const existing = work.get('payment_method', idOrToken);
  if (existing && existing.owner === owner) return existing;
  const card = findCardByToken(idOrToken);
  const expYear = new Date(work.now() * 1000).getUTCFullYear() + 2;
  if (card) return createCardMethod(work, { owner, card, expMonth: 12, expYear });
  const bank = findBankByToken(idOrToken);
  if (bank) return createBankMethod(work, { owner, bank });
  throw resourceMissing('PaymentMethod', idOrToken, 'payment_method');
}
