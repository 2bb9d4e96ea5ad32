import type Stripe from 'stripe';
import { Harness, rejection } from './test/harness.ts';

/** Where the money is, after everything that can happen to it. */

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

interface Standing {
  available: number;
  pending: number;
}

async function standing(account?: string): Promise<Standing> {
  const { available, pending } = await stripe.balance.retrieve(
    {},
    account ? { stripeAccount: account } : undefined,
  );
  const sum = (parts: Stripe.Balance.Available[]) => parts.reduce((total, part) => total + part.amount, 0);
  return { available: sum(available), pending: sum(pending) };
}

async function movements(account?: string): Promise<Stripe.BalanceTransaction[]> {
  const options = account ? { stripeAccount: account } : undefined;
  return stripe.balanceTransactions.list({ limit: 100 }, options).autoPagingToArray({ limit: 10_000 });
}

/** the balance is the sum of the movements, side by side. */
async function expectBooksToAgree(account?: string): Promise<void> {
  const all = await movements(account);
  const sum = (status: string) =>
    all.filter((one) => one.status === status).reduce((total, one) => total + one.net, 0);
  expect(await standing(account)).toEqual({ available: sum('available'), pending: sum('pending') });
  expect(all.filter((one) => one.net !== one.amount - one.fee)).toEqual([]);
  expect(
    all.filter((one) => one.fee_details.reduce((total, fee) => total + fee.amount, 0) !== one.fee),
  ).toEqual([]);
}

/** Milliseconds never matter here; the clock starts on a Monday so that business days are known. */
async function startOnMonday(): Promise<void> {
  const { now } = await harness.control<{ now: string }>('GET', 'clock');
  const daysToMonday = (8 - new Date(now).getUTCDay()) % 7;
  await harness.advance({ days: daysToMonday });
}

describe('payments', () => {
  test('A-33 card money: 2.9 % + 30 cents kept, pending for two business days, then available with an event', async () => {
    await startOnMonday();
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
    expect(await standing()).toEqual({ available: 0, pending: 1_000_003 });
    await harness.advance({ days: 1 });
    expect(await standing()).toEqual({ available: 0, pending: 1_000_003 });
    await harness.advance({ days: 1 });
    expect(await standing()).toEqual({ available: 1_000_003, pending: 0 });
    await harness.webhook('platform', 'balance.available');
  });

  test('A-33 a weekend does not count: paid on Friday, available on Tuesday', async () => {
    await startOnMonday();
    await harness.advance({ days: 4 });
    const charge = await harness.paidCharge(10_000, 'pm_card_visa', {
      expand: ['latest_charge.balance_transaction'],
    });
    const { available_on: availableOn } = charge.balance_transaction as Stripe.BalanceTransaction;
    expect(new Date(availableOn * 1000).getUTCDay()).toBe(2);
  });

  test('A-33 4000 0000 0000 0077 is available at once; so is any card with instant settlement', async () => {
    await harness.paidCharge(10_000, 'pm_card_bypassPending');
    expect(await standing()).toEqual({ available: 9_680, pending: 0 });
    await harness.control('POST', 'settings', { cardSettlement: 'instant' });
    await harness.paidCharge(10_000);
    expect((await standing()).available).toBe(19_360);
  });

  test('A-06b a session paid by bank debit: completed unpaid, processing, succeeded after four business days, 0.8 % capped at $5', async () => {
    await startOnMonday();
    const session = await harness.session({
      payment_intent_data: { transfer_group: 'job-7', metadata: { funding: '7' } },
    });
    await harness.control('POST', 'pay', { session: session.id, bankAccountNumber: '000123456789' });
    const completed = await harness.webhook('platform', 'checkout.session.completed', session.id);
    expect(completed.event.data.object).toMatchObject({ status: 'complete', payment_status: 'unpaid' });
    expect(await movements()).toEqual([]);
    await harness.advance({ days: 3 });
    expect(await movements()).toEqual([]);
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
    expect(await movements()).toMatchObject([
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
    expect(await movements()).toEqual([]);
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
    expect(await movements()).toEqual([]);
    const captured = await stripe.paymentIntents.capture(held.id, { amount_to_capture: 6_000 });
    expect(captured).toMatchObject({ status: 'succeeded', amount_received: 6_000 });
    expect(await movements()).toMatchObject([{ amount: 6_000, fee: 204 }]);
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

describe('transfers', () => {
  test('A-10 out of an unsettled charge: at once, with its group and its date; Σ of transfers ≤ the charge', async () => {
    await startOnMonday();
    const { id: crew } = await harness.onboardedAccount();
    const charge = await harness.paidCharge(1_029_900, 'pm_card_visa', { transfer_group: 'job-1' });
    const transfer = await stripe.transfers.create({
      amount: 342_000,
      currency: 'usd',
      destination: crew,
      source_transaction: charge.id,
    });
    expect(transfer).toMatchObject({
      transfer_group: 'job-1',
      source_transaction: charge.id,
      source_type: 'card',
    });
    expect(await standing()).toEqual({ available: 0, pending: 658_003 });
    expect(await standing(crew)).toEqual({ available: 0, pending: 342_000 });
    const payment = await stripe.charges.retrieve(
      transfer.destination_payment as string,
      {},
      { stripeAccount: crew },
    );
    expect(payment).toMatchObject({ amount: 342_000, source_transfer: transfer.id, paid: true });
    const tooMuch = await rejection(
      stripe.transfers.create({
        amount: 687_901,
        currency: 'usd',
        destination: crew,
        source_transaction: charge.id,
      }),
    );
    expect(tooMuch.message).toContain('must not exceed the source amount');
    await stripe.transfers.create({
      amount: 687_900,
      currency: 'usd',
      destination: crew,
      source_transaction: charge.id,
    });
    await harness.advance({ days: 2 });
    // The platform paid the fee of 29,897 out of a charge it handed on whole.
    expect(await standing()).toEqual({ available: -29_897, pending: 0 });
    expect(await standing(crew)).toEqual({ available: 1_029_900, pending: 0 });
    await expectBooksToAgree();
    await expectBooksToAgree(crew);
  });

  test('A-10 a charge without a group gets one from its payment; refunds lower what may be transferred (the stand-in decides the latter)', async () => {
    const { id: crew } = await harness.onboardedAccount();
    const charge = await harness.paidCharge(10_000, 'pm_card_bypassPending');
    await stripe.refunds.create({ charge: charge.id, amount: 4_000 });
    const over = await rejection(
      stripe.transfers.create({
        amount: 6_001,
        currency: 'usd',
        destination: crew,
        source_transaction: charge.id,
      }),
    );
    expect(over).toMatchObject({ statusCode: 400, param: 'source_transaction' });
    const transfer = await stripe.transfers.create({
      amount: 5_000,
      currency: 'usd',
      destination: crew,
      source_transaction: charge.id,
    });
    expect(transfer.transfer_group).toBe(`group_${charge.payment_intent as string}`);
  });

  test('A-10 refusals: no balance, no capability, an unsucceeded charge, another group, an unknown account', async () => {
    const { id: crew } = await harness.onboardedAccount();
    await harness.paidCharge(10_000);
    const create = (extra: Partial<Stripe.TransferCreateParams>) =>
      rejection(stripe.transfers.create({ amount: 100, currency: 'usd', destination: crew, ...extra }));
    // Pending money is not available.
    expect(await create({})).toMatchObject({ statusCode: 400, code: 'balance_insufficient' });
    const bare = await stripe.accounts.create({
      type: 'express',
      capabilities: { transfers: { requested: true } },
    });
    expect(await create({ destination: bare.id })).toMatchObject({
      statusCode: 400,
      code: 'insufficient_capabilities_for_transfer',
    });
    const debit = await harness.paidCharge(10_000, 'pm_usBankAccount_success');
    expect(await create({ source_transaction: debit.id })).toMatchObject({
      statusCode: 400,
      param: 'source_transaction',
    });
    const grouped = await harness.paidCharge(10_000, 'pm_card_bypassPending', { transfer_group: 'job-1' });
    expect(await create({ source_transaction: grouped.id, transfer_group: 'job-2' })).toMatchObject({
      param: 'transfer_group',
    });
    await harness.outcome('account_restricted', crew);
    expect(await create({ source_transaction: grouped.id })).toMatchObject({
      code: 'insufficient_capabilities_for_transfer',
    });
    await harness.control('POST', 'onboard', { account: crew });
    await stripe.transfers.create({
      amount: 100,
      currency: 'usd',
      destination: crew,
      source_transaction: grouped.id,
    });
  });

  test('A-10 once its charge has settled, a transfer needs the money to be there still', async () => {
    const { id: crew } = await harness.onboardedAccount();
    const charge = await harness.paidCharge(100_000, 'pm_card_bypassPending');
    await stripe.payouts.create({ amount: 90_000, currency: 'usd' });
    const error = await rejection(
      stripe.transfers.create({
        amount: 50_000,
        currency: 'usd',
        destination: crew,
        source_transaction: charge.id,
      }),
    );
    expect(error.code).toBe('balance_insufficient');
  });

  test('A-10 fifty parallel transfers against a charge for twenty: exactly twenty', async () => {
    const { id: crew } = await harness.onboardedAccount();
    const charge = await harness.paidCharge(1_000_000, 'pm_card_bypassPending');
    await harness.paidCharge(1_000_000, 'pm_card_bypassPending');
    const tries = await Promise.allSettled(
      Array.from({ length: 50 }, () =>
        stripe.transfers.create({
          amount: 50_000,
          currency: 'usd',
          destination: crew,
          source_transaction: charge.id,
        }),
      ),
    );
    expect(tries.filter(({ status }) => status === 'fulfilled')).toHaveLength(20);
    expect((await standing(crew)).available).toBe(1_000_000);
  });

  test('A-11 reversals: in parts, never above the transfer, only out of what the account has available', async () => {
    const { id: crew } = await harness.onboardedAccount();
    const charge = await harness.paidCharge(100_000, 'pm_card_bypassPending');
    const transfer = await stripe.transfers.create({
      amount: 80_000,
      currency: 'usd',
      destination: crew,
      source_transaction: charge.id,
    });
    await stripe.transfers.createReversal(transfer.id, { amount: 30_000 });
    expect(await standing(crew)).toEqual({ available: 50_000, pending: 0 });
    expect(await stripe.transfers.retrieve(transfer.id)).toMatchObject({
      amount_reversed: 30_000,
      reversed: false,
    });
    expect(await rejection(stripe.transfers.createReversal(transfer.id, { amount: 50_001 }))).toMatchObject({
      param: 'amount',
    });
    await stripe.payouts.create({ amount: 40_000, currency: 'usd' }, { stripeAccount: crew });
    expect((await rejection(stripe.transfers.createReversal(transfer.id))).code).toBe('balance_insufficient');
    await stripe.transfers.createReversal(transfer.id, { amount: 10_000 });
    // What came back may go out again.
    await stripe.transfers.create({
      amount: 40_000,
      currency: 'usd',
      destination: crew,
      source_transaction: charge.id,
    });
    await harness.webhook('platform', 'transfer.reversed', transfer.id);
    await expectBooksToAgree();
    await expectBooksToAgree(crew);
  });
});

describe('refunds', () => {
  test('A-12 in parts, never above what is left; the fee is not returned', async () => {
    const charge = await harness.paidCharge(10_000, 'pm_card_bypassPending');
    const funds = await harness.paidCharge(10_000, 'pm_card_bypassPending');
    await stripe.refunds.create({ charge: charge.id, amount: 4_000 });
    expect(await rejection(stripe.refunds.create({ charge: charge.id, amount: 6_001 }))).toMatchObject({
      param: 'amount',
    });
    const rest = await stripe.refunds.create({ payment_intent: charge.payment_intent as string });
    expect(rest).toMatchObject({ amount: 6_000, status: 'succeeded' });
    expect(await stripe.charges.retrieve(charge.id)).toMatchObject({
      refunded: true,
      amount_refunded: 10_000,
    });
    expect((await rejection(stripe.refunds.create({ charge: charge.id }))).code).toBe(
      'charge_already_refunded',
    );
    expect(await standing()).toEqual({ available: 9_680 - 320, pending: 0 });
    expect(await stripe.charges.retrieve(funds.id)).toMatchObject({ refunded: false });
    await expectBooksToAgree();
  });

  test('A-12 without money the refund waits and goes out when there is some', async () => {
    const charge = await harness.paidCharge(10_000, 'pm_card_bypassPending');
    await stripe.payouts.create({ amount: 9_000, currency: 'usd' });
    const refund = await stripe.refunds.create({ charge: charge.id });
    expect(refund).toMatchObject({
      status: 'pending',
      pending_reason: 'insufficient_funds',
      balance_transaction: null,
    });
    await harness.paidCharge(20_000, 'pm_card_bypassPending');
    await harness.advance({ hours: 2 });
    expect(await stripe.refunds.retrieve(refund.id)).toMatchObject({ status: 'succeeded' });
    await harness.webhook('platform', 'refund.updated', refund.id);
  });

  test('A-12 a bank debit: pending with the money gone at once, succeeded after three business days; partial ones by setting', async () => {
    await startOnMonday();
    const charge = await harness.paidCharge(10_000, 'pm_usBankAccount_success');
    await harness.paidCharge(10_000, 'pm_card_bypassPending');
    await harness.outcome('debit_succeeds', charge.id);
    await harness.control('POST', 'settings', { partialBankRefunds: 'refuse' });
    expect(await rejection(stripe.refunds.create({ charge: charge.id, amount: 5_000 }))).toMatchObject({
      param: 'amount',
    });
    await harness.control('POST', 'settings', { partialBankRefunds: 'allow' });
    const refund = await stripe.refunds.create({ charge: charge.id, amount: 5_000 });
    expect(refund).toMatchObject({ status: 'pending', pending_reason: 'processing' });
    expect(refund.id).toMatch(/^pyr_/);
    expect((await rejection(stripe.refunds.cancel(refund.id))).statusCode).toBe(400);
    await harness.advance({ days: 3 });
    expect((await stripe.refunds.retrieve(refund.id)).status).toBe('succeeded');
  });

  test('A-12 before a debit has come it waits for the charge; a failed debit fails it', async () => {
    const charge = await harness.paidCharge(10_000, 'pm_usBankAccount_insufficientFunds');
    const refund = await stripe.refunds.create({ charge: charge.id });
    expect(refund).toMatchObject({ status: 'pending', pending_reason: 'charge_pending' });
    await harness.advance({ days: 7 });
    expect((await stripe.refunds.retrieve(refund.id)).status).toBe('failed');
    expect(await movements()).toEqual([]);
  });

  test('A-12 a refund that fails gives the money back and says so', async () => {
    const charge = await harness.paidCharge(10_000, 'pm_card_refundFail');
    await harness.advance({ days: 5 });
    await harness.paidCharge(10_000, 'pm_card_bypassPending');
    const before = await standing();
    const refund = await stripe.refunds.create({ charge: charge.id });
    expect(refund.status).toBe('succeeded');
    expect((await standing()).available).toBe(before.available - 10_000);
    await harness.advance({ hours: 2 });
    const failed = await stripe.refunds.retrieve(refund.id, { expand: ['failure_balance_transaction'] });
    expect(failed).toMatchObject({
      status: 'failed',
      failure_balance_transaction: { type: 'refund_failure', amount: 10_000 },
    });
    expect(await standing()).toEqual(before);
    await harness.webhook('platform', 'refund.failed', refund.id);
    expect(await stripe.charges.retrieve(charge.id)).toMatchObject({ refunded: false, amount_refunded: 0 });
  });
});

describe('disputes', () => {
  test('A-13 takes amount and $15, gives the amount back when the evidence wins', async () => {
    const charge = await harness.paidCharge(100_000, 'pm_card_bypassPending');
    const before = await standing();
    await harness.outcome('dispute_opens', charge.id);
    const [dispute] = (await stripe.disputes.list({ charge: charge.id })).data;
    expect(dispute).toMatchObject({ status: 'needs_response', amount: 100_000, reason: 'fraudulent' });
    expect((await standing()).available).toBe(before.available - 101_500);
    expect(await stripe.charges.retrieve(charge.id)).toMatchObject({ disputed: true });
    await harness.webhook('platform', 'charge.dispute.funds_withdrawn', dispute!.id);
    await stripe.disputes.update(dispute!.id, { evidence: { uncategorized_text: 'winning_evidence' } });
    expect((await stripe.disputes.retrieve(dispute!.id)).status).toBe('under_review');
    await harness.advance({ hours: 2 });
    expect((await stripe.disputes.retrieve(dispute!.id)).status).toBe('won');
    expect((await standing()).available).toBe(before.available - 1_500);
    await harness.webhook('platform', 'charge.dispute.funds_reinstated', dispute!.id);
    await expectBooksToAgree();
  });

  test('A-13 lost by evidence, by accepting, by a press; the fee comes back by setting', async () => {
    const open = async () => {
      const charge = await harness.paidCharge(10_000, 'pm_card_bypassPending');
      await harness.outcome('dispute_opens', charge.id);
      return (await stripe.disputes.list({ charge: charge.id })).data[0]!.id;
    };
    const [byEvidence, accepted, pressed, won] = [await open(), await open(), await open(), await open()];
    await stripe.disputes.update(byEvidence, { evidence: { uncategorized_text: 'losing_evidence' } });
    await harness.advance({ hours: 2 });
    await stripe.disputes.close(accepted);
    await harness.outcome('dispute_lost', pressed);
    for (const id of [byEvidence, accepted, pressed])
      expect((await stripe.disputes.retrieve(id)).status).toBe('lost');
    await harness.control('POST', 'settings', { isDisputeFeeReturned: true });
    const before = await standing();
    await harness.outcome('dispute_won', won);
    expect((await standing()).available).toBe(before.available + 11_500);
    await expectBooksToAgree();
  });

  test('A-13 an inquiry moves no money until it becomes a dispute', async () => {
    const charge = await harness.paidCharge(10_000, 'pm_card_createDisputeInquiry');
    await harness.advance({ seconds: 2 });
    const [inquiry] = (await stripe.disputes.list({ charge: charge.id })).data;
    expect(inquiry).toMatchObject({ status: 'warning_needs_response', balance_transactions: [] });
    expect(await movements()).toHaveLength(1);
    await harness.outcome('inquiry_escalates', inquiry!.id);
    expect(await stripe.disputes.retrieve(inquiry!.id)).toMatchObject({ status: 'needs_response' });
    expect(await movements()).toHaveLength(2);
    const other = await harness.paidCharge(10_000);
    await harness.outcome('inquiry_opens', other.id);
    const [closed] = (await stripe.disputes.list({ charge: other.id })).data;
    await harness.outcome('dispute_won', closed!.id);
    expect((await stripe.disputes.retrieve(closed!.id)).status).toBe('warning_closed');
  });

  test('A-13 a bank debit knows no appeal: its dispute is lost as it comes', async () => {
    const charge = await harness.paidCharge(10_000, 'pm_usBankAccount_dispute');
    await harness.advance({ days: 7 });
    const [dispute] = (await stripe.disputes.list({ charge: charge.id })).data;
    expect(dispute).toMatchObject({ status: 'lost', reason: 'debit_not_authorized' });
    await harness.webhook('platform', 'charge.dispute.closed', dispute!.id);
    await expectBooksToAgree();
  });
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
    await startOnMonday();
    const crew = await paidCrew();
    const on = { stripeAccount: crew };
    const payout = await stripe.payouts.create({ amount: 50_000, currency: 'usd' }, on);
    expect(payout).toMatchObject({ status: 'pending', automatic: false });
    expect(await standing(crew)).toEqual({ available: 30_000, pending: 0 });
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
    await expectBooksToAgree(crew);
  });

  test('A-14 a daily schedule pays out by itself and names the movements it covers', async () => {
    const crew = await paidCrew({ manualPayouts: false });
    const on = { stripeAccount: crew };
    await harness.advance({ days: 1 });
    const [payout] = (await stripe.payouts.list({}, on)).data;
    expect(payout).toMatchObject({ amount: 80_000, automatic: true });
    const covered = await stripe.balanceTransactions.list({ payout: payout!.id }, on);
    expect(covered.data.map(({ type }) => type).sort()).toEqual(['payment', 'payout']);
    expect(await standing(crew)).toEqual({ available: 0, pending: 0 });
  });

  test('A-14 a bounced payout brings the money back, marks the bank account and stops the schedule until a new one comes', async () => {
    const crew = await paidCrew({ bankAccountNumber: '000111111116', manualPayouts: false });
    const on = { stripeAccount: crew };
    await harness.advance({ days: 6 });
    const [payout, ...others] = (await stripe.payouts.list({}, on)).data;
    expect(others).toEqual([]);
    expect(payout).toMatchObject({ status: 'failed', failure_code: 'no_account' });
    expect(await standing(crew)).toEqual({ available: 80_000, pending: 0 });
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
    await expectBooksToAgree(crew);
  });

  test('A-14 a payout may fail after it was paid; cancel and reverse give the money back', async () => {
    const crew = await paidCrew();
    const on = { stripeAccount: crew };
    const canceled = await stripe.payouts.create({ amount: 10_000, currency: 'usd' }, on);
    await stripe.payouts.cancel(canceled.id, {}, on);
    expect((await standing(crew)).available).toBe(80_000);
    const paid = await stripe.payouts.create({ amount: 10_000, currency: 'usd' }, on);
    await harness.outcome('payout_paid', paid.id);
    const back = await stripe.payouts.reverse(paid.id, {}, on);
    expect(back).toMatchObject({ amount: -10_000, original_payout: paid.id });
    await harness.advance({ days: 6 });
    expect((await standing(crew)).available).toBe(80_000);
    const late = await stripe.payouts.create({ amount: 10_000, currency: 'usd' }, on);
    await harness.outcome('payout_paid', late.id);
    await harness.outcome('payout_failed', late.id, 'account_closed');
    expect(await stripe.payouts.retrieve(late.id, {}, on)).toMatchObject({
      status: 'failed',
      failure_code: 'account_closed',
    });
    expect((await standing(crew)).available).toBe(80_000);
    await expectBooksToAgree(crew);
  });

  test('A-15 a top-up arrives after a business day and funds the platform', async () => {
    await startOnMonday();
    const topup = await stripe.topups.create({
      amount: 25_000,
      currency: 'usd',
      statement_descriptor: 'Float',
    });
    expect(topup.status).toBe('pending');
    expect(await standing()).toEqual({ available: 0, pending: 0 });
    await harness.advance({ days: 1 });
    expect((await stripe.topups.retrieve(topup.id)).status).toBe('succeeded');
    expect(await standing()).toEqual({ available: 25_000, pending: 0 });
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
