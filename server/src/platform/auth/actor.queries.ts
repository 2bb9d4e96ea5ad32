import { live } from './session.queries.ts';

export interface ActorRow {
  user_id: string;
  name: string;
  is_staff: boolean;
  company_id: string | null;
  company_kind: 'general_contractor' | 'cutting_contractor' | null;
  company_name: string | null;
  role: 'owner' | 'accounts' | 'manager' | 'field' | null;
  sign_limit_cents: string | null;
  set_aside_limit_cents: string | null;
  change_limit_cents: string | null;
}

/** $1 session, $2 user, $3 idle seconds. One query a request: session, person, membership, company. */
export const SELECT_ACTOR_OF_SESSION = `
  SELECT u.id AS user_id, u.name, u.is_staff, c.id AS company_id, c.kind AS company_kind, c.name AS company_name,
    m.role, m.sign_limit_cents, m.set_aside_limit_cents, m.change_limit_cents
  FROM session s
  JOIN app_user u ON u.id = s.user_id
  LEFT JOIN membership m ON m.user_id = u.id
  LEFT JOIN company c ON c.id = m.company_id
  WHERE s.id = $1 AND s.user_id = $2 AND ${live('$3')}
    AND u.deactivated_at IS NULL AND u.email_verified_at IS NOT NULL`;
