import type { CompanyKind, Role } from '@kerfyard/common/people';

export const LOCK_COMPANY = `SELECT id FROM company WHERE id = $1 FOR UPDATE`;

export interface MemberRow {
  id: string;
  name: string;
  email: string;
  role: Role;
  sign_limit_cents: string | null;
  set_aside_limit_cents: string | null;
  change_limit_cents: string | null;
  is_active: boolean;
  has_second_factor: boolean;
}

const MEMBERS = `
  SELECT u.id, u.name, u.email, m.role, m.sign_limit_cents, m.set_aside_limit_cents, m.change_limit_cents,
    u.deactivated_at IS NULL AS is_active,
    EXISTS (SELECT 1 FROM second_factor f WHERE f.user_id = u.id AND f.confirmed_at IS NOT NULL) AS has_second_factor
  FROM membership m JOIN app_user u ON u.id = m.user_id
  WHERE m.company_id = $1`;

export const SELECT_MEMBERS = `${MEMBERS} ORDER BY u.deactivated_at IS NOT NULL, u.name, u.id LIMIT 500`;
export const SELECT_MEMBER = `${MEMBERS} AND u.id = $2`;
export const SELECT_MEMBER_BY_EMAIL = `${MEMBERS} AND u.email = $2`;

/** $1 company, $2 the person who would stop being one. Under the company's lock. */
export const COUNT_OTHER_OWNERS = `
  SELECT count(*)::int AS owners FROM membership m JOIN app_user u ON u.id = m.user_id
  WHERE m.company_id = $1 AND m.user_id <> $2 AND m.role = 'owner' AND u.deactivated_at IS NULL`;

export const UPDATE_MEMBER = `
  UPDATE membership SET role = $3, sign_limit_cents = $4, set_aside_limit_cents = $5, change_limit_cents = $6
  WHERE company_id = $1 AND user_id = $2`;

export const DEACTIVATE = `UPDATE app_user SET deactivated_at = app_now(), updated_at = app_now() WHERE id = $1 AND deactivated_at IS NULL`;
export const REACTIVATE = `UPDATE app_user SET deactivated_at = NULL, updated_at = app_now() WHERE id = $1`;

export interface InvitationRow {
  id: string;
  email: string;
  role: Role;
  sign_limit_cents: string | null;
  set_aside_limit_cents: string | null;
  change_limit_cents: string | null;
  company_id: string;
  company_name: string;
  company_kind: CompanyKind;
  invited_by: string;
  invited_by_id: string;
  expires_at: Date;
  is_used: boolean;
  is_withdrawn: boolean;
  is_expired: boolean;
  has_account: boolean;
}

const INVITATIONS = `
  SELECT i.id, i.email, i.role, i.sign_limit_cents, i.set_aside_limit_cents, i.change_limit_cents, i.company_id,
    c.name AS company_name, c.kind AS company_kind, u.name AS invited_by, i.invited_by AS invited_by_id, i.expires_at,
    i.used_at IS NOT NULL AS is_used, i.withdrawn_at IS NOT NULL AS is_withdrawn,
    i.expires_at <= clock_timestamp() AS is_expired,
    EXISTS (SELECT 1 FROM app_user o WHERE o.email = i.email) AS has_account
  FROM invitation i JOIN company c ON c.id = i.company_id JOIN app_user u ON u.id = i.invited_by`;

/** Those that wait, expired ones too: they can be sent anew or taken off. */
export const SELECT_WAITING_INVITATIONS = `${INVITATIONS}
  WHERE i.company_id = $1 AND i.used_at IS NULL AND i.withdrawn_at IS NULL ORDER BY i.created_at DESC, i.id LIMIT 200`;
export const SELECT_INVITATION = `${INVITATIONS} WHERE i.id = $1`;
export const SELECT_INVITATION_BY_TOKEN = `${INVITATIONS} WHERE i.token_hash = $1`;

export const COUNT_WAITING = `
  SELECT count(*)::int AS waiting FROM invitation WHERE company_id = $1 AND used_at IS NULL AND withdrawn_at IS NULL`;

/** $10 seconds. No row when the id is taken. */
export const INSERT_INVITATION = `
  INSERT INTO invitation (id, company_id, email, role, sign_limit_cents, set_aside_limit_cents, change_limit_cents,
    invited_by, token_hash, expires_at)
  VALUES ($1, $2, $3, $4, $5, $6, $7, $8, $9, clock_timestamp() + $10 * interval '1 second')
  ON CONFLICT (id) DO NOTHING RETURNING id`;

/** $1 company, $2 e-mail: a newer invitation takes their place. */
export const WITHDRAW_FORMER = `
  UPDATE invitation SET withdrawn_at = clock_timestamp()
  WHERE company_id = $1 AND email = $2 AND used_at IS NULL AND withdrawn_at IS NULL`;

export const WITHDRAW_INVITATION = `
  UPDATE invitation SET withdrawn_at = clock_timestamp()
  WHERE company_id = $1 AND id = $2 AND used_at IS NULL AND withdrawn_at IS NULL RETURNING email`;

/** $1 company, $2 person: who may invite no more leaves no way back in. */
export const WITHDRAW_INVITATIONS_BY = `
  UPDATE invitation SET withdrawn_at = clock_timestamp()
  WHERE company_id = $1 AND invited_by = $2 AND used_at IS NULL AND withdrawn_at IS NULL`;

/** The row's lock: of two who accept, the second reads it as used. */
export const LOCK_INVITATION = `SELECT id FROM invitation WHERE token_hash = $1 FOR UPDATE`;

export const USE_INVITATION = `UPDATE invitation SET used_at = clock_timestamp(), accepted_by = $2 WHERE id = $1`;
