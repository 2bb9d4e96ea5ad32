import { invalidRequest } from '../errors.ts';
import type { Kind } from '../records.ts';
import { decideDispute, escalateInquiry, openDispute } from '../resources/disputes.ts';
import { onVerification, restrictAccount } from '../resources/onboarding.ts';
import { settleBankDebit } from '../resources/payment-attempt.ts';
import { departPayout, settlePayout } from '../resources/payouts.ts';
import { settleRefund } from '../resources/refunds.ts';
import { settleTopup } from '../resources/topups.ts';
import { BANK_FAILURES } from '../test-values.ts';
import type { BankBehaviour } from '../test-values.ts';
import type { Work } from '../work.ts';

export interface Outcome {
  /** Words on the button. */
  label: string;
  run(work: Work, id: string, reason?: string): void;
}

function on(kind: Kind, label: string, act: (work: Work, id: string, reason?: string) => void): Outcome {
  return {
    label,
    run(work, id, reason) {
      if (!work.get(kind, id)) throw invalidRequest(`No such ${kind}: '${id}'`, { code: 'resource_missing' });
      act(work, id, reason);
    },
  };
}

function bankFailure(reason: string | undefined, fallback: BankBehaviour): BankBehaviour {
  return reason !== undefined && reason in BANK_FAILURES ? (reason as BankBehaviour) : fallback;
}

/** What the outside world may decide, pressed by a person or a test. */
export const OUTCOMES: Record<string, Outcome> = {
  debit_succeeds: on('charge', 'Debit succeeds', (work, id) => settleBankDebit(work, id, 'success')),
  debit_fails: on('charge', 'Debit fails', (work, id, reason) =>
    settleBankDebit(work, id, bankFailure(reason, 'insufficient_funds')),
  ),
  dispute_opens: on('charge', 'Dispute', (work, id, reason) => {
    openDispute(work, id, reason === undefined ? {} : { reason });
  }),
  inquiry_opens: on('charge', 'Inquiry', (work, id) => {
    openDispute(work, id, { isInquiry: true });
  }),
  inquiry_escalates: on('dispute', 'Becomes a dispute', escalateInquiry),
  dispute_won: on('dispute', 'Won', (work, id) => decideDispute(work, id, 'won')),
  dispute_lost: on('dispute', 'Lost', (work, id) => decideDispute(work, id, 'lost')),
  refund_succeeds: on('refund', 'Refund arrives', (work, id) => settleRefund(work, id, 'succeeds')),
  refund_fails: on('refund', 'Refund fails', (work, id) => settleRefund(work, id, 'fails')),
  payout_in_transit: on('payout', 'On its way', departPayout),
  payout_paid: on('payout', 'Paid', (work, id) => settlePayout(work, id, 'success')),
  payout_failed: on('payout', 'Failed', (work, id, reason) =>
    settlePayout(work, id, bankFailure(reason, 'no_account')),
  ),
  topup_succeeds: on('topup', 'Arrives', (work, id) => settleTopup(work, id, 'succeeds')),
  topup_fails: on('topup', 'Fails', (work, id) => settleTopup(work, id, 'fails')),
  account_verified: on('account', 'Verification done', onVerification),
  account_restricted: on('account', 'Ask again for details', restrictAccount),
};
