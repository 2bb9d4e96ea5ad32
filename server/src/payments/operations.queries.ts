export const INSERT_OPERATION = `
  INSERT INTO provider_operation (id, kind, status, subject_type, subject_id, params)
  VALUES ($1, $2, 'requested', $3, $4, $5)`;

/** Take an operation to try it; settled ones answer no row, so a repeated job does nothing. */
export const BEGIN_ATTEMPT = `
  UPDATE provider_operation
  SET attempts = attempts + 1, first_tried_at = coalesce(first_tried_at, app_now())
  WHERE id = $1 AND status IN ('requested', 'unknown')
  RETURNING id, kind, status, subject_type, subject_id, params, attempts,
    first_tried_at < app_now() - interval '24 hours' AS key_may_be_gone`;

export const LOCK_OPERATION = `SELECT id, status FROM provider_operation WHERE id = $1 FOR UPDATE`;

export const SETTLE_OPERATION = `
  UPDATE provider_operation
  SET status = $2, provider_object_id = $3, error = $4, settled_at = app_now()
  WHERE id = $1`;

export const OPERATION_IS_UNKNOWN = `
  UPDATE provider_operation SET status = 'unknown', error = $2 WHERE id = $1 AND status IN ('requested', 'unknown')`;

export const NOTE_OPERATION_ERROR = `UPDATE provider_operation SET error = $2 WHERE id = $1`;

export const OPEN_OPERATIONS = `
  SELECT id FROM provider_operation
  WHERE status IN ('requested', 'unknown') AND created_at < app_now() - interval '2 minutes'
  ORDER BY created_at LIMIT 200`;

export const RECENT_OPERATIONS = `
  SELECT id, kind, status, attempts, created_at, error FROM provider_operation ORDER BY created_at DESC LIMIT 100`;
