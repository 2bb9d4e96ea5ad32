export const BIDDERS = `
  SELECT company_id FROM bid WHERE scope_id = $1
  UNION SELECT company_id FROM sealed_bid WHERE scope_id = $1`;

export const SCOPE_KEY = `SELECT public_key, wrapped_private_key FROM scope_key WHERE scope_id = $1`;
export const COMPANY_KEY = `SELECT wrapped_key FROM company WHERE id = $1`;

/** Sealed bids that stand, the earliest first. */
export const STANDING_SEALED_BIDS = `
  SELECT id, scope_id, company_id, revision, ciphertext, key_for_scope, submitted_by, submitted_at, version
  FROM sealed_bid WHERE scope_id = $1 AND status = 'in' ORDER BY submitted_at, id`;

export const MARK_SEALED_OPENED = `UPDATE sealed_bid SET status = 'opened' WHERE scope_id = $1 AND status = 'in'`;
export const MARK_RANKED_OPENED = `
  UPDATE bid SET status = 'opened' WHERE scope_id = $1 AND status = 'in' RETURNING id`;

export const INSERT_BID = `
  INSERT INTO bid (id, scope_id, company_id, revision, status, input, priced, total_cents, submitted_by, submitted_at, version)
  VALUES ($1, $2, $3, $4, $5, $6, $7, $8, $9, $10, $11)`;

export const INSERT_BID_LINES = `
  INSERT INTO bid_line (bid_id, cut_id, position, unit, quantity, rate, factors, cents)
  SELECT $1, line.cut_id, line.position, line.unit, line.quantity, line.rate, line.factors, line.cents
  FROM jsonb_to_recordset($2::jsonb) AS line (
    cut_id uuid, position integer, unit text, quantity bigint, rate bigint, factors integer[], cents bigint
  )`;

export const COME_DUE = `
  UPDATE scope SET status = 'due', opened_at = $2, seq = seq + 1, bid_seq = bid_seq + 1, updated_at = app_now()
  WHERE id = $1 AND status = 'open' RETURNING seq, bid_seq`;

/** Open scopes whose time has passed; $1 narrows to one. */
export const OVERDUE = `
  SELECT id FROM scope
  WHERE status = 'open' AND due_at <= (SELECT app_now()) AND ($1::uuid IS NULL OR id = $1)
  ORDER BY due_at LIMIT 100`;

/**
 * Where one company's bids on some scopes stand. Rank counts standing bids by total, the earlier first among equals;
 * whether it may be told is not decided here. $1 company, $2 scopes.
 */
export const OWN_MARKS = `
  SELECT x.scope_id, s.mode, coalesce(b.status, sb.status) AS status, d.scope_id IS NOT NULL AS has_draft, r.rank, r.out_of
  FROM unnest($2::uuid[]) AS x (scope_id)
  JOIN scope s ON s.id = x.scope_id
  LEFT JOIN bid b ON b.scope_id = x.scope_id AND b.company_id = $1
  LEFT JOIN sealed_bid sb ON sb.scope_id = x.scope_id AND sb.company_id = $1
  LEFT JOIN bid_draft d ON d.scope_id = x.scope_id AND d.company_id = $1
  LEFT JOIN LATERAL (
    SELECT count(*) AS out_of, count(*) FILTER (
      WHERE (o.total_cents, o.submitted_at, o.id) <= (b.total_cents, b.submitted_at, b.id)) AS rank
    FROM bid o WHERE o.scope_id = b.scope_id AND o.status IN ('in', 'opened')
  ) r ON s.mode = 'ranked' AND b.status IN ('in', 'opened')`;
