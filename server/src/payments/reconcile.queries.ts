/** Moves whenever the books or the provider's answers to us do. */
export const BOOKS_MARK = `
  SELECT (SELECT coalesce(max(number), 0) FROM ledger_entry) AS last_entry,
    (SELECT count(*) FROM provider_operation WHERE status IN ('requested', 'unknown')) AS open_operations,
    (SELECT count(*) FROM funding WHERE available_at IS NOT NULL) AS settled`;

export const OUR_BALANCE = `
  SELECT coalesce(sum(balance_cents) FILTER (WHERE code = 'stripe_pending'), 0) AS pending_cents,
    coalesce(sum(balance_cents) FILTER (WHERE code = 'stripe_available'), 0) AS available_cents
  FROM ledger_account`;

/** Charges as our books have them, with what transfers have drawn on each. */
export const OUR_CHARGES = `
  SELECT f.charge_id, f.amount_cents + f.platform_charge_cents AS cents, f.available_at IS NOT NULL AS is_available,
    (SELECT coalesce(sum(t.amount_cents), 0) FROM release_transfer t
     WHERE t.funding_id = f.id AND t.transfer_id IS NOT NULL) AS drawn_cents
  FROM funding f WHERE f.status = 'succeeded'`;

export const OUR_TRANSFERS = `
  SELECT t.transfer_id, t.amount_cents AS cents, f.charge_id, c.payout_account_id
  FROM release_transfer t JOIN funding f ON f.id = t.funding_id JOIN subcontract s ON s.id = f.subcontract_id
    JOIN company c ON c.id = s.crew_company_id
  WHERE t.transfer_id IS NOT NULL`;

/** Which of these operations may still come to be recorded. */
export const OPEN_AMONG = `
  SELECT id FROM provider_operation WHERE id::text = ANY ($1::text[]) AND status IN ('requested', 'unknown')`;

/** Payments of these subcontracts that we wait for: a charge of theirs is not unknown, only not recorded yet. */
export const AWAITED_AMONG = `
  SELECT DISTINCT subcontract_id::text AS id FROM funding
  WHERE subcontract_id::text = ANY ($1::text[]) AND status IN ('requested', 'awaiting_payment', 'processing')`;

/** Charges and transfers that entries of the ledger claim. */
export const CLAIMED_OBJECTS = `
  SELECT provider_object_id AS id, provider_event_kind AS kind FROM ledger_entry
  WHERE provider_event_kind IN ('charge.succeeded', 'transfer.created')`;

export const CREW_MEMOS = `
  SELECT substr(code, 14) AS account, balance_cents AS cents FROM ledger_account WHERE code LIKE 'crew_balance:%'`;
