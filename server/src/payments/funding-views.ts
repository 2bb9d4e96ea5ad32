import type { FundingStatus, FundingView } from '@kerfyard/common/payments';

/** A row of `funding` as the driver gives it: BIGINT as text. */
export interface FundingRow {
  id: string;
  subcontract_id: string;
  method: 'card' | 'bank_debit';
  status: FundingStatus;
  amount_cents: string;
  platform_charge_cents: string;
  checkout_session_id: string | null;
  checkout_url: string | null;
  payment_intent_id: string | null;
  charge_id: string | null;
  created_at: Date;
  settled_at: Date | null;
  available_at: Date | null;
  sov_line_ids?: string[];
}

/** A funding as people see it; the checkout page's address is the payer's alone. */
export function presentFunding(row: FundingRow, sovLineIds: string[], viewer: 'gc' | 'crew'): FundingView {
  return {
    id: row.id,
    status: row.status,
    method: row.method,
    amountCents: Number(row.amount_cents),
    platformChargeCents: viewer === 'gc' ? Number(row.platform_charge_cents) : 0,
    sovLineIds,
    checkoutUrl: viewer === 'gc' ? row.checkout_url : null,
    createdAt: row.created_at.toISOString(),
    settledAt: row.settled_at?.toISOString() ?? null,
  };
}
