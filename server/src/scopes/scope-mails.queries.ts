export const MAIL_FACTS = `
  SELECT s.title, s.city, s.state, s.status, s.mode, s.due_at, s.time_zone, s.cut_count, c.name AS company_name,
    (SELECT count(*) FROM bid b WHERE b.scope_id = s.id AND b.status = 'opened') AS opened
  FROM scope s JOIN company c ON c.id = s.company_id
  WHERE s.id = $1`;
