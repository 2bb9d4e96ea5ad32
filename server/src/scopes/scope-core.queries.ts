/** Columns of `ScopeRow`, of the table under the alias `s`. */
export const SCOPE_COLUMNS = `
  s.id, s.company_id, s.number, s.status, s.created_by, s.draft_version, s.revision, s.title, s.mode, s.due_at,
  s.extensions, s.time_zone, s.city, s.state, s.lat, s.lon, s.methods, s.indoors, s.inch_feet, s.totals, s.sketch, s.cut_count,
  s.plugs, s.published_at, s.opened_at, s.closed_reason, s.seq, s.bid_seq, s.created_at, s.updated_at`;

/** The row every move of a scope and every bid on it waits for: lock order is scope, bid, account. */
export const LOCK_SCOPE = `SELECT ${SCOPE_COLUMNS} FROM scope s WHERE s.id = $1 FOR UPDATE`;

export const BUMP_SCOPE = `
  UPDATE scope SET seq = seq + 1, updated_at = app_now() WHERE id = $1 RETURNING seq`;

export const BUMP_BIDS = `UPDATE scope SET bid_seq = bid_seq + 1 WHERE id = $1 RETURNING bid_seq`;

/** $2: a revision, or null for the newest. */
export const PUBLISHED = `
  SELECT ${SCOPE_COLUMNS}, r.revision AS read_revision, r.body AS read_body, r.totals AS read_totals
  FROM scope s JOIN scope_revision r ON r.scope_id = s.id AND r.revision = coalesce($2::integer, s.revision)
  WHERE s.id = $1`;

/** Only a move that the scope's machine allows from the state at hand changes a row. */
export const MOVE_SCOPE = `
  UPDATE scope SET status = $3, closed_reason = coalesce($4, closed_reason), seq = seq + 1, updated_at = app_now()
  WHERE id = $1 AND status = $2 RETURNING seq`;

/**
 * How much of a scope a cutting contractor may see: `sees_all` with a yard within whose service radius the site
 * lies, or with an own bid, thread or subcontract. $1 scope, $2 company.
 */
export const SIGHT = `
  SELECT s.company_id, s.status,
    coalesce(2 * 3958.8 * asin(least(1, (s.place <-> y.place) / 2)) <= y.service_radius_mi, false)
    OR EXISTS (SELECT FROM sealed_bid b WHERE b.scope_id = s.id AND b.company_id = $2)
    OR EXISTS (SELECT FROM bid b WHERE b.scope_id = s.id AND b.company_id = $2)
    OR EXISTS (SELECT FROM thread t WHERE t.scope_id = s.id AND t.crew_company_id = $2)
    OR EXISTS (SELECT FROM subcontract c WHERE c.scope_id = s.id AND c.crew_company_id = $2) AS sees_all
  FROM scope s
  LEFT JOIN LATERAL (
    SELECT c.service_radius_mi, CASE WHEN c.yard_lat IS NOT NULL AND c.yard_lon IS NOT NULL THEN cube(ARRAY[
        cos(radians(c.yard_lat)) * cos(radians(c.yard_lon)),
        cos(radians(c.yard_lat)) * sin(radians(c.yard_lon)),
        sin(radians(c.yard_lat))
      ]) END AS place
    FROM company c WHERE c.id = $2
  ) y ON true
  WHERE s.id = $1`;

export const YARD = `SELECT yard_lat, yard_lon, service_radius_mi, methods FROM company WHERE id = $1`;

/** Scopes come due, and awarded, of some companies: whether bidding there leads anywhere. */
export const GC_RECORDS = `
  SELECT company_id, count(*) AS due, count(*) FILTER (WHERE status = 'awarded') AS awarded
  FROM scope
  WHERE company_id = ANY ($1::uuid[]) AND status IN ('due', 'awarded', 'closed_without_award')
  GROUP BY company_id`;

/** Scopes that show a file, which a rule then looks at one by one. */
export const SCOPES_OF_FILE = `
  SELECT f.scope_id FROM scope_file f JOIN scope s ON s.id = f.scope_id
  WHERE f.file_id = $1 AND s.status NOT IN ('draft', 'discarded')`;
