import { z } from 'zod';
import { invalidRequest } from '../errors.ts';
import { PLATFORM } from '../records.ts';
import { paySession } from '../resources/checkout-sessions.ts';
import { onVerification, submitOnboarding } from '../resources/onboarding.ts';
import { createBankMethod, createCardMethod } from '../resources/payment-methods.ts';
import type { StandIn } from '../stand-in.ts';
import { findBankByNumber, findCardByNumber } from '../test-values.ts';

export const payParams = z.strictObject({
  session: z.string(),
  cardNumber: z.string().optional(),
  /** Pays by bank debit instead. */
  bankAccountNumber: z.string().optional(),
  name: z.string().default('Test Payer'),
});

/** Pays a Checkout Session as its page would: for seeds and tests without a browser. */
export function payWithoutBrowser(standIn: StandIn, input: z.output<typeof payParams>): object {
  return standIn.transact((work) => {
    const session = work.require('checkout_session', input.session, PLATFORM, { noun: 'checkout.session' });
    if (session.api.status !== 'open') throw invalidRequest(`The session is ${String(session.api.status)}.`);
    const owner = { owner: PLATFORM, name: input.name };
    const expYear = new Date(work.now() * 1000).getUTCFullYear() + 2;
    const bank =
      input.bankAccountNumber === undefined ? undefined : findBankByNumber(input.bankAccountNumber);
    const card = findCardByNumber(input.cardNumber ?? '4242424242424242');
    if (input.bankAccountNumber !== undefined && !bank) throw invalidRequest('This is no test bank account.');
    if (!card) throw invalidRequest('This is no test card.');
    const method = bank
      ? createBankMethod(work, { ...owner, bank })
      : createCardMethod(work, { ...owner, card, expMonth: 12, expYear });
    paySession(work, session.id, method);
    return work.edit('checkout_session', session.id).api;
  });
}

export const onboardParams = z.strictObject({
  account: z.string(),
  businessName: z.string().default('Test Business'),
  bankAccountNumber: z.string().default('000123456789'),
  isIncomplete: z.boolean().default(false),
  /** Skips the wait for verification. */
  isVerifiedAtOnce: z.boolean().default(true),
});

/** Hands in onboarding details as the hosted page would. */
export function onboardWithoutBrowser(standIn: StandIn, input: z.output<typeof onboardParams>): object {
  return standIn.transact((work) => {
    const bank = findBankByNumber(input.bankAccountNumber);
    if (!bank) throw invalidRequest('This is no test bank account.');
    submitOnboarding(work, input.account, {
      businessName: input.businessName,
      ...(!input.isIncomplete && { bank }),
    });
    if (!input.isIncomplete && input.isVerifiedAtOnce) {
      work.unschedule('verification', input.account);
      onVerification(work, input.account);
    }
    return work.edit('account', input.account).api;
  });
}
