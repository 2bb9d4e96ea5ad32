import type Stripe from 'stripe';
import { Harness, rejection } from './test/harness.ts';

/** Money going on to connected accounts and back. */

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

describe('transfers', () => {
  test('A-10 out of an unsettled charge: at once, with its group and its date; Σ of transfers ≤ the charge', async () => {
    await harness.startOnMonday();
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
    expect(await harness.standing()).toEqual({ available: 0, pending: 658_003 });
    expect(await harness.standing(crew)).toEqual({ available: 0, pending: 342_000 });
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
    expect(await harness.standing()).toEqual({ available: -29_897, pending: 0 });
    expect(await harness.standing(crew)).toEqual({ available: 1_029_900, pending: 0 });
    await harness.expectBooksToAgree();
    await harness.expectBooksToAgree(crew);
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
    expect((await harness.standing(crew)).available).toBe(1_000_000);
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
    expect(await harness.standing(crew)).toEqual({ available: 50_000, pending: 0 });
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
    await harness.expectBooksToAgree();
    await harness.expectBooksToAgree(crew);
  });
});
