const FUNDING = `id, subcontract_id, method, status, amount_cents, platform_charge_cents, checkout_session_id, checkout_url,
  payment_intent_id, charge_id, created_at, settled_at, available_at`;

/** The subcontract's row lock orders everything that moves its money. */
export const LOCK_SUBCONTRACT = `
  SELECT id, number, gc_company_id, crew_company_id, status, retainage_basis_points, fee_basis_points
  FROM subcontract WHERE id = $1 FOR UPDATE`;

export const SOV_LINES = `
  SELECT id, position, description, amount_cents FROM sov_line
  WHERE subcontract_id = $1 AND id = ANY ($2::uuid[]) ORDER BY position`;

export const STANDING_LINES = `
  SELECT sov_line_id FROM funding_line WHERE standing AND sov_line_id = ANY ($1::uuid[])`;

export const INSERT_FUNDING = `
  INSERT INTO funding (id, subcontract_id, method, status, amount_cents, platform_charge_cents, requested_by)
  VALUES ($1, $2, $3, 'requested', $4, $5, $6)
  ON CONFLICT (id) DO NOTHING
  RETURNING id`;

export const INSERT_FUNDING_LINES = `
  INSERT INTO funding_line (funding_id, sov_line_id, amount_cents)
  SELECT $1, sov_line_id, amount_cents FROM unnest($2::uuid[], $3::bigint[]) AS x(sov_line_id, amount_cents)`;

export const FUNDING_BY_ID = `SELECT ${FUNDING} FROM funding WHERE id = $1`;
export const LOCK_FUNDING = `SELECT ${FUNDING} FROM funding WHERE id = $1 FOR UPDATE`;
export const FUNDING_BY_SESSION = `SELECT ${FUNDING} FROM funding WHERE checkout_session_id = $1`;
export const FUNDINGS_OF = `
  SELECT ${FUNDING},
    (SELECT array_agg(sov_line_id ORDER BY sov_line_id) FROM funding_line l WHERE l.funding_id = funding.id) AS sov_line_ids
  FROM funding WHERE subcontract_id = ANY ($1::uuid[]) ORDER BY created_at`;

export const FUNDING_LINES = `SELECT sov_line_id, amount_cents FROM funding_line WHERE funding_id = $1 ORDER BY sov_line_id`;

export const FUNDING_AWAITS_PAYMENT = `
  UPDATE funding SET status = 'awaiting_payment', checkout_session_id = $2, checkout_url = $3
  WHERE id = $1 AND status = 'requested'`;

export const FUNDING_PROCESSES = `
  UPDATE funding SET status = 'processing', payment_intent_id = $2 WHERE id = $1 AND status = 'awaiting_payment'`;

export const FUNDING_SUCCEEDS = `
  UPDATE funding SET status = 'succeeded', payment_intent_id = $2, charge_id = $3, checkout_url = NULL, settled_at = app_now(),
    available_at = CASE WHEN $4::boolean THEN app_now() END
  WHERE id = $1 AND status IN ('awaiting_payment', 'processing')
  RETURNING id`;

export const FUNDING_ENDS = `
  UPDATE funding SET status = $2, checkout_url = NULL
  WHERE id = $1 AND status IN ('requested', 'awaiting_payment', 'processing')
  RETURNING id`;

/** An ended funding gives its lines back, so that they may be set aside again. */
export const FREE_FUNDING_LINES = `UPDATE funding_line SET standing = false WHERE funding_id = $1`;

export const FUNDING_AVAILABLE = `UPDATE funding SET available_at = app_now() WHERE id = $1 AND available_at IS NULL RETURNING id`;

export const FUNDINGS_TO_SETTLE = `
  SELECT id, charge_id FROM funding WHERE status = 'succeeded' AND available_at IS NULL ORDER BY settled_at LIMIT 100`;

/** Transfers drawn on a charge while it was still pending: they left \`stripe_pending\`, so settling moves only the rest. */
export const DRAWN_ON_FUNDING = `
  SELECT coalesce(sum(amount_cents), 0) AS cents FROM release_transfer WHERE funding_id = $1 AND transfer_id IS NOT NULL`;

export const SUBCONTRACT_PARTIES = `
  SELECT id, number, gc_company_id, crew_company_id, status FROM subcontract WHERE id = $1`;
