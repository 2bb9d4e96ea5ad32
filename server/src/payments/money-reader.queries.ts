/** All five numbers of the money line from the ledger, for many subcontracts at once. */
export const MONEY_LINES = `
  SELECT s.id, s.total_cents AS contract_cents,
    coalesce(-sum(a.balance_cents) FILTER (WHERE a.code LIKE 'held:%' OR a.code LIKE 'held_unallocated:%'), 0) AS held_cents,
    coalesce(-sum(a.balance_cents) FILTER (WHERE a.code LIKE 'retainage_held:%'), 0) AS retainage_cents,
    coalesce((SELECT sum(r.gross_cents - r.retainage_cents) FROM release r WHERE r.subcontract_id = s.id), 0) AS released_cents
  FROM subcontract s LEFT JOIN ledger_account a ON a.subcontract_id = s.id AND a.book = 'platform'
  WHERE s.id = ANY ($1::uuid[])
  GROUP BY s.id`;

export const SET_ASIDE_LINES = `
  SELECT sov_line_id FROM ledger_account
  WHERE subcontract_id = $1 AND code LIKE 'held:%' AND balance_cents < 0`;

/** Lines with money under way (a checkout page open, a debit clearing). */
export const LINES_UNDER_WAY = `
  SELECT l.sov_line_id FROM funding_line l JOIN funding f ON f.id = l.funding_id
  WHERE f.subcontract_id = $1 AND l.standing AND f.status IN ('requested', 'awaiting_payment', 'processing')`;

export const RELEASED_LINES = `
  SELECT cl.sov_line_id FROM release r JOIN completion_line cl ON cl.completion_id = r.completion_id
  WHERE r.subcontract_id = $1`;

/** Lines that hold money, or whose money has been released. */
export const PAID_FOR_LINES = `
  SELECT sov_line_id FROM ledger_account
  WHERE subcontract_id = ANY ($1::uuid[]) AND code LIKE 'held:%' AND balance_cents < 0
  UNION
  SELECT cl.sov_line_id FROM release r JOIN completion_line cl ON cl.completion_id = r.completion_id
  WHERE r.subcontract_id = ANY ($1::uuid[])`;

/** A company's side of every entry, oldest first: one row per entry and account of its statement. */
export const STATEMENT_LINES = `
  SELECT e.id AS entry_id, e.number, e.posted_at, e.event, a.code, p.amount_cents, s.id AS subcontract_id, s.number AS subcontract_number,
    CASE WHEN s.gc_company_id = $1 THEN s.crew_company_id ELSE s.gc_company_id END AS other_id,
    CASE WHEN s.gc_company_id = $1 THEN crew.name ELSE gc.name END AS other_name
  FROM ledger_entry e
    JOIN ledger_posting p ON p.entry_id = e.id
    JOIN ledger_account a ON a.id = p.account_id
    JOIN subcontract s ON s.id = e.subcontract_id
    JOIN company gc ON gc.id = s.gc_company_id
    JOIN company crew ON crew.id = s.crew_company_id
  WHERE e.book = 'platform' AND (s.gc_company_id = $1 OR s.crew_company_id = $1) AND ($2::uuid IS NULL OR s.id = $2)
  ORDER BY e.number, p.line`;
