export const COMPLETION_WITH_LINES = `
  SELECT c.id, c.subcontract_id, c.status, array_agg(l.sov_line_id ORDER BY l.sov_line_id) AS sov_line_ids
  FROM completion c JOIN completion_line l ON l.completion_id = c.id
  WHERE c.id = $1 GROUP BY c.id`;

export const COMPLETION_RELEASED = `
  UPDATE completion SET status = 'released' WHERE id = $1 AND status = 'accepted' RETURNING subcontract_id`;

/** Complete once every line that carries money has been released. */
export const COMPLETE_SUBCONTRACT = `
  UPDATE subcontract s SET status = 'completed', updated_at = app_now()
  WHERE s.id = $1 AND s.status = 'active' AND NOT EXISTS (
    SELECT 1 FROM sov_line v WHERE v.subcontract_id = s.id AND v.amount_cents > 0 AND NOT EXISTS (
      SELECT 1 FROM completion_line l JOIN completion c ON c.id = l.completion_id
      WHERE l.sov_line_id = v.id AND c.status = 'released'
    )
  )`;
