import type Stripe from 'stripe';
import { Harness, rejection } from './test/harness.ts';

/** Money leaving, float coming in, and the accounts it goes to. */

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

describe('payouts and top-ups', () => {
  async function paidCrew(
    options: { bankAccountNumber?: string; manualPayouts?: boolean } = {},
  ): Promise<string> {
    const { id: crew } = await harness.onboardedAccount(options);
    const charge = await harness.paidCharge(100_000, 'pm_card_bypassPending');
    await stripe.transfers.create({
      amount: 80_000,
      currency: 'usd',
      destination: crew,
      source_transaction: charge.id,
    });
    return crew;
  }

  test('A-14 pending, in transit, paid; connect endpoint told each time', async () => {
    await harness.startOnMonday();
    const crew = await paidCrew();
    const on = { stripeAccount: crew };
    const payout = await stripe.payouts.create({ amount: 50_000, currency: 'usd' }, on);
    expect(payout).toMatchObject({ status: 'pending', automatic: false });
    expect(await harness.standing(crew)).toEqual({ available: 30_000, pending: 0 });
    await harness.advance({ days: 1 });
    expect((await stripe.payouts.retrieve(payout.id, {}, on)).status).toBe('in_transit');
    expect((await rejection(stripe.payouts.cancel(payout.id, {}, on))).statusCode).toBe(400);
    await harness.advance({ days: 1 });
    expect((await stripe.payouts.retrieve(payout.id, {}, on)).status).toBe('paid');
    const { event } = await harness.webhook('connect', 'payout.paid', payout.id);
    expect(event.account).toBe(crew);
    expect((await rejection(stripe.payouts.create({ amount: 30_001, currency: 'usd' }, on))).code).toBe(
      'balance_insufficient',
    );
    await harness.expectBooksToAgree(crew);
  });

  test('A-14 a daily schedule pays out by itself and names the movements it covers', async () => {
    const crew = await paidCrew({ manualPayouts: false });
    const on = { stripeAccount: crew };
    await harness.advance({ days: 1 });
    const [payout] = (await stripe.payouts.list({}, on)).data;
    expect(payout).toMatchObject({ amount: 80_000, automatic: true });
    const covered = await stripe.balanceTransactions.list({ payout: payout!.id }, on);
    expect(covered.data.map(({ type }) => type).sort()).toEqual(['payment', 'payout']);
    expect(await harness.standing(crew)).toEqual({ available: 0, pending: 0 });
  });

  test('A-14 a bounced payout brings the money back, marks the bank account and stops the schedule until a new one comes', async () => {
    const crew = await paidCrew({ bankAccountNumber: '000111111116', manualPayouts: false });
    const on = { stripeAccount: crew };
    await harness.advance({ days: 6 });
    const [payout, ...others] = (await stripe.payouts.list({}, on)).data;
    expect(others).toEqual([]);
    expect(payout).toMatchObject({ status: 'failed', failure_code: 'no_account' });
    expect(await harness.standing(crew)).toEqual({ available: 80_000, pending: 0 });
    const account = await stripe.accounts.retrieve(crew);
    expect(account).toMatchObject({
      payouts_enabled: false,
      external_accounts: { data: [{ status: 'errored' }] },
    });
    expect(account.requirements?.currently_due).toContain('external_account');
    await harness.webhook('connect', 'account.external_account.updated');
    await harness.control('POST', 'onboard', { account: crew });
    await harness.advance({ days: 6 });
    expect((await stripe.payouts.list({}, on)).data[0]).toMatchObject({ status: 'paid', amount: 80_000 });
    await harness.expectBooksToAgree(crew);
  });

  test('A-14 a payout may fail after it was paid; cancel and reverse give the money back', async () => {
    const crew = await paidCrew();
    const on = { stripeAccount: crew };
    const canceled = await stripe.payouts.create({ amount: 10_000, currency: 'usd' }, on);
    await stripe.payouts.cancel(canceled.id, {}, on);
    expect((await harness.standing(crew)).available).toBe(80_000);
    const paid = await stripe.payouts.create({ amount: 10_000, currency: 'usd' }, on);
    await harness.outcome('payout_paid', paid.id);
    const back = await stripe.payouts.reverse(paid.id, {}, on);
    expect(back).toMatchObject({ amount: -10_000, original_payout: paid.id });
    await harness.advance({ days: 6 });
    expect((await harness.standing(crew)).available).toBe(80_000);
    const late = await stripe.payouts.create({ amount: 10_000, currency: 'usd' }, on);
    await harness.outcome('payout_paid', late.id);
    await harness.outcome('payout_failed', late.id, 'account_closed');
    expect(await stripe.payouts.retrieve(late.id, {}, on)).toMatchObject({
      status: 'failed',
      failure_code: 'account_closed',
    });
    expect((await harness.standing(crew)).available).toBe(80_000);
    await harness.expectBooksToAgree(crew);
  });

  test('A-14 an account with requirements due pays nothing out', async () => {
    const crew = await paidCrew();
    await harness.outcome('account_restricted', crew);
    const error = await rejection(
      stripe.payouts.create({ amount: 100, currency: 'usd' }, { stripeAccount: crew }),
    );
    expect(error.code).toBe('payouts_not_allowed');
  });

  test('A-15 a top-up arrives after a business day and funds the platform', async () => {
    await harness.startOnMonday();
    const topup = await stripe.topups.create({
      amount: 25_000,
      currency: 'usd',
      statement_descriptor: 'Float',
    });
    expect(topup.status).toBe('pending');
    expect(await harness.standing()).toEqual({ available: 0, pending: 0 });
    await harness.advance({ days: 1 });
    expect((await stripe.topups.retrieve(topup.id)).status).toBe('succeeded');
    expect(await harness.standing()).toEqual({ available: 25_000, pending: 0 });
    await harness.webhook('platform', 'topup.succeeded', topup.id);
  });
});

describe('accounts', () => {
  test('A-01 capabilities go inactive → pending → active; requirements say what is missing', async () => {
    await harness.control('POST', 'settings', { verificationSeconds: 60 });
    const account = await stripe.accounts.create({
      type: 'express',
      capabilities: { transfers: { requested: true } },
    });
    expect(account).toMatchObject({
      capabilities: { transfers: 'inactive' },
      payouts_enabled: false,
      details_submitted: false,
    });
    expect(account.requirements?.currently_due).toContain('external_account');
    await harness.control('POST', 'onboard', { account: account.id, isIncomplete: true });
    const half = await stripe.accounts.retrieve(account.id);
    expect(half).toMatchObject({ details_submitted: false, capabilities: { transfers: 'inactive' } });
    await harness.control('POST', 'onboard', { account: account.id, isVerifiedAtOnce: false });
    const waiting = await stripe.accounts.retrieve(account.id);
    expect(waiting).toMatchObject({
      details_submitted: true,
      payouts_enabled: false,
      capabilities: { transfers: 'pending' },
    });
    expect(waiting.requirements).toMatchObject({
      currently_due: [],
      disabled_reason: 'requirements.pending_verification',
    });
    await harness.advance({ seconds: 61 });
    const ready = await stripe.accounts.retrieve(account.id);
    expect(ready).toMatchObject({ payouts_enabled: true, capabilities: { transfers: 'active' } });
    expect(ready.requirements).toMatchObject({
      currently_due: [],
      pending_verification: [],
      disabled_reason: null,
    });
    const states = harness.receiver.received
      .filter(({ event }) => event.type === 'capability.updated' && event.account === account.id)
      .map(({ event }) => (event.data.object as Stripe.Capability).status);
    await harness.webhook('connect', 'account.external_account.created');
    expect(states.slice(0, 2)).toEqual(['inactive', 'pending']);
  });

  test('A-01 an account with a balance cannot be deleted; the empty one can', async () => {
    const { id: crew } = await harness.onboardedAccount();
    const charge = await harness.paidCharge(10_000, 'pm_card_bypassPending');
    const transfer = await stripe.transfers.create({
      amount: 5_000,
      currency: 'usd',
      destination: crew,
      source_transaction: charge.id,
    });
    expect((await rejection(stripe.accounts.del(crew))).statusCode).toBe(400);
    await stripe.transfers.createReversal(transfer.id);
    expect(await stripe.accounts.del(crew)).toMatchObject({ deleted: true });
    expect(await rejection(stripe.accounts.retrieve(crew))).toMatchObject({
      statusCode: 403,
      code: 'account_invalid',
    });
  });

  test('A-04 customers: metadata merges, an empty text deletes a key', async () => {
    const customer = await stripe.customers.create({ name: 'A', metadata: { keep: '1', drop: '2' } });
    const changed = await stripe.customers.update(customer.id, { metadata: { drop: '', add: '3' } });
    expect(changed.metadata).toEqual({ keep: '1', add: '3' });
    await stripe.customers.del(customer.id);
    expect((await rejection(stripe.customers.retrieve(customer.id))).statusCode).toBe(404);
  });
});
