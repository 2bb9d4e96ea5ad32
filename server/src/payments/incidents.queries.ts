export const OPEN_INCIDENT = `
  INSERT INTO incident (id, kind, subject, detail) VALUES ($1, $2, $3, $4)
  ON CONFLICT (kind, subject) DO NOTHING`;

export const RECENT_INCIDENTS = `
  SELECT id, kind, subject, detail, opened_at, closed_at FROM incident ORDER BY opened_at DESC LIMIT 100`;
