import type { CompanyKind, Role } from '@kerfyard/common/people';

export interface DemoPersonRow {
  key: string;
  user_id: string;
  name: string;
  is_staff: boolean;
  company: string | null;
  kind: CompanyKind | null;
  role: Role | null;
}

const PEOPLE = `
  SELECT d.key, u.id AS user_id, u.name, u.is_staff, c.name AS company, c.kind, m.role
  FROM demo_person d
  JOIN app_user u ON u.id = d.user_id
  LEFT JOIN membership m ON m.user_id = u.id
  LEFT JOIN company c ON c.id = m.company_id
  WHERE u.deactivated_at IS NULL`;

export const SELECT_DEMO_PEOPLE = `${PEOPLE} ORDER BY d.position, d.key`;
export const SELECT_DEMO_PERSON = `${PEOPLE} AND d.key = $1`;
