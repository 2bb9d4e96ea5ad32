export const INSERT_EVENT = `
  INSERT INTO stripe_event (id, type, account, created, payload)
  VALUES ($1, $2, $3, $4, $5)
  ON CONFLICT (id) DO NOTHING
  RETURNING id`;

export const EVENT_BY_ID = `SELECT id, type, account, payload, status FROM stripe_event WHERE id = $1`;

export const EVENT_DONE = `
  UPDATE stripe_event SET status = $2, processed_at = app_now(), error = NULL, attempts = attempts + 1 WHERE id = $1`;

export const EVENT_PARKED = `
  UPDATE stripe_event SET status = 'parked', error = $2, attempts = attempts + 1 WHERE id = $1 AND status IN ('received', 'parked')`;

export const LAST_EVENT_CREATED = `SELECT max(created) AS created FROM stripe_event WHERE account IS NULL`;

export const OPEN_EVENTS = `
  SELECT id FROM stripe_event WHERE status IN ('received', 'parked') AND received_at < app_now() - interval '2 minutes'
  ORDER BY received_at LIMIT 200`;
