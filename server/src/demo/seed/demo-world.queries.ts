/** All of these run as the owner role: what no person may do. */
export const NOW = `SELECT app_now() AS now`;
export const MOVE_CLOCK = `UPDATE app_clock SET offset_ms = $1`;
export const NEWEST_SIGN_UP = `SELECT id FROM sign_up WHERE email = $1 ORDER BY id DESC LIMIT 1`;
export const PAYOUT_ACCOUNT = `SELECT payout_account_id FROM company WHERE id = $1`;

/** A further person with the demo's one password, whose hash the first person's row holds. */
export const COPY_PERSON = `
  INSERT INTO app_user (id, email, name, password_hash, is_staff, email_verified_at)
  SELECT $1, $2, $3, password_hash, $4, app_now() FROM app_user ORDER BY id LIMIT 1`;

export const ADD_MEMBER = `
  INSERT INTO membership (user_id, company_id, role, set_aside_limit_cents)
  SELECT id, $2, $3, $4 FROM app_user WHERE email = $1`;

export const INSERT_DEMO_PERSON = `
  INSERT INTO demo_person (key, user_id, position) SELECT $1, id, $3 FROM app_user WHERE email = $2`;

export const IS_EMPTY = `SELECT NOT EXISTS (SELECT 1 FROM app_user) AS is_empty`;
