import { Ajv } from 'ajv';
import type { ValidateFunction } from 'ajv';
import type Stripe from 'stripe';
import { z } from 'zod';
import { API_ROUTES } from './routes.ts';
import { Harness, rejection } from './test/harness.ts';
import { sdkSchemas } from './test/sdk-schemas.ts';
import type { JsonSchema, SchemaFile } from './test/sdk-schemas.ts';

/** Outside check: shapes come from the types of the installed SDK (stripe 23.1.0), made from the provider's own specification. */

const OBJECT_TYPES: Record<string, string> = {
  account: 'Stripe.Account',
  account_link: 'Stripe.AccountLink',
  balance: 'Stripe.Balance',
  balance_transaction: 'Stripe.BalanceTransaction',
  bank_account: 'Stripe.BankAccount',
  capability: 'Stripe.Capability',
  charge: 'Stripe.Charge',
  'checkout.session': 'Stripe.Checkout.Session',
  customer: 'Stripe.Customer',
  dispute: 'Stripe.Dispute',
  item: 'Stripe.LineItem',
  payment_intent: 'Stripe.PaymentIntent',
  payout: 'Stripe.Payout',
  refund: 'Stripe.Refund',
  topup: 'Stripe.Topup',
  transfer: 'Stripe.Transfer',
  transfer_reversal: 'Stripe.TransferReversal',
  webhook_endpoint: 'Stripe.WebhookEndpoint',
};

const EVENT_TYPES = [
  'account.external_account.created',
  'account.external_account.deleted',
  'account.external_account.updated',
  'account.updated',
  'balance.available',
  'capability.updated',
  'charge.captured',
  'charge.dispute.closed',
  'charge.dispute.created',
  'charge.dispute.funds_reinstated',
  'charge.dispute.funds_withdrawn',
  'charge.dispute.updated',
  'charge.failed',
  'charge.pending',
  'charge.refund.updated',
  'charge.refunded',
  'charge.succeeded',
  'charge.updated',
  'checkout.session.async_payment_failed',
  'checkout.session.async_payment_succeeded',
  'checkout.session.completed',
  'checkout.session.expired',
  'customer.created',
  'customer.deleted',
  'customer.updated',
  'payment_intent.amount_capturable_updated',
  'payment_intent.canceled',
  'payment_intent.created',
  'payment_intent.payment_failed',
  'payment_intent.processing',
  'payment_intent.requires_action',
  'payment_intent.succeeded',
  'payout.canceled',
  'payout.created',
  'payout.failed',
  'payout.paid',
  'payout.updated',
  'refund.created',
  'refund.failed',
  'refund.updated',
  'topup.canceled',
  'topup.created',
  'topup.failed',
  'topup.succeeded',
  'transfer.created',
  'transfer.reversed',
  'transfer.updated',
];

const PARAM_TYPES = [...new Set(API_ROUTES.flatMap((route) => route.paramsType ?? []))];

const ROOTS: Record<string, string> = {
  ...OBJECT_TYPES,
  ...Object.fromEntries(
    EVENT_TYPES.map((type) => [
      `event:${type}`,
      `Extract<Stripe.Event, { type: '${type}' }>['data']['object']`,
    ]),
  ),
  ...Object.fromEntries(PARAM_TYPES.map((name) => [`params:${name}`, `Stripe.${name}`])),
};

interface Captured {
  request: string;
  body: Record<string, unknown>;
}

/** Goes once through everything the stand-in can do, so that every kind of answer and event occurs. */
class Tour {
  constructor(
    private readonly harness: Harness,
    private readonly stripe: Stripe,
  ) {}

  async run(): Promise<void> {
    const account = await this.accounts();
    const charge = await this.checkout();
    await this.transfersAndReversals(account, charge);
    await this.bankDebits();
    await this.intents();
    await this.refunds();
    await this.disputes();
    await this.payouts(account);
    await this.restOfTheApi();
    await this.lists(account);
  }

  private async accounts(): Promise<string> {
    const { stripe, harness } = this;
    const account = await stripe.accounts.create({
      controller: {
        stripe_dashboard: { type: 'express' },
        fees: { payer: 'application' },
        losses: { payments: 'application' },
      },
      country: 'US',
      email: 'crew@example.test',
      capabilities: { transfers: { requested: true }, card_payments: { requested: true } },
      business_profile: { name: 'Quarry Lane Cutting', mcc: '1799' },
      settings: { payouts: { schedule: { interval: 'manual' } } },
      metadata: { company: '1' },
    });
    await stripe.accountLinks.create({
      account: account.id,
      type: 'account_onboarding',
      refresh_url: 'http://127.0.0.1:4000/refresh',
      return_url: 'http://127.0.0.1:4000/return',
    });
    await harness.control('POST', 'onboard', { account: account.id, isIncomplete: true });
    await stripe.accounts.retrieve(account.id);
    await harness.control('POST', 'onboard', { account: account.id, isVerifiedAtOnce: false });
    await harness.advance({ seconds: 5 });
    await harness.outcome('account_restricted', account.id);
    await stripe.accounts.retrieve(account.id);
    await harness.control('POST', 'onboard', { account: account.id });
    await stripe.accounts.update(account.id, {
      company: { name: 'Quarry Lane Cutting LLC', address: { city: 'Ames' } },
      metadata: { company: '' },
    });
    await stripe.accounts.listCapabilities(account.id);
    await stripe.accounts.retrieveCapability(account.id, 'transfers');
    await stripe.accounts.retrieveCurrent();
    return account.id;
  }

  private async checkout(): Promise<Stripe.Charge> {
    const { stripe, harness } = this;
    const session = await harness.session({
      customer_email: 'gc@example.test',
      metadata: { funding: '1' },
      client_reference_id: 'funding-1',
      payment_intent_data: { transfer_group: 'job-1', metadata: { funding: '1' }, description: 'Job 1' },
    });
    await rejection(harness.control('POST', 'pay', { session: session.id, cardNumber: '4000000000000002' }));
    await stripe.checkout.sessions.retrieve(session.id, {
      expand: ['payment_intent.latest_charge', 'line_items'],
    });
    await harness.control('POST', 'pay', { session: session.id, cardNumber: '4000000000000077' });
    const paid = await stripe.checkout.sessions.retrieve(session.id, {
      expand: ['payment_intent.latest_charge.balance_transaction', 'payment_intent.payment_method'],
    });
    await stripe.checkout.sessions.listLineItems(session.id);
    const expiring = await harness.session();
    await harness.submit(`${harness.url}/pay/${expiring.id}`, {
      method: 'card',
      card_number: '4000002760003184',
      expiry: '12/40',
      cvc: '123',
      card_name: 'A',
    });
    await stripe.checkout.sessions.retrieve(expiring.id, { expand: ['payment_intent'] });
    await stripe.checkout.sessions.expire(expiring.id);
    return (paid.payment_intent as Stripe.PaymentIntent).latest_charge as Stripe.Charge;
  }

  private async transfersAndReversals(account: string, charge: Stripe.Charge): Promise<void> {
    const { stripe } = this;
    const transfer = await stripe.transfers.create({
      amount: 300_000,
      currency: 'usd',
      destination: account,
      source_transaction: charge.id,
      metadata: { operation: '1' },
      description: 'Release 1',
    });
    await stripe.transfers.update(transfer.id, { metadata: { seen: 'yes' } });
    const reversal = await stripe.transfers.createReversal(transfer.id, {
      amount: 50_000,
      metadata: { operation: '2' },
    });
    await stripe.transfers.retrieveReversal(transfer.id, reversal.id);
    await stripe.transfers.retrieve(transfer.id, {
      expand: ['balance_transaction', 'destination', 'destination_payment', 'source_transaction'],
    });
    await stripe.charges.retrieve(
      transfer.destination_payment as string,
      { expand: ['refunds'] },
      { stripeAccount: account },
    );
  }

  private async bankDebits(): Promise<void> {
    const { harness } = this;
    const good = await harness.session();
    await harness.control('POST', 'pay', { session: good.id, bankAccountNumber: '000123456789' });
    const bad = await harness.session();
    await harness.control('POST', 'pay', { session: bad.id, bankAccountNumber: '000111111113' });
    const slow = await harness.session();
    await harness.control('POST', 'pay', { session: slow.id, bankAccountNumber: '000555555559' });
    await harness.advance({ days: 8 });
  }

  private async intents(): Promise<void> {
    const { stripe } = this;
    const customer = await stripe.customers.create({
      name: 'Harrow Builders',
      email: 'a@example.test',
      address: { city: 'Ames' },
      metadata: { company: '2' },
    });
    await stripe.customers.update(customer.id, { phone: '', metadata: { company: '' } });
    const held = await stripe.paymentIntents.create({
      amount: 5000,
      currency: 'usd',
      capture_method: 'manual',
      customer: customer.id,
      automatic_payment_methods: { enabled: true, allow_redirects: 'never' },
    });
    await stripe.paymentIntents.update(held.id, {
      metadata: { a: '1' },
      payment_method: 'pm_card_mastercard',
    });
    await stripe.paymentIntents.confirm(held.id, { return_url: 'http://127.0.0.1:4000/return' });
    await stripe.paymentIntents.capture(held.id, { amount_to_capture: 4000 });
    const action = await stripe.paymentIntents.create({
      amount: 5000,
      currency: 'usd',
      payment_method: 'pm_card_authenticationRequired',
      confirm: true,
    });
    await stripe.paymentIntents.cancel(action.id, { cancellation_reason: 'abandoned' });
    await rejection(
      stripe.paymentIntents.create({
        amount: 5000,
        currency: 'usd',
        payment_method: 'pm_card_authenticationRequired',
        confirm: true,
        off_session: true,
      }),
    );
    await rejection(
      stripe.paymentIntents.create({
        amount: 5000,
        currency: 'usd',
        payment_method: 'pm_card_radarBlock',
        confirm: true,
      }),
    );
    await stripe.customers.del(customer.id);
  }

  private async refunds(): Promise<void> {
    const { stripe, harness } = this;
    const charge = await harness.paidCharge(60_000, 'pm_card_bypassPending');
    const refund = await stripe.refunds.create({
      charge: charge.id,
      amount: 10_000,
      metadata: { a: '1' },
      reason: 'requested_by_customer',
    });
    await stripe.refunds.update(refund.id, { metadata: { b: '2' } });
    const failing = await harness.paidCharge(60_000, 'pm_card_refundFail');
    const late = await stripe.refunds.create({ charge: failing.id });
    await harness.advance({ hours: 2 });
    await stripe.refunds.retrieve(late.id, { expand: ['failure_balance_transaction', 'charge'] });
    const debit = await harness.paidCharge(60_000, 'pm_usBankAccount_success');
    const early = await stripe.refunds.create({ charge: debit.id, amount: 100 });
    await stripe.refunds.cancel(early.id);
    await harness.outcome('debit_succeeds', debit.id);
    await stripe.refunds.create({ payment_intent: debit.payment_intent as string });
    await stripe.charges.retrieve(debit.id, { expand: ['refunds', 'balance_transaction'] });
  }

  private async disputes(): Promise<void> {
    const { stripe, harness } = this;
    const charge = await harness.paidCharge(60_000, 'pm_card_bypassPending');
    await harness.outcome('dispute_opens', charge.id);
    const [dispute] = (await stripe.disputes.list({ charge: charge.id })).data;
    await stripe.disputes.update(dispute!.id, {
      evidence: { uncategorized_text: 'winning_evidence' },
      metadata: { a: '1' },
    });
    await harness.advance({ hours: 2 });
    await stripe.disputes.retrieve(dispute!.id, { expand: ['charge', 'payment_intent'] });
    await harness.paidCharge(60_000, 'pm_card_createDisputeInquiry');
    await harness.paidCharge(60_000, 'pm_card_createDisputeProductNotReceived');
    await harness.advance({ seconds: 5 });
    for (const open of (await stripe.disputes.list()).data) {
      if (open.status === 'warning_needs_response') await harness.outcome('inquiry_escalates', open.id);
      if (open.status === 'needs_response') await stripe.disputes.close(open.id);
    }
  }

  private async payouts(account: string): Promise<void> {
    const { stripe, harness } = this;
    const on = { stripeAccount: account };
    const first = await stripe.payouts.create({ amount: 1000, currency: 'usd', metadata: { a: '1' } }, on);
    await stripe.payouts.update(first.id, { metadata: { b: '1' } }, on);
    const canceled = await stripe.payouts.create({ amount: 1000, currency: 'usd' }, on);
    await stripe.payouts.cancel(canceled.id, {}, on);
    await harness.advance({ days: 6 });
    await stripe.payouts.reverse(first.id, {}, on);
    const bouncing = await stripe.payouts.create({ amount: 1000, currency: 'usd', method: 'instant' }, on);
    await harness.outcome('payout_failed', bouncing.id, 'account_closed');
    await stripe.payouts.retrieve(
      bouncing.id,
      { expand: ['failure_balance_transaction', 'destination', 'balance_transaction'] },
      on,
    );
    await harness.control('POST', 'onboard', { account, businessName: 'Quarry Lane Cutting' });
    await stripe.accounts.retrieve(account);
  }

  private async restOfTheApi(): Promise<void> {
    const { stripe, harness } = this;
    const topup = await stripe.topups.create({
      amount: 100_000,
      currency: 'usd',
      description: 'Float',
      statement_descriptor: 'FLOAT',
    });
    await harness.outcome('topup_succeeds', topup.id);
    await stripe.topups.retrieve(topup.id, { expand: ['balance_transaction'] });
    await stripe.topups.update(topup.id, { metadata: { a: '1' } });
    const failed = await stripe.topups.create({ amount: 100_000, currency: 'usd' });
    await harness.outcome('topup_fails', failed.id);
    const canceled = await stripe.topups.create({ amount: 100_000, currency: 'usd' });
    await stripe.topups.cancel(canceled.id);
    const endpoint = await stripe.webhookEndpoints.create({
      url: 'http://127.0.0.1:9/hook',
      enabled_events: ['charge.succeeded'],
      connect: true,
      description: 'd',
    });
    await stripe.webhookEndpoints.update(endpoint.id, { disabled: true });
    await stripe.webhookEndpoints.retrieve(endpoint.id);
    await stripe.webhookEndpoints.del(endpoint.id);
    const charge = await harness.paidCharge(60_000);
    await stripe.charges.update(charge.id, { description: 'changed' });
  }

  private async lists(account: string): Promise<void> {
    const { stripe } = this;
    const on = { stripeAccount: account };
    await stripe.balance.retrieve();
    await stripe.balance.retrieve({}, on);
    const everything = { limit: 100 };
    await stripe.balanceTransactions.list(everything);
    await stripe.balanceTransactions.list({ ...everything, expand: ['data.source'] }, on);
    await stripe.charges.list(everything);
    await stripe.paymentIntents.list(everything);
    await stripe.checkout.sessions.list(everything);
    await stripe.transfers.list(everything);
    await stripe.refunds.list(everything);
    await stripe.disputes.list(everything);
    await stripe.topups.list(everything);
    await stripe.accounts.list(everything);
    await stripe.customers.list(everything);
    await stripe.webhookEndpoints.list(everything);
    await stripe.payouts.list(everything, on);
  }
}

describe('answers and events have the shape of the SDK types (A-26, A-30)', () => {
  const harness = new Harness();
  const captured: Captured[] = [];
  let schemas: SchemaFile;
  let ajv: Ajv;
  const validators = new Map<string, ValidateFunction>();

  beforeAll(async () => {
    schemas = sdkSchemas(ROOTS);
    ajv = new Ajv({ strict: false, allErrors: false, verbose: true });
    ajv.addSchema({ $id: 'sdk', definitions: schemas.definitions });
    await harness.start();
    harness.captureAnswers((request, body) => captured.push({ request, body }));
    await new Tour(harness, harness.stripe).run();
  }, 120_000);

  afterAll(() => harness.stop());

  function problemsOf(root: string, value: unknown): string | null {
    const schema = schemas.roots[root];
    if (!schema) return `the stand-in sent a ${root}, which this test does not know`;
    const validate = validators.get(root) ?? ajv.compile(withBase(schema));
    validators.set(root, validate);
    if (validate(value)) return null;
    return `${root}: ${ajv.errorsText(validate.errors)}`;
  }

  /** References of a root point into the shared definitions. */
  function withBase(schema: JsonSchema): JsonSchema {
    return JSON.parse(
      JSON.stringify(schema).replaceAll('"#/definitions/', '"sdk#/definitions/'),
    ) as JsonSchema;
  }

  function objectsOf({ body }: Captured): Record<string, unknown>[] {
    return body['object'] === 'list' ? (body['data'] as Record<string, unknown>[]) : [body];
  }

  test('every answer of the tour is a valid object of its kind', () => {
    const answers = captured.filter(({ body }) => !body['error'] && body['deleted'] !== true);
    const kinds = new Set<string>();
    const problems = answers.flatMap((answer) =>
      objectsOf(answer).flatMap((object) => {
        const kind = String(object['object']);
        kinds.add(kind);
        const problem = problemsOf(kind, object);
        return problem ? [`${answer.request}: ${problem}`] : [];
      }),
    );
    expect(problems).toEqual([]);
    expect(
      [...Object.keys(OBJECT_TYPES)].filter((kind) => !kinds.has(kind) && kind !== 'bank_account'),
    ).toEqual([]);
  }, 60_000);

  test('every event of the tour carries a valid object, and all kinds of events occurred', async () => {
    const work = await allEvents(harness);
    const problems = work.flatMap((event) => problemsOf(`event:${event.type}`, event.data.object) ?? []);
    expect(problems).toEqual([]);
    const seen = new Set<string>(work.map((event) => event.type));
    expect(EVENT_TYPES.filter((type) => !seen.has(type))).toEqual([]);
  }, 60_000);

  test('the check bites: a field too many, a missing and a wrong one are found', () => {
    const transfer = captured.map(({ body }) => body).find((body) => body['object'] === 'transfer')!;
    expect(problemsOf('transfer', transfer)).toBeNull();
    expect(problemsOf('transfer', { ...transfer, surprise: 1 })).toContain('additional properties');
    expect(problemsOf('transfer', { ...transfer, amount: '1' })).toContain('number');
    const { reversed: _reversed, ...lacking } = transfer;
    expect(problemsOf('transfer', lacking)).toContain('reversed');
  });
});

async function allEvents(harness: Harness): Promise<Stripe.Event[]> {
  const { stripe } = harness;
  const events = await stripe.events.list({ limit: 100 }).autoPagingToArray({ limit: 10_000 });
  for (const account of (await stripe.accounts.list()).data) {
    const list = stripe.events.list({ limit: 100 }, { stripeAccount: account.id });
    events.push(...(await list.autoPagingToArray({ limit: 10_000 })));
  }
  return events;
}

describe('parameters the stand-in takes exist in the SDK (A-27)', () => {
  let schemas: SchemaFile;

  beforeAll(() => {
    schemas = sdkSchemas(ROOTS);
  }, 120_000);

  /** Paths of every parameter a schema names, with `[]` for the items of a list. */
  function pathsOf(schema: JsonSchema, prefix: string): string[] {
    const options = (schema['anyOf'] as JsonSchema[] | undefined) ?? [];
    const properties = Object.entries((schema['properties'] as Record<string, JsonSchema> | undefined) ?? {});
    const items = schema['items'] as JsonSchema | undefined;
    return [
      ...options.flatMap((option) => pathsOf(option, prefix)),
      ...properties.flatMap(([name, inner]) => [`${prefix}${name}`, ...pathsOf(inner, `${prefix}${name}.`)]),
      ...(items ? pathsOf(items, `${prefix}[].`) : []),
    ];
  }

  function step(schema: JsonSchema, name: string): JsonSchema[] {
    const reference = schema['$ref'] as string | undefined;
    if (reference) return step(schemas.definitions[reference.replace('#/definitions/', '')]!, name);
    const options = schema['anyOf'] as JsonSchema[] | undefined;
    if (options) return options.flatMap((option) => step(option, name));
    if (name === '[]') return schema['items'] ? [schema['items'] as JsonSchema] : [];
    const property = (schema['properties'] as Record<string, JsonSchema> | undefined)?.[name];
    return property ? [property] : [];
  }

  function hasPath(root: JsonSchema, path: string): boolean {
    return (
      path.split('.').reduce<JsonSchema[]>((found, name) => found.flatMap((one) => step(one, name)), [root])
        .length > 0
    );
  }

  test.each(API_ROUTES.map((route) => [`${route.method} ${route.path}`, route] as const))(
    '%s',
    (_name, route) => {
      const own = z.toJSONSchema(route.schema, { io: 'input', unrepresentable: 'any' }) as JsonSchema;
      const sdk = schemas.roots[`params:${route.paramsType}`]!;
      // Delete calls have no type of parameters; the SDK sends none.
      const paths = pathsOf(own, '').filter((path) => !(route.method === 'DELETE' && path === 'expand'));
      expect(paths.filter((path) => !hasPath(sdk, path))).toEqual([]);
    },
  );
});
