export const RELEASE_BY_ID = `SELECT * FROM release WHERE id = $1`;
export const LOCK_RELEASE = `SELECT * FROM release WHERE id = $1 FOR UPDATE`;

export const INSERT_RELEASE = `
  INSERT INTO release (id, subcontract_id, completion_id, status, gross_cents, retainage_cents, fee_cents, crew_cents, entry_id, released_by)
  VALUES ($1, $2, $3, 'posted', $4, $5, $6, $7, $8, $9)
  RETURNING *`;

export const RELEASES_OF = `SELECT * FROM release WHERE subcontract_id = ANY ($1::uuid[]) ORDER BY posted_at`;

export const HELD_ON_LINES = `
  SELECT sov_line_id, -balance_cents AS cents FROM ledger_account
  WHERE subcontract_id = $1 AND code LIKE 'held:%' AND sov_line_id = ANY ($2::uuid[])`;

/** Funding lots, first in first out, with what is left to draw on each. */
export const FUNDING_LOTS = `
  SELECT f.id, f.charge_id, f.amount_cents - coalesce(sum(t.amount_cents), 0) AS left_cents
  FROM funding f LEFT JOIN release_transfer t ON t.funding_id = f.id
  WHERE f.subcontract_id = $1 AND f.status = 'succeeded'
  GROUP BY f.id ORDER BY f.settled_at, f.id`;

export const INSERT_TRANSFER = `
  INSERT INTO release_transfer (release_id, funding_id, amount_cents, operation_id) VALUES ($1, $2, $3, $4)`;

export const TRANSFER_BY_OPERATION = `
  SELECT t.release_id, t.funding_id, t.amount_cents, t.transfer_id, r.subcontract_id, f.available_at, f.charge_id,
    s.gc_company_id, s.crew_company_id, c.payout_account_id
  FROM release_transfer t JOIN release r ON r.id = t.release_id JOIN funding f ON f.id = t.funding_id
    JOIN subcontract s ON s.id = r.subcontract_id JOIN company c ON c.id = s.crew_company_id
  WHERE t.operation_id = $1`;

export const TRANSFER_DONE = `
  UPDATE release_transfer SET transfer_id = $2, transferred_at = app_now() WHERE operation_id = $1 AND transfer_id IS NULL`;

export const TRANSFERS_LEFT = `
  SELECT count(*)::int AS left_count FROM release_transfer WHERE release_id = $1 AND transfer_id IS NULL`;

export const RELEASE_TRANSFERRED = `
  UPDATE release SET status = 'transferred', blocked_because = NULL, transferred_at = app_now()
  WHERE id = $1 AND status IN ('posted', 'blocked')`;

export const RELEASE_BLOCKED = `
  UPDATE release SET status = 'blocked', blocked_because = $2 WHERE id = $1 AND status IN ('posted', 'blocked')`;

export const RELEASE_RETRIED = `
  UPDATE release SET status = 'posted', blocked_because = NULL WHERE id = $1 AND status = 'blocked' RETURNING id`;

/** Transfers whose last operation was refused: a new operation row is made, never a new try under the old key. */
export const REFUSED_TRANSFERS = `
  SELECT t.release_id, t.funding_id, t.amount_cents FROM release_transfer t JOIN provider_operation o ON o.id = t.operation_id
  WHERE t.release_id = $1 AND t.transfer_id IS NULL AND o.status = 'refused'`;

export const POINT_TRANSFER = `UPDATE release_transfer SET operation_id = $3 WHERE release_id = $1 AND funding_id = $2`;

export const BLOCKED_RELEASES_OF_CREW = `
  SELECT r.id FROM release r JOIN subcontract s ON s.id = r.subcontract_id
  WHERE s.crew_company_id = $1 AND r.status = 'blocked' ORDER BY r.posted_at`;

export const CREW_ACCOUNT = `SELECT payout_account_id, payouts_ready FROM company WHERE id = $1`;

export const READY_BUT_BLOCKED = `
  SELECT DISTINCT s.crew_company_id FROM release r JOIN subcontract s ON s.id = r.subcontract_id JOIN company c ON c.id = s.crew_company_id
  WHERE r.status = 'blocked' AND c.payouts_ready`;
