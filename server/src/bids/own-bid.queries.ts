const OUTCOME = `o.won, o.rank AS outcome_rank, o.out_of AS outcome_of, o.band, o.reason, o.note`;

/** One company's bid on one scope: readable (ranked, or opened) or sealed. $1 scope, $2 company. */
export const READABLE_BID = `
  SELECT b.id, b.scope_id, b.company_id, b.revision, b.status, b.input, b.priced, b.total_cents, b.submitted_at, b.version,
    ${OUTCOME}
  FROM bid b LEFT JOIN bid_outcome o ON o.bid_id = b.id
  WHERE b.scope_id = $1 AND b.company_id = $2`;

export const SEALED_BID = `
  SELECT id, scope_id, company_id, revision, status, ciphertext, key_for_bidder, submitted_at, version
  FROM sealed_bid WHERE scope_id = $1 AND company_id = $2`;

/** What bidding asks of a company. */
export const LADDER = `
  SELECT yard_lat IS NOT NULL AND yard_lon IS NOT NULL AS yard, service_radius_mi IS NOT NULL AS service_radius,
    cardinality(methods) > 0 AS methods
  FROM company WHERE id = $1`;

export const INSERT_SEALED = `
  INSERT INTO sealed_bid (id, scope_id, company_id, revision, status, ciphertext, key_for_scope, key_for_bidder, submitted_by, submitted_at)
  VALUES ($1, $2, $3, $4, 'in', $5, $6, $7, $8, $9)`;
export const REVISE_SEALED = `
  UPDATE sealed_bid SET revision = $2, status = 'in', ciphertext = $3, key_for_scope = $4, key_for_bidder = $5,
    submitted_by = $6, submitted_at = $7, version = version + 1
  WHERE id = $1`;
export const WITHDRAW_SEALED = `
  UPDATE sealed_bid SET status = 'withdrawn', version = version + 1
  WHERE scope_id = $1 AND company_id = $2 AND status = 'in' RETURNING id`;

export const REVISE_RANKED = `
  UPDATE bid SET revision = $2, input = $3, priced = $4, total_cents = $5, submitted_by = $6, submitted_at = $7,
    version = version + 1
  WHERE id = $1`;
export const DELETE_BID_LINES = `DELETE FROM bid_line WHERE bid_id = $1`;
export const WITHDRAW_RANKED = `
  UPDATE bid SET status = 'withdrawn' WHERE scope_id = $1 AND company_id = $2 AND status = 'in' RETURNING id`;

/** A ranked bid close to due moves it, at most so many times. $2 the new time, $3 the most extensions. */
export const EXTEND_DUE = `
  UPDATE scope SET due_at = $2, extensions = extensions + 1, seq = seq + 1, updated_at = app_now()
  WHERE id = $1 AND extensions < $3 RETURNING seq`;

export const DELETE_BID_DRAFT = `DELETE FROM bid_draft WHERE scope_id = $1 AND company_id = $2`;
export const READ_BID_DRAFT = `
  SELECT ciphertext, key_for_bidder, updated_at FROM bid_draft WHERE scope_id = $1 AND company_id = $2`;
export const SAVE_BID_DRAFT = `
  INSERT INTO bid_draft (scope_id, company_id, ciphertext, key_for_bidder) VALUES ($1, $2, $3, $4)
  ON CONFLICT (scope_id, company_id)
  DO UPDATE SET ciphertext = excluded.ciphertext, key_for_bidder = excluded.key_for_bidder, updated_at = app_now()
  RETURNING updated_at`;

/**
 * A crew's own bids, the latest first: those readable, and those still sealed. $1 company, $2 and $3 the key of the
 * last row seen, $4 how many. Each half reads its own index no further than the page.
 */
export const OWN_BIDS = `
  SELECT w.*, s.number, s.title, s.status AS scope_status, s.mode, s.due_at, s.time_zone,
    s.company_id AS gc_id, c.name AS gc_name, ${OUTCOME},
    (SELECT sub.id FROM subcontract sub WHERE sub.bid_id = w.id AND sub.status <> 'lapsed') AS subcontract_id
  FROM (
    (SELECT b.id, b.scope_id, b.status, b.submitted_at, b.total_cents, NULL::bytea AS ciphertext, NULL::bytea AS key_for_bidder
     FROM bid b
     WHERE b.company_id = $1 AND ($2::timestamptz IS NULL OR (b.submitted_at, b.id) < ($2, $3::uuid))
     ORDER BY b.submitted_at DESC, b.id DESC LIMIT $4)
    UNION ALL
    (SELECT sb.id, sb.scope_id, sb.status, sb.submitted_at, NULL, sb.ciphertext, sb.key_for_bidder
     FROM sealed_bid sb
     WHERE sb.company_id = $1 AND sb.status <> 'opened'
       AND ($2::timestamptz IS NULL OR (sb.submitted_at, sb.id) < ($2, $3::uuid))
     ORDER BY sb.submitted_at DESC, sb.id DESC LIMIT $4)
  ) w
  JOIN scope s ON s.id = w.scope_id
  JOIN company c ON c.id = s.company_id
  LEFT JOIN bid_outcome o ON o.bid_id = w.id
  ORDER BY w.submitted_at DESC, w.id DESC
  LIMIT $4`;
