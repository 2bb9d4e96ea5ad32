/**
 * Sessions live by the database's real time, not by `app_now()`: moving the demo's clock signs nobody out, and no
 * moved clock keeps a session alive.
 */
export const live = (idleSeconds: '$2' | '$3') => `s.ended_at IS NULL AND s.expires_at > clock_timestamp()
  AND s.last_used_at > clock_timestamp() - ${idleSeconds} * interval '1 second'`;

export const INSERT_SESSION = `
  INSERT INTO session (id, user_id, refresh_hash, created_at, last_used_at, expires_at, ip, user_agent)
  VALUES ($1, $2, $3, clock_timestamp(), clock_timestamp(), clock_timestamp() + $4 * interval '1 second', $5, $6)`;

export interface SessionRow {
  id: string;
  user_id: string;
  refresh_hash: Buffer;
  previous_hash: Buffer | null;
  successor_sealed: Buffer | null;
  is_live: boolean;
  is_in_grace: boolean;
}

/** $1 session, $2 grace seconds, $3 idle seconds. The clock is read after the lock is held: see SELECT_SESSION_STATE. */
export const LOCK_SESSION = `SELECT id FROM session WHERE id = $1 FOR UPDATE`;

export const SELECT_SESSION_STATE = `
  SELECT s.id, s.user_id, s.refresh_hash, s.previous_hash, s.successor_sealed,
    (${live('$3')} AND EXISTS (SELECT 1 FROM app_user u WHERE u.id = s.user_id AND u.deactivated_at IS NULL)) AS is_live,
    coalesce(s.rotated_at > clock_timestamp() - $2 * interval '1 second', false) AS is_in_grace
  FROM session s WHERE s.id = $1`;

export const ROTATE_SESSION = `
  UPDATE session SET previous_hash = refresh_hash, refresh_hash = $2, successor_sealed = $3,
    rotated_at = clock_timestamp(), last_used_at = clock_timestamp()
  WHERE id = $1`;

export const TOUCH_SESSION = `UPDATE session SET last_used_at = clock_timestamp() WHERE id = $1`;

/** $1 session, $2 why. Gives the user when it was still open. */
export const END_SESSION = `
  UPDATE session SET ended_at = clock_timestamp(), ended_because = $2, successor_sealed = NULL
  WHERE id = $1 AND ended_at IS NULL RETURNING user_id`;

/** $1 sessions that hold a socket open, $2 idle seconds: those that may no longer. */
export const SELECT_DEAD_SESSIONS = `
  SELECT id FROM unnest($1::uuid[]) AS open (id)
  WHERE NOT EXISTS (
    SELECT 1 FROM session s JOIN app_user u ON u.id = s.user_id
    WHERE s.id = open.id AND u.deactivated_at IS NULL AND ${live('$2')})`;

export interface ProofRow {
  is_recent: boolean;
  has_second_factor: boolean;
}
/** $1 session, $2 seconds: whether its holder said lately who they are, and by what they can. */
export const SELECT_PROOF = `
  SELECT s.proved_at > clock_timestamp() - $2 * interval '1 second' AS is_recent,
    EXISTS (SELECT 1 FROM second_factor f WHERE f.user_id = s.user_id AND f.confirmed_at IS NOT NULL) AS has_second_factor
  FROM session s WHERE s.id = $1`;

export const PROVE_SESSION = `UPDATE session SET proved_at = clock_timestamp() WHERE id = $1`;

/** $1 user, $2 the session that stays (or null), $3 why. */
export const END_SESSIONS_OF = `
  UPDATE session SET ended_at = clock_timestamp(), ended_because = $3, successor_sealed = NULL
  WHERE user_id = $1 AND id IS DISTINCT FROM $2::uuid AND ended_at IS NULL RETURNING id`;

/** $1 session, $2 its user. */
export const SELECT_OWN_SESSION = `SELECT id FROM session WHERE id = $1 AND user_id = $2 AND ended_at IS NULL`;

export interface OwnSessionRow {
  id: string;
  ip: string;
  user_agent: string;
  created_at: Date;
  last_used_at: Date;
}
/** $1 user, $2 idle seconds. */
export const SELECT_OWN_SESSIONS = `
  SELECT s.id, s.ip, s.user_agent, s.created_at, s.last_used_at FROM session s
  WHERE s.user_id = $1 AND ${live('$2')} ORDER BY s.last_used_at DESC, s.id LIMIT 100`;

export interface SessionEndRow {
  idle_end: Date;
  expires_at: Date;
}
/** $1 session, $2 idle seconds. */
export const SELECT_SESSION_END = `
  SELECT last_used_at + $2 * interval '1 second' AS idle_end, expires_at FROM session WHERE id = $1`;
