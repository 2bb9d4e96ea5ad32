/** Bids in play: opened and not withdrawn. */
export const OPENED_BIDS = `
  SELECT b.id, b.company_id, c.name AS company_name, c.phone AS company_phone, b.revision, b.version, b.input, b.priced,
    b.total_cents, b.submitted_at
  FROM bid b JOIN company c ON c.id = b.company_id
  WHERE b.scope_id = $1 AND b.status = 'opened'
  ORDER BY b.total_cents, b.submitted_at, b.id`;

/** The same rows under their locks, after the scope's. */
export const LOCK_OPENED_BIDS = `${OPENED_BIDS} FOR UPDATE OF b`;

export const COMPANY_ON_PAPER = `SELECT name, phone FROM company WHERE id = $1`;

export const FILES_ON_PAPER = `
  SELECT f.kind, f.name, h.caption, f.pages, f.sha256
  FROM scope_file h JOIN file f ON f.id = h.file_id
  WHERE h.scope_id = $1 AND h.revision <= $2 ORDER BY h.position, h.file_id`;

/** Human numbers come from a counter; one reserved for an award that fails stays unused. */
export const NEXT_NUMBER = `
  INSERT INTO counter (name, value) VALUES ('subcontract', 1001)
  ON CONFLICT (name) DO UPDATE SET value = counter.value + 1
  RETURNING value`;

export const INSERT_AWARD = `
  INSERT INTO award (id, scope_id, bid_id, awarded_by, reason, note, awarded_at) VALUES ($1, $2, $3, $4, $5, $6, $7)`;

export const INSERT_SUBCONTRACT = `
  INSERT INTO subcontract (id, number, scope_id, revision, award_id, bid_id, gc_company_id, crew_company_id, status,
    total_cents, retainage_basis_points, fee_basis_points, answer_days, document_file_id, sign_by, seq)
  VALUES ($1, $2, $3, $4, $5, $6, $7, $8, 'awaiting_signatures', $9, $10, $11, $12, $13, $14, 1)`;

export const INSERT_SOV_LINES = `
  INSERT INTO sov_line (id, subcontract_id, position, description, cut_ids, amount_cents)
  SELECT x.id, $1, x.position, x.description,
    coalesce((SELECT array_agg(cut::uuid ORDER BY place) FROM jsonb_array_elements_text(x.cut_ids) WITH ORDINALITY AS c(cut, place)), '{}'),
    x.amount_cents
  FROM jsonb_to_recordset($2::jsonb)
    AS x(id uuid, position integer, description text, cut_ids jsonb, amount_cents bigint)`;

/** The thread of scope and bidder goes on as the subcontract's; after a lapse it may have been another one's. */
export const ATTACH_THREAD = `
  INSERT INTO thread (id, scope_id, gc_company_id, crew_company_id, subcontract_id) VALUES ($1, $2, $3, $4, $5)
  ON CONFLICT (scope_id, crew_company_id) DO UPDATE SET subcontract_id = excluded.subcontract_id`;

export const INSERT_OUTCOMES = `
  INSERT INTO bid_outcome (bid_id, award_id, won, rank, out_of, band, reason, note)
  SELECT x.bid_id, $1, x.won, x.rank, x.out_of, x.band, x.reason, x.note
  FROM jsonb_to_recordset($2::jsonb)
    AS x(bid_id uuid, won boolean, rank integer, out_of integer, band text, reason text, note text)`;

/** Awards whose days to sign are over. */
export const UNSIGNED_IN_TIME = `
  SELECT id, scope_id FROM subcontract WHERE status = 'awaiting_signatures' AND sign_by < app_now() ORDER BY sign_by LIMIT 100`;

export const LAPSE_SUBCONTRACT = `
  UPDATE subcontract SET status = 'lapsed', updated_at = app_now()
  WHERE id = $1 AND status = 'awaiting_signatures' AND sign_by < app_now()
  RETURNING award_id, gc_company_id, crew_company_id`;

export const LAPSE_AWARD = `UPDATE award SET lapsed_at = app_now() WHERE id = $1 AND lapsed_at IS NULL`;

/** Bids are in play again: what their bidders were told of the lapsed award no longer holds. */
export const FORGET_OUTCOMES = `DELETE FROM bid_outcome WHERE award_id = $1`;

export const OUTCOME_FOR_MAIL = `
  SELECT o.won, o.rank, o.out_of, o.band, o.reason, o.note, s.id AS scope_id, s.number AS scope_number, s.title,
    gc.name AS gc_name
  FROM bid_outcome o
    JOIN bid b ON b.id = o.bid_id
    JOIN scope s ON s.id = b.scope_id
    JOIN company gc ON gc.id = s.company_id
  WHERE o.bid_id = $1 AND o.award_id = $2`;
