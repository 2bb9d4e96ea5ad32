/** Bids the general contractor may read, the lowest first. */
export const READABLE_BIDS = `
  SELECT b.id, b.scope_id, b.company_id, c.name AS company_name, b.revision, b.status, b.input, b.priced,
    b.total_cents, b.submitted_by, b.submitted_at, c.yard_lat, c.yard_lon
  FROM bid b JOIN company c ON c.id = b.company_id
  WHERE b.scope_id = $1 AND b.status IN ('in', 'opened')
  ORDER BY b.total_cents, b.submitted_at, b.id`;

export const COUNT_SEALED = `SELECT count(*) AS bids FROM sealed_bid WHERE scope_id = $1 AND status = 'in'`;
export const AWARDED_BID = `SELECT bid_id FROM award WHERE scope_id = $1 AND lapsed_at IS NULL`;
export const SAVE_PLUGS = `UPDATE scope SET plugs = $2, updated_at = app_now() WHERE id = $1`;
