import type { CompanyKind } from '@kerfyard/common/people';

export interface CredentialsRow {
  id: string;
  password_hash: string;
  may_sign_in: boolean;
  /** Whether this address (of the network) was used by this person's own sessions before. */
  is_known_address: boolean;
  has_second_factor: boolean;
}

/** $1 e-mail, $2 network address. */
export const SELECT_CREDENTIALS = `
  SELECT u.id, u.password_hash, (u.email_verified_at IS NOT NULL AND u.deactivated_at IS NULL) AS may_sign_in,
    EXISTS (SELECT 1 FROM session s WHERE s.user_id = u.id AND s.ip = $2
      AND s.created_at > clock_timestamp() - interval '90 days') AS is_known_address,
    EXISTS (SELECT 1 FROM second_factor f WHERE f.user_id = u.id AND f.confirmed_at IS NOT NULL) AS has_second_factor
  FROM app_user u WHERE u.email = $1`;

export const INSERT_SIGN_UP = `
  INSERT INTO sign_up (id, email, name, password_hash, company_kind, company_name, company_phone, token_hash,
    expires_at, created_at)
  VALUES ($1, $2, $3, $4, $5, $6, $7, $8, clock_timestamp() + $9 * interval '1 second', clock_timestamp())`;

export interface SignUpRow {
  id: string;
  email: string;
  name: string;
  password_hash: string;
  company_kind: CompanyKind;
  company_name: string;
  company_phone: string;
}

/** The row is the proof of single use: of two requests with one token, one finds it unused. */
export const USE_SIGN_UP = `
  UPDATE sign_up SET used_at = clock_timestamp()
  WHERE token_hash = $1 AND used_at IS NULL AND expires_at > clock_timestamp()
  RETURNING id, email, name, password_hash, company_kind, company_name, company_phone`;

/** The other sign-ups of an address that now has its account, and their passwords, are done with. */
export const CLOSE_SIGN_UPS = `UPDATE sign_up SET used_at = clock_timestamp() WHERE email = $1 AND used_at IS NULL`;

export const DELETE_OLD_SIGN_UPS = `DELETE FROM sign_up WHERE expires_at < clock_timestamp() - interval '1 day'`;

export interface WaitingSignUpRow {
  name: string;
  email: string;
  company_name: string;
  has_account: boolean;
  is_open: boolean;
}
export const SELECT_WAITING_SIGN_UP = `
  SELECT s.name, s.email, s.company_name, (s.used_at IS NULL AND s.expires_at > clock_timestamp()) AS is_open,
    EXISTS (SELECT 1 FROM app_user u WHERE u.email = s.email) AS has_account
  FROM sign_up s WHERE s.id = $1`;

/** No row when the address has an account already. */
export const INSERT_USER = `
  INSERT INTO app_user (id, email, name, password_hash, is_staff, email_verified_at)
  VALUES ($1, $2, $3, $4, $5, app_now()) ON CONFLICT (email) DO NOTHING RETURNING id`;

export const SELECT_EMAIL = `SELECT email FROM app_user WHERE id = $1`;

/** $1 user, $2 company: messages of others in this company's threads that this person has not read. */
export const COUNT_UNREAD = `
  SELECT count(*) AS messages
  FROM thread t
  JOIN message m ON m.thread_id = t.id AND m.company_id <> $2
  LEFT JOIN thread_read r ON r.thread_id = t.id AND r.user_id = $1
  WHERE $2 IN (t.gc_company_id, t.crew_company_id) AND m.seq > coalesce(r.seq, 0)`;
