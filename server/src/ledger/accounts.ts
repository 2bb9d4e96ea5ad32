/** Book `platform` sums to zero by itself; so does the memo book `connect`, the crew's side at the provider. */
export type Book = 'platform' | 'connect';
export type AccountKind = 'asset' | 'liability' | 'income' | 'expense';

/** An account by its code; it is made when first posted to. */
export interface AccountRef {
  book: Book;
  code: string;
  kind: AccountKind;
  mayBeNegative: boolean;
  subcontractId: string | null;
  companyId: string | null;
  sovLineId: string | null;
}

function account(kind: AccountKind, code: string, rest: Partial<AccountRef> = {}): AccountRef {
  return {
    book: 'platform',
    code,
    kind,
    mayBeNegative: false,
    subcontractId: null,
    companyId: null,
    sovLineId: null,
    ...rest,
  };
}

/** The chart of accounts: who owns what, in one place. */
export const accounts = {
  /** Our balance at the provider, not yet settled. */
  stripePending: () => account('asset', 'stripe_pending'),
  /** Settled; the provider may drive it below zero (disputes), so this one is not protected. */
  stripeAvailable: () => account('asset', 'stripe_available', { mayBeNegative: true }),
  stripeFee: () => account('expense', 'stripe_fee'),
  /** Charged to the general contractor when money is set aside. */
  platformCharge: () => account('income', 'platform_charge'),
  /** Kept from the crew's part at release. */
  platformFee: () => account('income', 'platform_fee'),
  /** Funded, not yet tied to a line of the schedule of values. */
  heldUnallocated: (subcontractId: string) =>
    account('liability', `held_unallocated:${subcontractId}`, { subcontractId }),
  held: (subcontractId: string, sovLineId: string) =>
    account('liability', `held:${subcontractId}:${sovLineId}`, { subcontractId, sovLineId }),
  retainageHeld: (subcontractId: string) =>
    account('liability', `retainage_held:${subcontractId}`, { subcontractId }),
  /** Released to the crew, transfer not confirmed. */
  crewPayable: (companyId: string, subcontractId: string) =>
    account('liability', `crew_payable:${companyId}:${subcontractId}`, { companyId, subcontractId }),
  /** Memo: what the crew has at the provider, and its claim on it. */
  crewBalance: (payoutAccountId: string, companyId: string) =>
    account('asset', `crew_balance:${payoutAccountId}`, { book: 'connect', companyId, mayBeNegative: true }),
  crewOwner: (payoutAccountId: string, companyId: string) =>
    account('liability', `crew_owner:${payoutAccountId}`, {
      book: 'connect',
      companyId,
      mayBeNegative: true,
    }),
} as const;

/** A line of an entry: positive cents are a debit, negative a credit. */
export interface EntryLine {
  account: AccountRef;
  cents: number;
}

export const debit = (ref: AccountRef, cents: number): EntryLine => ({ account: ref, cents });
export const credit = (ref: AccountRef, cents: number): EntryLine => ({ account: ref, cents: -cents });
