import type Stripe from 'stripe';
import { Harness, rejection } from './test/harness.ts';

/** Money going back to who paid. */

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
    expect(await harness.standing()).toEqual({ available: 9_680 - 320, pending: 0 });
    expect(await stripe.charges.retrieve(funds.id)).toMatchObject({ refunded: false });
    await harness.expectBooksToAgree();
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
    await harness.startOnMonday();
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
    expect(await harness.movements()).toEqual([]);
  });

  test('A-12 a refund that fails gives the money back and says so', async () => {
    const charge = await harness.paidCharge(10_000, 'pm_card_refundFail');
    await harness.advance({ days: 5 });
    await harness.paidCharge(10_000, 'pm_card_bypassPending');
    const before = await harness.standing();
    const refund = await stripe.refunds.create({ charge: charge.id });
    expect(refund.status).toBe('succeeded');
    expect((await harness.standing()).available).toBe(before.available - 10_000);
    await harness.advance({ hours: 2 });
    const failed = await stripe.refunds.retrieve(refund.id, { expand: ['failure_balance_transaction'] });
    expect(failed).toMatchObject({
      status: 'failed',
      failure_balance_transaction: { type: 'refund_failure', amount: 10_000 },
    });
    expect(await harness.standing()).toEqual(before);
    await harness.webhook('platform', 'refund.failed', refund.id);
    expect(await stripe.charges.retrieve(charge.id)).toMatchObject({ refunded: false, amount_refunded: 0 });
  });
});

describe('disputes', () => {
  test('A-13 takes amount and $15, gives the amount back when the evidence wins', async () => {
    const charge = await harness.paidCharge(100_000, 'pm_card_bypassPending');
    const before = await harness.standing();
    await harness.outcome('dispute_opens', charge.id);
    const [dispute] = (await stripe.disputes.list({ charge: charge.id })).data;
    expect(dispute).toMatchObject({ status: 'needs_response', amount: 100_000, reason: 'fraudulent' });
    expect((await harness.standing()).available).toBe(before.available - 101_500);
    expect(await stripe.charges.retrieve(charge.id)).toMatchObject({ disputed: true });
    await harness.webhook('platform', 'charge.dispute.funds_withdrawn', dispute!.id);
    await stripe.disputes.update(dispute!.id, { evidence: { uncategorized_text: 'winning_evidence' } });
    expect((await stripe.disputes.retrieve(dispute!.id)).status).toBe('under_review');
    await harness.advance({ hours: 2 });
    expect((await stripe.disputes.retrieve(dispute!.id)).status).toBe('won');
    expect((await harness.standing()).available).toBe(before.available - 1_500);
    await harness.webhook('platform', 'charge.dispute.funds_reinstated', dispute!.id);
    await harness.expectBooksToAgree();
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
    const before = await harness.standing();
    await harness.outcome('dispute_won', won);
    expect((await harness.standing()).available).toBe(before.available + 11_500);
    await harness.expectBooksToAgree();
  });

  test('A-13 an inquiry moves no money until it becomes a dispute', async () => {
    const charge = await harness.paidCharge(10_000, 'pm_card_createDisputeInquiry');
    await harness.advance({ seconds: 2 });
    const [inquiry] = (await stripe.disputes.list({ charge: charge.id })).data;
    expect(inquiry).toMatchObject({ status: 'warning_needs_response', balance_transactions: [] });
    expect(await harness.movements()).toHaveLength(1);
    await harness.outcome('inquiry_escalates', inquiry!.id);
    expect(await stripe.disputes.retrieve(inquiry!.id)).toMatchObject({ status: 'needs_response' });
    expect(await harness.movements()).toHaveLength(2);
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
    await harness.expectBooksToAgree();
  });

  test('A-13 what a dispute has taken cannot be refunded as well; after a refund only the rest of a card payment is disputed', async () => {
    const charge = await harness.paidCharge(10_000, 'pm_card_bypassPending');
    await harness.paidCharge(50_000, 'pm_card_bypassPending');
    await stripe.refunds.create({ charge: charge.id, amount: 4_000 });
    await harness.outcome('dispute_opens', charge.id);
    const [dispute] = (await stripe.disputes.list({ charge: charge.id })).data;
    expect(dispute).toMatchObject({ amount: 6_000 });
    expect(await rejection(stripe.refunds.create({ charge: charge.id }))).toMatchObject({
      code: 'charge_disputed',
    });
    await harness.outcome('dispute_won', dispute!.id);
    expect(await stripe.refunds.create({ charge: charge.id })).toMatchObject({ amount: 6_000 });
    await harness.expectBooksToAgree();
  });

  test('A-13 a bank debit that was refunded can still be disputed in full: the payer is credited twice', async () => {
    const charge = await harness.paidCharge(10_000, 'pm_usBankAccount_success');
    await harness.outcome('debit_succeeds', charge.id);
    await harness.paidCharge(50_000, 'pm_card_bypassPending');
    await stripe.refunds.create({ charge: charge.id });
    await harness.outcome('dispute_opens', charge.id);
    expect((await stripe.disputes.list({ charge: charge.id })).data[0]).toMatchObject({
      amount: 10_000,
      status: 'lost',
    });
    await harness.expectBooksToAgree();
  });
});
