import type { CompanyView } from '../api/index.ts';
import type { FundingStatus, OperationStatus, ReleaseStatus } from './payment.state.ts';

/** The bar that both sides and staff read; all in cents, from the ledger. */
export interface MoneyLineView {
  contractCents: number;
  /** Everything set aside so far: held still, objected, kept as retainage, or released since. */
  setAsideCents: number;
  releasedCents: number;
  retainageCents: number;
  objectedCents: number;
}

export interface SetAsideQuote {
  amountCents: number;
  platformChargeCents: number;
  totalCents: number;
}

export interface FundingView {
  id: string;
  status: FundingStatus;
  method: 'card' | 'bank_debit';
  amountCents: number;
  platformChargeCents: number;
  sovLineIds: string[];
  /** The provider's page, while the payment waits there; the general contractor only. */
  checkoutUrl: string | null;
  createdAt: string;
  settledAt: string | null;
}

export interface ReleaseView {
  id: string;
  completionId: string;
  status: ReleaseStatus;
  blockedBecause: 'capability' | 'balance' | null;
  grossCents: number;
  retainageCents: number;
  feeCents: number;
  crewCents: number;
  postedAt: string;
  transferredAt: string | null;
}

/** One line of a statement: a ledger entry as this company sees it. */
export interface StatementLine {
  entryId: string;
  at: string;
  kind: 'set_aside' | 'charge' | 'released' | 'fee' | 'retainage_held' | 'transferred' | 'refunded';
  subcontractId: string;
  subcontractNumber: string;
  otherSide: CompanyView;
  /** Positive: in this company's favour (crew) or into its held money (general contractor). */
  cents: number;
}

/** `GET /api/payments/statement`: its totals equal the ledger's account balances. */
export interface StatementView {
  side: 'gc' | 'crew';
  lines: StatementLine[];
  totals: {
    setAsideCents: number;
    chargesCents: number;
    heldCents: number;
    releasedCents: number;
    feesCents: number;
    retainageCents: number;
    payableCents: number;
    transferredCents: number;
  };
}

/** Staff: `GET /api/staff/books`. */
export interface BooksView {
  trialBalance: {
    book: string;
    accounts: { code: string; kind: string; balanceCents: number }[];
    sumCents: number;
  }[];
  checks: { id: string; name: string; failures: number }[];
  operations: {
    id: string;
    kind: string;
    status: OperationStatus;
    attempts: number;
    createdAt: string;
    error: string | null;
  }[];
  incidents: { id: string; kind: string; detail: string; openedAt: string; closedAt: string | null }[];
}
