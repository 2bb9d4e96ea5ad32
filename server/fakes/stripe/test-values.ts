/** Test numbers and tokens of docs.stripe.com/testing and docs.stripe.com/connect/testing. */

export type CardBehaviour =
  | 'authenticate'
  | 'block'
  | 'bypass_pending'
  | 'dispute_fraudulent'
  | 'dispute_inquiry'
  | 'dispute_not_received'
  | 'refund_fails'
  | 'refund_pending'
  | 'success'
  | `decline:${DeclineReason}`;

export type DeclineReason =
  | 'expired_card'
  | 'generic_decline'
  | 'incorrect_cvc'
  | 'insufficient_funds'
  | 'lost_card'
  | 'processing_error'
  | 'stolen_card';

export type BankBehaviour =
  | 'account_closed'
  | 'debit_not_authorized'
  | 'dispute'
  | 'insufficient_funds'
  | 'invalid_currency'
  | 'no_account'
  | 'processing'
  | 'success';

export interface TestCard {
  number: string;
  token: string;
  brand: string;
  behaviour: CardBehaviour;
  /** Words for the hint on the payment page. */
  hint: string;
}

function card(number: string, token: string, behaviour: CardBehaviour, hint: string): TestCard {
  return {
    number,
    token: `pm_card_${token}`,
    brand: number.startsWith('5') ? 'mastercard' : 'visa',
    behaviour,
    hint,
  };
}

export const TEST_CARDS: readonly TestCard[] = [
  card('4242424242424242', 'visa', 'success', 'goes through'),
  card('5555555555554444', 'mastercard', 'success', 'goes through'),
  card('4000000000000077', 'bypassPending', 'bypass_pending', 'goes through, money available at once'),
  card('4000000000000002', 'visa_chargeDeclined', 'decline:generic_decline', 'declined'),
  card(
    '4000000000009995',
    'visa_chargeDeclinedInsufficientFunds',
    'decline:insufficient_funds',
    'declined, not enough money',
  ),
  card('4000000000009987', 'visa_chargeDeclinedLostCard', 'decline:lost_card', 'declined, lost card'),
  card('4000000000009979', 'visa_chargeDeclinedStolenCard', 'decline:stolen_card', 'declined, stolen card'),
  card(
    '4000000000000069',
    'visa_chargeDeclinedExpiredCard',
    'decline:expired_card',
    'declined, expired card',
  ),
  card(
    '4000000000000127',
    'visa_chargeDeclinedIncorrectCvc',
    'decline:incorrect_cvc',
    'declined, wrong security code',
  ),
  card(
    '4000000000000119',
    'visa_chargeDeclinedProcessingError',
    'decline:processing_error',
    'declined, processing error',
  ),
  card('4000002760003184', 'authenticationRequired', 'authenticate', 'asks the card holder to confirm'),
  card('4000000000000259', 'createDispute', 'dispute_fraudulent', 'goes through, then disputed as fraud'),
  card(
    '4000000000002685',
    'createDisputeProductNotReceived',
    'dispute_not_received',
    'goes through, then disputed as not received',
  ),
  card('4000000000001976', 'createDisputeInquiry', 'dispute_inquiry', 'goes through, then an inquiry'),
  card('4000000000007726', 'pendingRefund', 'refund_pending', 'goes through; refunds stay pending first'),
  card('4000000000005126', 'refundFail', 'refund_fails', 'goes through; refunds fail later'),
  card('4100000000000019', 'radarBlock', 'block', 'blocked as too risky'),
];

export const TEST_ROUTING_NUMBER = '110000000';

export interface TestBank {
  accountNumber: string;
  token: string;
  behaviour: BankBehaviour;
  hint: string;
}

function bank(accountNumber: string, token: string, behaviour: BankBehaviour, hint: string): TestBank {
  return { accountNumber, token: `pm_usBankAccount_${token}`, behaviour, hint };
}

export const TEST_BANKS: readonly TestBank[] = [
  bank('000123456789', 'success', 'success', 'goes through'),
  bank('000111111113', 'accountClosed', 'account_closed', 'fails, account closed'),
  bank('000111111116', 'noAccount', 'no_account', 'fails, no such account'),
  bank('000222222227', 'insufficientFunds', 'insufficient_funds', 'fails, not enough money'),
  bank('000333333335', 'debitNotAuthorized', 'debit_not_authorized', 'fails, not authorized'),
  bank('000444444440', 'invalidCurrency', 'invalid_currency', 'fails, wrong currency'),
  bank('000555555559', 'dispute', 'dispute', 'goes through, then disputed'),
  bank('000000000009', 'processing', 'processing', 'stays in processing'),
];

/** Older documents call the declines `pm_card_chargeDeclined…` without the brand. */
export function findCardByToken(token: string): TestCard | undefined {
  const modern = token.replace(/^pm_card_chargeDeclined/, 'pm_card_visa_chargeDeclined');
  return TEST_CARDS.find((entry) => entry.token === modern);
}

export function findCardByNumber(number: string): TestCard | undefined {
  return TEST_CARDS.find((entry) => entry.number === number);
}

export function findBankByToken(token: string): TestBank | undefined {
  return TEST_BANKS.find((entry) => entry.token === token);
}

export function findBankByNumber(accountNumber: string): TestBank | undefined {
  return TEST_BANKS.find((entry) => entry.accountNumber === accountNumber);
}

/** What the card network says for each decline (codes: docs.stripe.com/declines/codes; messages from memory). */
export const DECLINES: Record<DeclineReason, { code: string; message: string }> = {
  expired_card: { code: 'expired_card', message: 'Your card has expired.' },
  generic_decline: { code: 'card_declined', message: 'Your card was declined.' },
  incorrect_cvc: { code: 'incorrect_cvc', message: "Your card's security code is incorrect." },
  insufficient_funds: { code: 'card_declined', message: 'Your card has insufficient funds.' },
  lost_card: { code: 'card_declined', message: 'Your card was declined.' },
  processing_error: {
    code: 'processing_error',
    message: 'An error occurred while processing your card. Try again in a little bit.',
  },
  stolen_card: { code: 'card_declined', message: 'Your card was declined.' },
};

/** What the bank says for each failed debit or payout (codes:
 * docs.stripe.com/payments/ach-direct-debit and /api/payouts/failures; messages from memory). */
export const BANK_FAILURES: Record<Exclude<BankBehaviour, 'dispute' | 'processing' | 'success'>, string> = {
  account_closed: 'The bank account has been closed.',
  debit_not_authorized: 'Debit transactions are not approved on the bank account.',
  insufficient_funds: 'The bank account has insufficient funds to complete the purchase.',
  invalid_currency: 'The bank was unable to process this transaction because of its currency.',
  no_account: 'The bank account could not be located.',
};
