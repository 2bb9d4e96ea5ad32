const SUBCONTRACT = `
  SELECT s.id, s.number, s.scope_id, s.revision, s.bid_id, s.award_id, s.status, s.total_cents, s.retainage_basis_points,
    s.fee_basis_points, s.answer_days, s.sign_by, s.seq, s.created_at,
    s.gc_company_id, gc.name AS gc_name, s.crew_company_id, crew.name AS crew_name, crew.payouts_ready,
    s.document_file_id, document.sha256 AS document_sha256,
    s.signed_document_file_id, signed.sha256 AS signed_document_sha256,
    r.body->>'title' AS title, r.body->'site'->>'city' AS city, r.body->'site'->>'state' AS state,
    r.body->'site'->>'timeZone' AS time_zone
  FROM subcontract s
    JOIN company gc ON gc.id = s.gc_company_id
    JOIN company crew ON crew.id = s.crew_company_id
    JOIN scope_revision r ON r.scope_id = s.scope_id AND r.revision = s.revision
    JOIN file document ON document.id = s.document_file_id
    LEFT JOIN file signed ON signed.id = s.signed_document_file_id`;

export const SUBCONTRACT_BY_ID = `${SUBCONTRACT} WHERE s.id = $1`;

/** Only its own row is locked: the names beside it belong to others. */
export const LOCK_SUBCONTRACT = `${SUBCONTRACT} WHERE s.id = $1 FOR UPDATE OF s`;

export const SOV_OF = `
  SELECT id, position, description, cut_ids, amount_cents FROM sov_line WHERE subcontract_id = $1 ORDER BY position`;

export const BUMP_SUBCONTRACT = `
  UPDATE subcontract SET seq = seq + 1, updated_at = app_now() WHERE id = $1
  RETURNING seq, gc_company_id, crew_company_id`;

/** $2 status or null, $3 and $4 the key the page begins after, $5 one more than the page. */
export const SUBCONTRACTS_OF_COMPANY = `
  SELECT s.id, s.number, s.status, s.created_at, s.gc_company_id, gc.name AS gc_name,
    s.crew_company_id, crew.name AS crew_name,
    r.body->>'title' AS title, r.body->'site'->>'city' AS city, r.body->'site'->>'state' AS state,
    r.body->'site'->>'timeZone' AS time_zone,
    jsonb_path_query_array(r.body->'cuts', '$[0 to 59]') AS cuts,
    (SELECT min(lower(v.during)) FROM visit v
      WHERE v.subcontract_id = s.id AND v.status IN ('confirmed', 'on_site') AND upper(v.during) > app_now()) AS next_visit_at
  FROM subcontract s
    JOIN company gc ON gc.id = s.gc_company_id
    JOIN company crew ON crew.id = s.crew_company_id
    JOIN scope_revision r ON r.scope_id = s.scope_id AND r.revision = s.revision
  WHERE (s.gc_company_id = $1 OR s.crew_company_id = $1)
    AND ($2::text IS NULL OR s.status = $2)
    AND ($3::timestamptz IS NULL OR (s.created_at, s.id) < ($3::timestamptz, $4::uuid))
  ORDER BY s.created_at DESC, s.id DESC
  LIMIT $5`;

export const PUBLISHED_BODY = `SELECT body, totals FROM scope_revision WHERE scope_id = $1 AND revision = $2`;

export const THREAD_OF = `SELECT id FROM thread WHERE scope_id = $1 AND crew_company_id = $2`;

export const SIGNATURES_OF = `
  SELECT g.side, g.user_id, u.name AS person_name, g.typed_name, g.document_sha256, g.ip, g.signed_at
  FROM signature g JOIN app_user u ON u.id = g.user_id
  WHERE g.subcontract_id = $1 ORDER BY g.signed_at, g.side`;

export const SCOPE_FILES_OF = `
  SELECT f.file_id, f.caption FROM scope_file f
  WHERE f.scope_id = $1 AND f.revision <= $2 ORDER BY f.position, f.file_id`;

export const INSERT_SIGNATURE = `
  INSERT INTO signature (subcontract_id, side, user_id, typed_name, document_sha256, ip, signed_at)
  VALUES ($1, $2, $3, $4, $5, $6, $7)`;

export const ACTIVATE = `
  UPDATE subcontract SET status = 'active', signed_document_file_id = $2, updated_at = app_now()
  WHERE id = $1 AND status = 'awaiting_signatures' RETURNING id`;

/** Papers, the scope's files and completion photos of work in which the company is a side. */
export const MAY_READ_FILE = `
  SELECT 1 AS yes FROM subcontract s
  WHERE (s.gc_company_id = $1 OR s.crew_company_id = $1) AND (
    s.document_file_id = $2 OR s.signed_document_file_id = $2
    OR EXISTS (SELECT 1 FROM scope_file f WHERE f.file_id = $2 AND f.scope_id = s.scope_id AND f.revision <= s.revision)
    OR EXISTS (SELECT 1 FROM completion_photo p JOIN completion c ON c.id = p.completion_id
      WHERE p.file_id = $2 AND c.subcontract_id = s.id)
  )
  LIMIT 1`;

export const IS_SIDE = `
  SELECT 1 AS yes FROM subcontract WHERE id = $2 AND (gc_company_id = $1 OR crew_company_id = $1)`;
