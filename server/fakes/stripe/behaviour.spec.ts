import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import Stripe from 'stripe';
import { CONNECT_SECRET, Harness, PLATFORM_SECRET, rejection, SECRET_KEY } from './test/harness.ts';

/**
 * The provider's rules that a client can rely on, each with its document. "The stand-in decides" marks what no
 * document states.
 */

const harness = new Harness();
beforeAll(() => harness.start());
afterAll(() => harness.stop());

const transferForm = (destination: string, amount = 100) =>
  `amount=${amount}&currency=usd&destination=${destination}`;

async function fundedAccount(): Promise<string> {
  await harness.paidCharge(500_000, 'pm_card_bypassPending');
  return (await harness.onboardedAccount()).id;
}

describe('idempotency keys', () => {
  test('A-20 same key and parameters: the stored answer again, marked as replayed (docs.stripe.com/api/idempotent_requests)', async () => {
    const destination = await fundedAccount();
    const headers = { 'Idempotency-Key': 'a20' };
    const first = await harness.raw('POST', '/v1/transfers', { form: transferForm(destination), headers });
    const reordered = `destination=${destination}&currency=usd&amount=100`;
    const second = await harness.raw('POST', '/v1/transfers', { form: reordered, headers });
    expect(first.headers.get('idempotent-replayed')).toBeNull();
    expect(second.headers.get('idempotent-replayed')).toBe('true');
    expect(second.headers.get('original-request')).toBe(first.headers.get('request-id'));
    expect(second.body).toEqual(first.body);
    expect((await harness.stripe.transfers.list({ destination })).data).toHaveLength(1);
  });

  test('A-20 a refusal that came from running is stored too: 402 and 400 (same document)', async () => {
    const declined = {
      amount: 5000,
      currency: 'usd',
      payment_method: 'pm_card_visa_chargeDeclined',
      confirm: true,
    };
    const key = { idempotencyKey: 'a20-402' };
    const first = await rejection(harness.stripe.paymentIntents.create(declined, key));
    const second = await rejection(harness.stripe.paymentIntents.create(declined, key));
    expect([first.statusCode, second.statusCode]).toEqual([402, 402]);
    expect(second.headers?.['idempotent-replayed']).toBe('true');
    expect(second.payment_intent?.id).toBe(first.payment_intent?.id);

    const { id: destination } = await harness.onboardedAccount();
    const short = { amount: 90_000_000, currency: 'usd', destination };
    await rejection(harness.stripe.transfers.create(short, { idempotencyKey: 'a20-400' }));
    const again = await rejection(harness.stripe.transfers.create(short, { idempotencyKey: 'a20-400' }));
    expect(again).toMatchObject({ statusCode: 400, code: 'balance_insufficient' });
    expect(again.headers?.['idempotent-replayed']).toBe('true');
  });

  test('A-20, A-25 a 500 is stored and stays, though the object exists (docs.stripe.com/error-low-level)', async () => {
    const destination = await fundedAccount();
    await harness.control('POST', 'faults', { kind: '500', path: '/v1/transfers', hasEffect: true });
    const params = { amount: 100, currency: 'usd', destination, metadata: { operation: 'a25' } };
    const first = await rejection(harness.stripe.transfers.create(params, { idempotencyKey: 'a25' }));
    const second = await rejection(harness.stripe.transfers.create(params, { idempotencyKey: 'a25' }));
    expect([first.type, second.type]).toEqual(['StripeAPIError', 'StripeAPIError']);
    const found = (await harness.stripe.transfers.list({ destination })).data;
    expect(found.map((transfer) => transfer.metadata['operation'])).toEqual(['a25']);
    await harness.webhook('platform', 'transfer.created', found[0]!.id);
  });

  test('A-25 a 500 without an effect leaves nothing behind (the stand-in decides)', async () => {
    const destination = await fundedAccount();
    await harness.control('POST', 'faults', { kind: '500', path: '/v1/transfers' });
    await rejection(harness.stripe.transfers.create({ amount: 100, currency: 'usd', destination }));
    expect((await harness.stripe.transfers.list({ destination })).data).toEqual([]);
  });

  test('A-21 same key, other parameters: 400 idempotency_error (docs.stripe.com/api/idempotent_requests)', async () => {
    const destination = await fundedAccount();
    const key = { idempotencyKey: 'a21' };
    await harness.stripe.transfers.create({ amount: 100, currency: 'usd', destination }, key);
    const error = await rejection(
      harness.stripe.transfers.create({ amount: 101, currency: 'usd', destination }, key),
    );
    expect(error).toMatchObject({
      statusCode: 400,
      type: 'StripeIdempotencyError',
      rawType: 'idempotency_error',
    });
    expect(error.message).toMatch(/^Keys for idempotent requests can only be used with the same parameters/);
    const elsewhere = await rejection(harness.stripe.customers.create({ name: 'A' }, key));
    expect(elsewhere.type).toBe('StripeIdempotencyError');
  });

  test('A-22 same key while the first is running: 409 (docs.stripe.com/api/errors)', async () => {
    const destination = await fundedAccount();
    await harness.control('POST', 'faults', { kind: 'delay', path: '/v1/transfers', delayMs: 1500 });
    const params = { amount: 100, currency: 'usd', destination };
    const first = harness.stripe.transfers.create(params, { idempotencyKey: 'a22' });
    await new Promise((resolve) => setTimeout(resolve, 100));
    const second = await rejection(harness.stripe.transfers.create(params, { idempotencyKey: 'a22' }));
    expect(second).toMatchObject({ statusCode: 409, code: 'idempotency_key_in_use' });
    const { id } = await first;
    const third = await harness.stripe.transfers.create(params, { idempotencyKey: 'a22' });
    expect(third.id).toBe(id);
  });

  test('A-23 nothing is stored for a wrong parameter, a missing key or the limiter (docs.stripe.com/api/idempotent_requests)', async () => {
    const destination = await fundedAccount();
    const headers = { 'Idempotency-Key': 'a23' };
    const wrong = await harness.raw('POST', '/v1/transfers', { form: 'amount=abc', headers });
    expect(wrong.status).toBe(400);
    const noKey = { ...headers, Authorization: '' };
    expect(
      (await harness.raw('POST', '/v1/transfers', { form: transferForm(destination), headers: noKey }))
        .status,
    ).toBe(401);
    await harness.control('POST', 'faults', { kind: '429', path: '/v1/transfers' });
    expect(
      (await harness.raw('POST', '/v1/transfers', { form: transferForm(destination), headers })).status,
    ).toBe(429);
    await harness.control('POST', 'faults', { kind: '409', path: '/v1/transfers' });
    expect(
      (await harness.raw('POST', '/v1/transfers', { form: transferForm(destination), headers })).status,
    ).toBe(409);
    const ran = await harness.raw('POST', '/v1/transfers', { form: transferForm(destination), headers });
    expect(ran.status).toBe(200);
    expect(ran.headers.get('idempotent-replayed')).toBeNull();
  });

  test('A-24 after 24 hours a key is forgotten and the request runs again (docs.stripe.com/api/idempotent_requests)', async () => {
    const destination = await fundedAccount();
    const params = { amount: 100, currency: 'usd', destination };
    const first = await harness.stripe.transfers.create(params, { idempotencyKey: 'a24' });
    await harness.advance({ hours: 23 });
    expect((await harness.stripe.transfers.create(params, { idempotencyKey: 'a24' })).id).toBe(first.id);
    await harness.advance({ hours: 2 });
    expect((await harness.stripe.transfers.create(params, { idempotencyKey: 'a24' })).id).not.toBe(first.id);
  });

  test('A-34 keys and objects of one connected account do not meet those of another (docs.stripe.com/connect/authentication)', async () => {
    const [left, right] = [await harness.onboardedAccount(), await harness.onboardedAccount()];
    const key = 'a34';
    const a = await harness.stripe.customers.create(
      { name: 'A' },
      { stripeAccount: left.id, idempotencyKey: key },
    );
    const b = await harness.stripe.customers.create(
      { name: 'B' },
      { stripeAccount: right.id, idempotencyKey: key },
    );
    expect(b.id).not.toBe(a.id);
    const foreign = await rejection(harness.stripe.customers.retrieve(a.id, {}, { stripeAccount: right.id }));
    expect(foreign).toMatchObject({ statusCode: 404, code: 'resource_missing' });
    expect((await harness.stripe.customers.list()).data.map(({ id }) => id)).not.toContain(a.id);
    const unknown = await rejection(harness.stripe.balance.retrieve({}, { stripeAccount: 'acct_1nobody' }));
    expect(unknown).toMatchObject({
      statusCode: 403,
      code: 'account_invalid',
      type: 'StripePermissionError',
    });
  });
});

describe('errors', () => {
  test('A-26 an error says type, code, parameter and request (docs.stripe.com/api/errors)', async () => {
    const error = await rejection(harness.stripe.transfers.retrieve('tr_nobody'));
    expect(error).toMatchObject({
      statusCode: 404,
      type: 'StripeInvalidRequestError',
      code: 'resource_missing',
      param: 'id',
    });
    expect(error.requestId).toMatch(/^req_\w+$/);
    expect(error.doc_url).toContain('resource-missing');
  });

  test('A-26 a decline carries code, decline code, charge and payment (docs.stripe.com/declines/codes)', async () => {
    const expected: [string, string, string | undefined][] = [
      ['pm_card_visa_chargeDeclined', 'card_declined', 'generic_decline'],
      ['pm_card_chargeDeclinedInsufficientFunds', 'card_declined', 'insufficient_funds'],
      ['pm_card_visa_chargeDeclinedLostCard', 'card_declined', 'lost_card'],
      ['pm_card_visa_chargeDeclinedExpiredCard', 'expired_card', undefined],
      ['pm_card_visa_chargeDeclinedIncorrectCvc', 'incorrect_cvc', undefined],
    ];
    for (const [token, code, declineCode] of expected) {
      const error = await rejection(harness.paidCharge(5000, token));
      expect(error).toMatchObject({ statusCode: 402, type: 'StripeCardError', code });
      expect(error.decline_code || undefined).toBe(declineCode);
      const intent = await harness.stripe.paymentIntents.retrieve(error.payment_intent!.id, {
        expand: ['latest_charge'],
      });
      expect(intent).toMatchObject({ status: 'requires_payment_method', last_payment_error: { code } });
      expect(intent.latest_charge).toMatchObject({
        id: error.charge,
        status: 'failed',
        failure_code: code,
        paid: false,
      });
    }
  });

  test('A-27 unknown, missing and malformed parameters are refused by name (docs.stripe.com/error-codes)', async () => {
    const cases: [string, object][] = [
      [
        'amount=100&currency=usd&destination=acct_1&colour=red',
        { code: 'parameter_unknown', param: 'colour' },
      ],
      [
        'amount=100&currency=usd&destination=acct_1&metadata[a]=1&source[x]=1',
        { code: 'parameter_unknown', param: 'source' },
      ],
      ['amount=100&currency=usd', { code: 'parameter_missing', param: 'destination' }],
      ['amount=1.5&currency=usd&destination=acct_1', { code: 'parameter_invalid_integer', param: 'amount' }],
      ['amount=0&currency=usd&destination=acct_1', { param: 'amount' }],
      ['amount=100&currency=eur&destination=acct_1', { param: 'currency' }],
      ['amount=100&currency=usd&destination=', { code: 'parameter_invalid_empty', param: 'destination' }],
      ['amount=100&currency=usd&destination=acct_nobody', { code: 'resource_missing', param: 'destination' }],
    ];
    for (const [form, expected] of cases) {
      const { status, body } = await harness.raw('POST', '/v1/transfers', { form });
      expect({ form, status, error: body['error'] }).toMatchObject({
        status: 400,
        error: { type: 'invalid_request_error', ...expected },
      });
    }
  });

  test('A-27 a parameter that the SDK dropped in version 23 is refused (stripe-node CHANGELOG 23.0.0)', async () => {
    const form = 'amount=5000&currency=usd&payment_method_types[0]=card';
    const { status, body } = await harness.raw('POST', '/v1/payment_intents', { form });
    expect({ status, error: body['error'] }).toMatchObject({
      status: 400,
      error: { code: 'parameter_unknown', param: 'payment_method_types' },
    });
  });

  test('A-27 unknown fields deep inside are named with their path', async () => {
    const error = await rejection(
      harness.session({ payment_intent_data: { transfer_group: 'g', secret: 1 } as object }),
    );
    expect(error).toMatchObject({ code: 'parameter_unknown', param: 'payment_intent_data[secret]' });
  });

  test('only a test key opens the door: 401 without, with a wrong and with a live key (docs.stripe.com/api/authentication)', async () => {
    for (const key of ['sk_test_wrong_key_00', `${SECRET_KEY}x`, 'sk_live_00000000']) {
      const error = await rejection(harness.sdk({ apiKey: key }).balance.retrieve());
      expect(error).toMatchObject({ statusCode: 401, type: 'StripeAuthenticationError' });
    }
  });
});

describe('lists', () => {
  test('A-28 newest first, ten by default, cursors both ways, has_more (docs.stripe.com/api/pagination)', async () => {
    const account = await harness.onboardedAccount();
    const on = { stripeAccount: account.id };
    const made: string[] = [];
    for (let index = 0; index < 12; index += 1) {
      made.unshift((await harness.stripe.customers.create({ name: `Customer ${index}` }, on)).id);
    }
    const list = (params: Stripe.CustomerListParams) => harness.stripe.customers.list(params, on);
    const first = await list({});
    expect(first.data.map(({ id }) => id)).toEqual(made.slice(0, 10));
    expect(first).toMatchObject({ object: 'list', has_more: true, url: '/v1/customers' });
    const second = await list({ starting_after: made[9]!, limit: 5 });
    expect(second.data.map(({ id }) => id)).toEqual(made.slice(10));
    expect(second.has_more).toBe(false);
    const back = await list({ ending_before: made[6]!, limit: 3 });
    expect(back.data.map(({ id }) => id)).toEqual(made.slice(3, 6));
    expect(back.has_more).toBe(true);
    const all = await harness.stripe.customers.list({ limit: 5 }, on).autoPagingToArray({ limit: 100 });
    expect(all.map(({ id }) => id)).toEqual(made);
    expect(await rejection(list({ limit: 101 }))).toMatchObject({ statusCode: 400, param: 'limit' });
  });

  test('A-28 created filters by seconds of the stand-in clock', async () => {
    const account = await harness.onboardedAccount();
    const on = { stripeAccount: account.id };
    const early = await harness.stripe.customers.create({ name: 'early' }, on);
    await harness.advance({ seconds: 100 });
    const late = await harness.stripe.customers.create({ name: 'late' }, on);
    const from = await harness.stripe.customers.list({ created: { gte: late.created } }, on);
    expect(from.data.map(({ id }) => id)).toEqual([late.id]);
    const before = await harness.stripe.customers.list({ created: { lt: late.created } }, on);
    expect(before.data.map(({ id }) => id)).toEqual([early.id]);
  });

  test('expand replaces ids along a path and refuses what is none (docs.stripe.com/api/expanding_objects)', async () => {
    const charge = await harness.paidCharge(5000);
    const listed = await harness.stripe.charges.list({
      limit: 1,
      expand: ['data.balance_transaction', 'data.payment_intent.payment_method'],
    });
    expect(listed.data[0]).toMatchObject({
      id: charge.id,
      balance_transaction: { object: 'balance_transaction' },
    });
    expect((listed.data[0]!.payment_intent as Stripe.PaymentIntent).payment_method).toMatchObject({
      object: 'payment_method',
    });
    const error = await rejection(harness.stripe.charges.retrieve(charge.id, { expand: ['amount'] }));
    expect(error).toMatchObject({ statusCode: 400, message: 'This property cannot be expanded (amount).' });
  });
});

describe('rate limits', () => {
  test('A-29 (plain form) 429 with the reason, without Retry-After, not retried by the SDK (docs.stripe.com/rate-limits)', async () => {
    await harness.control('POST', 'settings', { requestsPerSecond: 2 });
    const answers = await Promise.all(Array.from({ length: 12 }, () => harness.raw('GET', '/v1/balance')));
    await harness.control('POST', 'settings', { requestsPerSecond: 0 });
    const limited = answers.filter(({ status }) => status === 429);
    // How many depends on how fast this machine is; never all, since the first two always pass.
    expect(limited.length).toBeGreaterThan(0);
    expect(limited.length).toBeLessThanOrEqual(10);
    expect(limited[0]!.headers.get('stripe-rate-limited-reason')).toBe('global-rate');
    expect(limited[0]!.headers.get('retry-after')).toBeNull();

    await harness.control('DELETE', 'requests');
    await harness.control('POST', 'faults', { kind: '429', path: '/v1/balance' });
    const error = await rejection(harness.sdk({ maxNetworkRetries: 2 }).balance.retrieve());
    expect(error.type).toBe('StripeRateLimitError');
    const { requests } = await harness.control<{ requests: unknown[] }>('GET', 'requests');
    expect(requests).toHaveLength(1);
  });
});

describe('faults of the line', () => {
  test('A-19 a connection dropped after the effect: the SDK tries again under the same key, one transfer', async () => {
    const destination = await fundedAccount();
    await harness.control('DELETE', 'requests');
    await harness.control('POST', 'faults', { kind: 'drop_after', path: '/v1/transfers' });
    const transfer = await harness.stripe.transfers.create({ amount: 100, currency: 'usd', destination });
    const { data } = await harness.stripe.transfers.list({ destination });
    expect(data.map(({ id }) => id)).toEqual([transfer.id]);
    const { requests } = await harness.control<{
      requests: { isReplay: boolean; fault: string; method: string }[];
    }>('GET', 'requests');
    expect(requests.filter(({ method }) => method === 'POST').map(({ isReplay }) => isReplay)).toEqual([
      true,
      false,
    ]);
  });

  test('A-19 dropped before the effect: nothing happened until the next try', async () => {
    const destination = await fundedAccount();
    await harness.control('POST', 'faults', { kind: 'drop_before', path: '/v1/transfers', count: 5 });
    const error = await rejection(
      harness.sdk({ maxNetworkRetries: 1 }).transfers.create({ amount: 100, currency: 'usd', destination }),
    );
    expect(error.type).toBe('StripeConnectionError');
    await harness.control('DELETE', 'faults');
    expect((await harness.stripe.transfers.list({ destination })).data).toEqual([]);
  });

  test('A-19 slower than the time-out of the SDK: an error there, one effect here', async () => {
    const destination = await fundedAccount();
    await harness.control('POST', 'faults', { kind: 'delay', path: '/v1/transfers', delayMs: 600 });
    const impatient = harness.sdk({ timeout: 150 });
    const params = { amount: 100, currency: 'usd', destination };
    const error = await rejection(impatient.transfers.create(params, { idempotencyKey: 'slow' }));
    expect(['StripeConnectionError', 'StripeAPIError', 'StripeInvalidRequestError']).toContain(error.type);
    await harness.until(
      async () => (await harness.stripe.transfers.list({ destination })).data.length === 1,
      'the effect',
    );
    const same = await harness.stripe.transfers.create(params, { idempotencyKey: 'slow' });
    expect((await harness.stripe.transfers.list({ destination })).data.map(({ id }) => id)).toEqual([
      same.id,
    ]);
  });

  test('A-19 a fault counts down, matches its method and path, and can be ordered for all below a path', async () => {
    await harness.control('POST', 'faults', { kind: '500', path: '/v1/*', method: 'GET', count: 2 });
    expect((await harness.raw('GET', '/v1/balance')).status).toBe(500);
    expect((await harness.raw('POST', '/v1/customers', { form: 'name=A' })).status).toBe(200);
    expect((await harness.raw('GET', '/v1/events')).status).toBe(500);
    expect((await harness.raw('GET', '/v1/balance')).status).toBe(200);
  });
});

describe('webhooks', () => {
  test('A-30 the header carries a signature of the raw body that the SDK accepts; a changed body fails (docs.stripe.com/webhooks/signature)', async () => {
    const charge = await harness.paidCharge(5000);
    const { rawBody, headers, event } = await harness.webhook('platform', 'charge.succeeded', charge.id);
    const signature = headers['stripe-signature'] as string;
    expect(signature).toMatch(/^t=\d+,v1=[0-9a-f]{64}$/);
    expect(Stripe.webhooks.constructEvent(rawBody, signature, PLATFORM_SECRET).id).toBe(event.id);
    expect(() => Stripe.webhooks.constructEvent(`${rawBody} `, signature, PLATFORM_SECRET)).toThrow();
    expect(() => Stripe.webhooks.constructEvent(rawBody, signature, CONNECT_SECRET)).toThrow();
    expect(event).toMatchObject({ object: 'event', api_version: '2026-10-28.endive', livemode: false });
  });

  test('A-30, A-31 a failed delivery is tried again: same event, new signature, until 2xx (docs.stripe.com/webhooks#retries)', async () => {
    harness.receiver.status = 500;
    const charge = await harness.paidCharge(5000);
    await harness.webhook('platform', 'charge.succeeded', charge.id);
    harness.receiver.status = 200;
    const find = () =>
      harness.receiver.received.filter(
        ({ event }) =>
          event.type === 'charge.succeeded' && (event.data.object as Stripe.Charge).id === charge.id,
      );
    await new Promise((resolve) => setTimeout(resolve, 1100));
    await harness.advance({ seconds: 30 });
    await harness.until(() => find().length === 2, 'the second attempt');
    const [first, second] = find();
    expect(second!.event.id).toBe(first!.event.id);
    expect(second!.headers['stripe-signature']).not.toBe(first!.headers['stripe-signature']);
    await harness.until(
      async () => (await harness.stripe.events.retrieve(first!.event.id)).pending_webhooks === 0,
      'delivery',
    );
    await harness.advance({ days: 1 });
    expect(find()).toHaveLength(2);
  });

  test('A-31 duplicates, any order, holding and withheld events; the list has them all (docs.stripe.com/webhooks#behaviors)', async () => {
    await harness.control('POST', 'webhooks', { duplicates: 2, reorderWithinMs: 50 });
    const charge = await harness.paidCharge(5000);
    const copies = () =>
      harness.receiver.received.filter(
        ({ event }) =>
          event.type === 'charge.succeeded' && (event.data.object as Stripe.Charge).id === charge.id,
      );
    await harness.until(() => copies().length === 3, 'three copies');
    expect(new Set(copies().map(({ event }) => event.id)).size).toBe(1);

    await harness.control('POST', 'webhooks', { duplicates: 0, reorderWithinMs: 0, isHolding: true });
    const held = await harness.paidCharge(5000);
    await new Promise((resolve) => setTimeout(resolve, 150));
    expect(harness.receiver.received.some(({ rawBody }) => rawBody.includes(held.id))).toBe(false);
    await harness.control('POST', 'webhooks', { isHolding: false });
    await harness.webhook('platform', 'charge.succeeded', held.id);

    await harness.control('POST', 'webhooks', { withholdPercent: 100 });
    const lost = await harness.paidCharge(5000);
    await harness.control('POST', 'webhooks', { withholdPercent: 0 });
    const missed = await harness.stripe.events.list({ delivery_success: false, type: 'charge.succeeded' });
    expect(missed.data.map(({ data }) => (data.object as Stripe.Charge).id)).toEqual([lost.id]);
    expect(harness.receiver.received.some(({ rawBody }) => rawBody.includes(lost.id))).toBe(false);
  });

  test('A-31 a bad signature can be ordered; the event comes again rightly signed only when resent', async () => {
    await harness.control('POST', 'webhooks', { badSignatures: 1 });
    const customer = await harness.stripe.customers.create({ name: 'A' });
    const { rawBody, headers, event } = await harness.webhook('platform', 'customer.created', customer.id);
    expect(() =>
      Stripe.webhooks.constructEvent(rawBody, headers['stripe-signature'] as string, PLATFORM_SECRET),
    ).toThrow();
    await harness.control('POST', 'webhooks/resend', { event: event.id });
    const copies = () => harness.receiver.received.filter((one) => one.event.id === event.id);
    await harness.until(() => copies().length === 2, 'the resent copy');
    const second = copies()[1]!;
    Stripe.webhooks.constructEvent(
      second.rawBody,
      second.headers['stripe-signature'] as string,
      PLATFORM_SECRET,
    );
  });

  test('A-32 platform and connected accounts: two endpoints, two secrets, `account` set on the second only (docs.stripe.com/connect/webhooks)', async () => {
    const account = await harness.onboardedAccount();
    const { event, rawBody, headers } = await harness.webhook('connect', 'account.updated', account.id);
    expect(event.account).toBe(account.id);
    Stripe.webhooks.constructEvent(rawBody, headers['stripe-signature'] as string, CONNECT_SECRET);
    expect(harness.receiver.types('/platform')).not.toContain('account.updated');
    const charge = await harness.paidCharge(5000);
    const own = await harness.webhook('platform', 'charge.succeeded', charge.id);
    expect(own.event.account).toBeUndefined();
    const listed = await harness.stripe.events.list(
      { type: 'account.updated' },
      { stripeAccount: account.id },
    );
    expect(listed.data.length).toBeGreaterThan(0);
    expect((await harness.stripe.events.list({ type: 'account.updated' })).data).toEqual([]);
  });

  test('A-17, A-31 endpoints: the secret only at creation, only wanted types, nothing when disabled (docs.stripe.com/api/webhook_endpoints)', async () => {
    const seen: string[] = [];
    const app = createServer((request, response) => {
      request.on('data', (chunk: Buffer) => seen.push((JSON.parse(String(chunk)) as Stripe.Event).type));
      request.on('end', () => response.end());
    }).listen(0, '127.0.0.1');
    await new Promise((resolve) => app.once('listening', resolve));
    const url = `http://127.0.0.1:${(app.address() as AddressInfo).port}/hook`;
    const endpoint = await harness.stripe.webhookEndpoints.create({
      url,
      enabled_events: ['customer.created'],
    });
    expect(endpoint.secret).toMatch(/^whsec_/);
    expect((await harness.stripe.webhookEndpoints.retrieve(endpoint.id)).secret).toBeUndefined();
    const customer = await harness.stripe.customers.create({ name: 'A' });
    await harness.stripe.customers.update(customer.id, { name: 'B' });
    await harness.until(() => seen.length === 1, 'the wanted event');
    await harness.stripe.webhookEndpoints.update(endpoint.id, { disabled: true });
    await harness.stripe.customers.create({ name: 'C' });
    await harness.webhook('platform', 'customer.updated', customer.id);
    expect(seen).toEqual(['customer.created']);
    await harness.stripe.webhookEndpoints.del(endpoint.id);
    expect(await rejection(harness.stripe.webhookEndpoints.retrieve(endpoint.id))).toMatchObject({
      statusCode: 404,
    });
    app.close();
  });

  test('a webhook that would leave this machine is refused (the stand-in decides)', async () => {
    const error = await rejection(
      harness.stripe.webhookEndpoints.create({ url: 'https://example.test/hook', enabled_events: ['*'] }),
    );
    expect(error).toMatchObject({ statusCode: 400, param: 'url' });
  });

  test('A-16 events are listed for 30 days by type, several types and time (docs.stripe.com/api/events/list)', async () => {
    const customer = await harness.stripe.customers.create({ name: 'A' });
    await harness.stripe.customers.update(customer.id, { name: 'B' });
    const both = await harness.stripe.events.list({
      types: ['customer.created', 'customer.updated'],
      limit: 2,
    });
    expect(both.data.map(({ type }) => type)).toEqual(['customer.updated', 'customer.created']);
    expect(both.data.every(({ data }) => (data.object as Stripe.Customer).id === customer.id)).toBe(true);
    expect(both.data[0]!.request?.id).toMatch(/^req_/);
    await harness.advance({ days: 31 });
    expect((await harness.stripe.events.list({ type: 'customer.created' })).data).toEqual([]);
  });
});
