/** Those who can still get mail: verified and not deactivated; with their membership, for permissions. */
const PEOPLE = `
  SELECT u.id, u.email, u.name, u.is_staff, m.role, c.id AS company_id, c.kind AS company_kind, c.name AS company_name
  FROM app_user u
  LEFT JOIN membership m ON m.user_id = u.id
  LEFT JOIN company c ON c.id = m.company_id
  WHERE u.deactivated_at IS NULL`;

export const PEOPLE_OF_COMPANY = `${PEOPLE} AND m.company_id = $1 AND u.email_verified_at IS NOT NULL ORDER BY u.id`;

/** One by id; an address not yet verified gets the mail that verifies it, so that is not asked here. */
export const PERSON = `${PEOPLE} AND u.id = $1`;
