import type Stripe from 'stripe';
import { Harness, rejection } from './test/harness.ts';

/** Money coming in: cards, bank debits and Checkout Sessions. */

const harness = new Harness();
let stripe: Stripe;
beforeAll(async () => {
  await harness.start();
  stripe = harness.stripe;
});
afterAll(() => harness.stop());
beforeEach(async () => {
  await harness.control('POST', 'reset');
});

describe('payments', () => {
  test('A-33 card money: 2.9 % + 30 cents kept, pending for two business days, then available with an event', async () => {
    await harness.startOnMonday();
    const charge = await harness.paidCharge(1_029_900, 'pm_card_visa', {
      expand: ['latest_charge.balance_transaction'],
    });
    const movement = charge.balance_transaction as Stripe.BalanceTransaction;
    // 1,029,900 × 0.029 = 29,867.1 → 29,867, and 30.
    expect(movement).toMatchObject({
      amount: 1_029_900,
      fee: 29_897,
      net: 1_000_003,
      status: 'pending',
      type: 'charge',
    });
    expect(new Date(movement.available_on * 1000).getUTCDay()).toBe(3);
    expect(await harness.standing()).toEqual({ available: 0, pending: 1_000_003 });
    await harness.advance({ days: 1 });
    expect(await harness.standing()).toEqual({ available: 0, pending: 1_000_003 });
    await harness.advance({ days: 1 });
    expect(await harness.standing()).toEqual({ available: 1_000_003, pending: 0 });
    await harness.webhook('platform', 'balance.available');
  });

  test('A-33 a weekend does not count: paid on Friday, available on Tuesday', async () => {
    await harness.startOnMonday();
    await harness.advance({ days: 4 });
    const charge = await harness.paidCharge(10_000, 'pm_card_visa', {
      expand: ['latest_charge.balance_transaction'],
    });
    const { available_on: availableOn } = charge.balance_transaction as Stripe.BalanceTransaction;
    expect(new Date(availableOn * 1000).getUTCDay()).toBe(2);
  });

  test('A-33 4000 0000 0000 0077 is available at once; so is any card with instant settlement', async () => {
    await harness.paidCharge(10_000, 'pm_card_bypassPending');
    expect(await harness.standing()).toEqual({ available: 9_680, pending: 0 });
    await harness.control('POST', 'settings', { cardSettlement: 'instant' });
    await harness.paidCharge(10_000);
    expect((await harness.standing()).available).toBe(19_360);
  });

  test('A-06b a session paid by bank debit: completed unpaid, processing, succeeded after four business days, 0.8 % capped at $5', async () => {
    await harness.startOnMonday();
    const session = await harness.session({
      payment_intent_data: { transfer_group: 'job-7', metadata: { funding: '7' } },
    });
    await harness.control('POST', 'pay', { session: session.id, bankAccountNumber: '000123456789' });
    const completed = await harness.webhook('platform', 'checkout.session.completed', session.id);
    expect(completed.event.data.object).toMatchObject({ status: 'complete', payment_status: 'unpaid' });
    expect(await harness.movements()).toEqual([]);
    await harness.advance({ days: 3 });
    expect(await harness.movements()).toEqual([]);
    await harness.advance({ days: 1 });
    const succeeded = await harness.webhook(
      'platform',
      'checkout.session.async_payment_succeeded',
      session.id,
    );
    expect(succeeded.event.data.object).toMatchObject({ payment_status: 'paid' });
    const { payment_intent: intent } = await stripe.checkout.sessions.retrieve(session.id, {
      expand: ['payment_intent.latest_charge'],
    });
    expect(intent).toMatchObject({
      status: 'succeeded',
      transfer_group: 'job-7',
      metadata: { funding: '7' },
    });
    expect((intent as Stripe.PaymentIntent).latest_charge).toMatchObject({
      transfer_group: 'job-7',
      metadata: { funding: '7' },
    });
    expect(await harness.movements()).toMatchObject([
      { type: 'payment', amount: 1_029_900, fee: 500, status: 'available' },
    ]);
  });

  test('A-06b a bank debit that fails: no money, session told, payment open for another method', async () => {
    const session = await harness.session();
    await harness.control('POST', 'pay', { session: session.id, bankAccountNumber: '000222222227' });
    await harness.advance({ days: 7 });
    const failed = await harness.webhook('platform', 'checkout.session.async_payment_failed', session.id);
    expect(failed.event.data.object).toMatchObject({ status: 'complete', payment_status: 'unpaid' });
    const { payment_intent: intent } = await stripe.checkout.sessions.retrieve(session.id, {
      expand: ['payment_intent.latest_charge'],
    });
    expect(intent).toMatchObject({
      status: 'requires_payment_method',
      last_payment_error: { code: 'insufficient_funds' },
    });
    expect((intent as Stripe.PaymentIntent).latest_charge).toMatchObject({
      status: 'failed',
      balance_transaction: null,
    });
    expect(await harness.movements()).toEqual([]);
  });

  test('A-33 the test-mode switch settles bank debits at once; 000000000009 stays in processing until pressed', async () => {
    await harness.control('POST', 'settings', { bankDebits: 'instant' });
    const quick = await harness.paidCharge(10_000, 'pm_usBankAccount_success');
    await harness.webhook('platform', 'charge.succeeded', quick.id);
    const stuck = await harness.paidCharge(10_000, 'pm_usBankAccount_processing');
    await harness.advance({ days: 30 });
    expect((await stripe.charges.retrieve(stuck.id)).status).toBe('pending');
    await harness.outcome('debit_fails', stuck.id, 'account_closed');
    expect(await stripe.charges.retrieve(stuck.id)).toMatchObject({
      status: 'failed',
      failure_code: 'account_closed',
    });
  });

  test('A-06b sessions expire by themselves and by call; a paid or expired one refuses', async () => {
    const session = await harness.session();
    expect(session.expires_at - session.created).toBe(86_400);
    await harness.advance({ hours: 24 });
    await harness.webhook('platform', 'checkout.session.expired', session.id);
    expect(await stripe.checkout.sessions.retrieve(session.id)).toMatchObject({
      status: 'expired',
      url: null,
    });
    expect((await rejection(stripe.checkout.sessions.expire(session.id))).message).toContain(
      'Only Checkout Sessions with a status in ["open"]',
    );
    const { now } = await harness.control<{ now: string }>('GET', 'clock');
    const seconds = Math.floor(new Date(now).getTime() / 1000);
    expect(await rejection(harness.session({ expires_at: seconds + 600 }))).toMatchObject({
      param: 'expires_at',
    });
    expect((await harness.session({ expires_at: seconds + 3600 })).expires_at).toBe(seconds + 3600);
  });

  test('A-06 authorize, capture a part, cancel, and what a status forbids', async () => {
    const held = await stripe.paymentIntents.create({
      amount: 10_000,
      currency: 'usd',
      capture_method: 'manual',
      payment_method: 'pm_card_visa',
      confirm: true,
    });
    expect(held).toMatchObject({ status: 'requires_capture', amount_capturable: 10_000 });
    expect(await harness.movements()).toEqual([]);
    const captured = await stripe.paymentIntents.capture(held.id, { amount_to_capture: 6_000 });
    expect(captured).toMatchObject({ status: 'succeeded', amount_received: 6_000 });
    expect(await harness.movements()).toMatchObject([{ amount: 6_000, fee: 204 }]);
    const twice = await rejection(stripe.paymentIntents.capture(held.id));
    expect(twice).toMatchObject({ statusCode: 400, code: 'payment_intent_unexpected_state' });
    expect((await rejection(stripe.paymentIntents.cancel(held.id))).code).toBe(
      'payment_intent_unexpected_state',
    );
    const forgotten = await stripe.paymentIntents.create({
      amount: 10_000,
      currency: 'usd',
      capture_method: 'manual',
      payment_method: 'pm_card_visa',
      confirm: true,
    });
    await harness.advance({ days: 8 });
    expect(await stripe.paymentIntents.retrieve(forgotten.id)).toMatchObject({
      status: 'canceled',
      amount_capturable: 0,
    });
  });

  test('A-06 a card that asks its holder: refused off session, confirmed or refused on the page', async () => {
    const off = await rejection(
      harness.paidCharge(5_000, 'pm_card_authenticationRequired', { off_session: true }),
    );
    expect(off).toMatchObject({ statusCode: 402, code: 'authentication_required' });
    const intent = await stripe.paymentIntents.create({
      amount: 5_000,
      currency: 'usd',
      payment_method: 'pm_card_authenticationRequired',
      confirm: true,
      return_url: 'http://127.0.0.1:4000/back',
    });
    expect(intent.status).toBe('requires_action');
    const page = intent.next_action!.redirect_to_url!.url!;
    const refused = await harness.submit(page, { answer: 'no' });
    expect(refused.location).toBe('http://127.0.0.1:4000/back');
    expect((await stripe.paymentIntents.retrieve(intent.id)).last_payment_error?.code).toBe(
      'payment_intent_authentication_failure',
    );
    await stripe.paymentIntents.confirm(intent.id, { payment_method: 'pm_card_authenticationRequired' });
    await harness.submit(page, { answer: 'yes' });
    expect((await stripe.paymentIntents.retrieve(intent.id)).status).toBe('succeeded');
  });
});
