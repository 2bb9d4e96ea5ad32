/** $1 id, $2 e-mail, $3 token's hash, $4 seconds. One statement for addresses with and without an account. */
export const INSERT_RESET = `
  INSERT INTO password_reset (id, email, user_id, token_hash, expires_at)
  SELECT $1::uuid, $2::citext,
    (SELECT u.id FROM app_user u WHERE u.email = $2::citext AND u.deactivated_at IS NULL), $3::bytea,
    clock_timestamp() + $4 * interval '1 second'`;

export interface ResetPersonRow {
  id: string;
  name: string;
  email: string;
}

/** Whom a reset's mail goes to; no row when there is no account, or its address has changed. */
export const SELECT_RESET_ADDRESSEE = `
  SELECT u.id, u.name, u.email FROM password_reset r
  JOIN app_user u ON u.id = r.user_id AND u.email = r.email AND u.deactivated_at IS NULL
  WHERE r.id = $1 AND r.used_at IS NULL AND r.expires_at > clock_timestamp()`;

/** The row is the proof of single use. Bound to the person and the address it was asked for. */
export const USE_RESET = `
  UPDATE password_reset r SET used_at = clock_timestamp() FROM app_user u
  WHERE r.token_hash = $1 AND r.used_at IS NULL AND r.expires_at > clock_timestamp()
    AND u.id = r.user_id AND u.email = r.email AND u.deactivated_at IS NULL
  RETURNING u.id, u.name, u.email`;

export const SELECT_RESET_STATE = `
  SELECT used_at IS NOT NULL AS is_used, expires_at <= clock_timestamp() AS is_expired
  FROM password_reset WHERE token_hash = $1`;

/** $1 user: links that were on their way are done with. */
export const CLOSE_RESETS = `UPDATE password_reset SET used_at = clock_timestamp() WHERE user_id = $1 AND used_at IS NULL`;
export const DROP_EMAIL_CHANGES = `
  UPDATE email_change SET dropped_at = clock_timestamp() WHERE user_id = $1 AND used_at IS NULL AND dropped_at IS NULL`;

export const DELETE_OLD_LINKS = `
  WITH resets AS (DELETE FROM password_reset WHERE expires_at < clock_timestamp() - interval '30 days')
  DELETE FROM email_change WHERE expires_at < clock_timestamp() - interval '30 days'`;

export interface PasswordRow {
  name: string;
  email: string;
  password_hash: string;
}
export const SELECT_PASSWORD = `SELECT name, email, password_hash FROM app_user WHERE id = $1`;
export const SET_PASSWORD = `UPDATE app_user SET password_hash = $2, updated_at = app_now() WHERE id = $1`;

/** $1 id, $2 user, $3 new address, $4 token's hash, $5 seconds. */
export const INSERT_EMAIL_CHANGE = `
  INSERT INTO email_change (id, user_id, old_email, new_email, token_hash, expires_at)
  SELECT $1::uuid, u.id, u.email, $3::citext, $4::bytea, clock_timestamp() + $5 * interval '1 second' FROM app_user u WHERE u.id = $2`;

export interface EmailChangeRow {
  id: string;
  user_id: string;
  name: string;
  old_email: string;
  new_email: string;
  /** Still to be pressed. */
  is_open: boolean;
  is_taken: boolean;
}
export const SELECT_EMAIL_CHANGE = `
  SELECT c.id, c.user_id, u.name, c.old_email, c.new_email,
    (c.used_at IS NULL AND c.dropped_at IS NULL AND c.expires_at > clock_timestamp()) AS is_open,
    EXISTS (SELECT 1 FROM app_user o WHERE o.email = c.new_email AND o.id <> c.user_id) AS is_taken
  FROM email_change c JOIN app_user u ON u.id = c.user_id WHERE c.id = $1`;

/** Bound to the person and to the address it would replace. */
export const USE_EMAIL_CHANGE = `
  UPDATE email_change c SET used_at = clock_timestamp() FROM app_user u
  WHERE c.token_hash = $1 AND c.used_at IS NULL AND c.dropped_at IS NULL AND c.expires_at > clock_timestamp()
    AND u.id = c.user_id AND u.email = c.old_email AND u.deactivated_at IS NULL
  RETURNING c.id, c.user_id, u.name, c.old_email, c.new_email, true AS is_open, false AS is_taken`;

export const SELECT_EMAIL_CHANGE_STATE = `
  SELECT used_at IS NOT NULL AS is_used, (expires_at <= clock_timestamp() OR dropped_at IS NOT NULL) AS is_expired
  FROM email_change WHERE token_hash = $1`;

/** No row when the address has an account by now. */
export const SET_EMAIL = `
  UPDATE app_user SET email = $2::citext, email_verified_at = app_now(), updated_at = app_now()
  WHERE id = $1 AND NOT EXISTS (SELECT 1 FROM app_user o WHERE o.email = $2::citext) RETURNING id`;

export interface AccountRow {
  email: string;
  pending_email: string | null;
}
export const SELECT_ACCOUNT = `
  SELECT u.email, (SELECT c.new_email FROM email_change c
    WHERE c.user_id = u.id AND c.used_at IS NULL AND c.dropped_at IS NULL AND c.expires_at > clock_timestamp()
    ORDER BY c.created_at DESC LIMIT 1) AS pending_email
  FROM app_user u WHERE u.id = $1`;
