export interface SecondFactorRow {
  secret_sealed: Buffer;
  is_confirmed: boolean;
}

export const LOCK_SECOND_FACTOR = `
  SELECT secret_sealed, confirmed_at IS NOT NULL AS is_confirmed FROM second_factor WHERE user_id = $1 FOR UPDATE`;

export interface SecondFactorStateRow {
  is_set: boolean;
  recovery_codes_left: number;
}
export const SELECT_SECOND_FACTOR_STATE = `
  SELECT EXISTS (SELECT 1 FROM second_factor f WHERE f.user_id = $1 AND f.confirmed_at IS NOT NULL) AS is_set,
    (SELECT count(*)::int FROM recovery_code r WHERE r.user_id = $1 AND r.used_at IS NULL) AS recovery_codes_left`;

/** Begins, or begins anew while nothing is confirmed. No row when there is a confirmed one. */
export const BEGIN_SECOND_FACTOR = `
  INSERT INTO second_factor (user_id, secret_sealed) VALUES ($1, $2)
  ON CONFLICT (user_id) DO UPDATE SET secret_sealed = $2, last_step = 0, created_at = clock_timestamp()
    WHERE second_factor.confirmed_at IS NULL
  RETURNING user_id`;

export const CONFIRM_SECOND_FACTOR = `
  UPDATE second_factor SET confirmed_at = clock_timestamp(), last_step = $2
  WHERE user_id = $1 AND confirmed_at IS NULL RETURNING user_id`;

/** $2 step. The row is the proof of single use: no row when a code of this step or a later one was taken. */
export const TAKE_STEP = `
  UPDATE second_factor SET last_step = $2 WHERE user_id = $1 AND confirmed_at IS NOT NULL AND last_step < $2
  RETURNING user_id`;

export const TAKE_RECOVERY_CODE = `
  UPDATE recovery_code SET used_at = clock_timestamp() WHERE user_id = $1 AND code_hash = $2 AND used_at IS NULL
  RETURNING user_id`;

export const DELETE_RECOVERY_CODES = `DELETE FROM recovery_code WHERE user_id = $1`;
export const INSERT_RECOVERY_CODES = `INSERT INTO recovery_code (user_id, code_hash) SELECT $1, unnest($2::bytea[])`;
export const DELETE_SECOND_FACTOR = `DELETE FROM second_factor WHERE user_id = $1 AND confirmed_at IS NOT NULL RETURNING user_id`;
