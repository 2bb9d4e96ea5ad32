import { onSettle } from './resources/balance.ts';
import { expireSession } from './resources/checkout-payment.ts';
import { onDisputeDecision, onDisputeDue } from './resources/disputes.ts';
import { EVENT_LIFE_SECONDS } from './resources/events.ts';
import { onVerification } from './resources/onboarding.ts';
import { onBankDebitDue } from './resources/payment-attempt.ts';
import { onAuthorizationLapse } from './resources/payment-intents.ts';
import { departPayout, onPayoutArrival, payOutScheduledAccounts } from './resources/payouts.ts';
import { onRefundOutcome, onRefundRetry } from './resources/refunds.ts';
import { settleTopup } from './resources/topups.ts';
import type { Work } from './work.ts';

const DAY_SECONDS = 86_400;

/** What happens by itself, by the name it was planned under. */
export const TIMER_ACTIONS: Record<string, (work: Work, subject: string) => void> = {
  authorization_lapse: onAuthorizationLapse,
  bank_debit: onBankDebitDue,
  daily: onDaily,
  dispute: onDisputeDue,
  dispute_decision: onDisputeDecision,
  payout_arrival: onPayoutArrival,
  payout_departure: departPayout,
  refund_outcome: onRefundOutcome,
  refund_retry: onRefundRetry,
  session_expiry: expireSession,
  settle: onSettle,
  topup_arrival: (work, topupId) => settleTopup(work, topupId, 'succeeds'),
  verification: onVerification,
};

/** Plans the next round of daily work, at midnight UTC of the stand-in's clock. */
export function scheduleDaily(work: Work): void {
  work.schedule('daily', 'all', (Math.floor(work.now() / DAY_SECONDS) + 1) * DAY_SECONDS);
}

function onDaily(work: Work): void {
  scheduleDaily(work);
  payOutScheduledAccounts(work);
  forgetOldRecords(work);
}

/** Answers under old keys and events past their listing time are of no more use. */
function forgetOldRecords(work: Work): void {
  for (const answer of work.list('saved_answer', null)) {
    if (answer.createdAt < work.now() - 2 * DAY_SECONDS) work.remove('saved_answer', answer.id);
  }
  for (const event of work.list('event', null)) {
    if (event.api.created >= work.now() - EVENT_LIFE_SECONDS) continue;
    for (const delivery of work.list('delivery', event.id)) work.remove('delivery', delivery.id);
    work.remove('event', event.id);
  }
}
