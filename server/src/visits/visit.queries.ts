const VISIT = `
  SELECT v.id, v.subcontract_id, s.number AS subcontract_number, r.body->>'title' AS title, v.status,
    v.crew_id, c.name AS crew_name, v.truck_id, t.name AS truck_name,
    s.gc_company_id, gc.name AS gc_name, s.crew_company_id, cutter.name AS crew_company_name,
    r.body->'site'->>'city' AS city, r.body->'site'->>'state' AS state, v.time_zone,
    v.windows, lower(v.during) AS starts_at, upper(v.during) AS ends_at, v.note,
    v.started_at, v.finished_at, v.cancel_reason,
    (SELECT array_agg(l.sov_line_id ORDER BY l.sov_line_id) FROM visit_line l WHERE l.visit_id = v.id) AS sov_line_ids
  FROM visit v
    JOIN crew c ON c.id = v.crew_id
    JOIN truck t ON t.id = v.truck_id
    JOIN subcontract s ON s.id = v.subcontract_id
    JOIN company gc ON gc.id = s.gc_company_id
    JOIN company cutter ON cutter.id = s.crew_company_id
    JOIN scope_revision r ON r.scope_id = s.scope_id AND r.revision = s.revision`;

export const VISIT_BY_ID = `${VISIT} WHERE v.id = $1`;
export const LOCK_VISIT = `${VISIT} WHERE v.id = $1 FOR UPDATE OF v`;
export const VISITS_OF_SUBCONTRACT = `${VISIT} WHERE v.subcontract_id = $1 ORDER BY v.created_at, v.id`;

/** Booked in the span, or proposed with a window in it; cancelled ones take no place. */
export const VISITS_OF_COMPANY = `
  ${VISIT}
  WHERE (s.gc_company_id = $1 OR s.crew_company_id = $1) AND v.status <> 'cancelled' AND (
    v.during && tstzrange($2, $3)
    OR (v.status = 'proposed' AND EXISTS (
      SELECT 1 FROM jsonb_array_elements(v.windows) w
      WHERE tstzrange((w->>'startsAt')::timestamptz, (w->>'endsAt')::timestamptz) && tstzrange($2, $3)))
  )
  ORDER BY coalesce(lower(v.during), (v.windows->0->>'startsAt')::timestamptz), v.id
  LIMIT 1000`;

export const SUBCONTRACT_OF_VISIT = `SELECT subcontract_id FROM visit WHERE id = $1`;

export const UNITS_OF_COMPANY = `
  SELECT (SELECT id FROM crew WHERE id = $2 AND company_id = $1) AS crew_id,
    (SELECT id FROM truck WHERE id = $3 AND company_id = $1) AS truck_id`;

export const INSERT_VISIT = `
  INSERT INTO visit (id, subcontract_id, crew_id, truck_id, status, windows, time_zone, note, proposed_by)
  VALUES ($1, $2, $3, $4, 'proposed', $5, $6, $7, $8)
  ON CONFLICT (id) DO NOTHING
  RETURNING id`;

export const INSERT_VISIT_LINES = `INSERT INTO visit_line (visit_id, sov_line_id) SELECT $1, unnest($2::uuid[])`;

/**
 * Confirmations that want the same crew or truck take turns here. Without it two of them would each insert and then
 * wait for the other at the exclusion constraint, which PostgreSQL ends only as a deadlock, a second later.
 */
export const LOCK_CREW = `SELECT id FROM crew WHERE id = $1 FOR UPDATE`;
export const LOCK_TRUCK = `SELECT id FROM truck WHERE id = $1 FOR UPDATE`;

export const CONFIRM_VISIT = `
  UPDATE visit SET status = 'confirmed', during = tstzrange($2, $3), confirmed_by = $4, updated_at = app_now()
  WHERE id = $1 AND status = 'proposed' RETURNING id`;

export const START_VISIT = `
  UPDATE visit SET status = 'on_site', started_at = app_now(), updated_at = app_now()
  WHERE id = $1 AND status = 'confirmed' RETURNING id`;

export const FINISH_VISIT = `
  UPDATE visit SET status = 'finished', finished_at = app_now(), updated_at = app_now()
  WHERE id = $1 AND status = 'on_site' RETURNING id`;

export const CANCEL_VISIT = `
  UPDATE visit SET status = 'cancelled', cancel_reason = $2, updated_at = app_now()
  WHERE id = $1 AND status IN ('proposed', 'confirmed') RETURNING id`;
