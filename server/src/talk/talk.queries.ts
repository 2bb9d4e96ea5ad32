/** $1 the reader's company, $2 the reader. Unread is what the other side wrote after the last message seen. */
const UNREAD_OF_THREAD = `
  SELECT count(*) AS unread FROM message m
  WHERE m.thread_id = t.id AND m.company_id <> $1
    AND m.seq > coalesce((SELECT r.seq FROM thread_read r WHERE r.thread_id = t.id AND r.user_id = $2), 0)`;

const THREAD_VIEW = `
  SELECT t.id, t.scope_id, t.subcontract_id, s.title, other.id AS other_id, other.name AS other_name,
         coalesce(t.last_message_at, t.created_at) AS active_at,
         last.body AS last_body, last.sent_at AS last_sent_at, last.author_name AS last_author_name, n.unread
  FROM thread t
  JOIN scope s ON s.id = t.scope_id
  JOIN company other ON other.id = CASE WHEN t.gc_company_id = $1 THEN t.crew_company_id ELSE t.gc_company_id END
  LEFT JOIN LATERAL (
    SELECT left(m.body, 200) AS body, m.sent_at, u.name AS author_name
    FROM message m JOIN app_user u ON u.id = m.author_id
    WHERE m.thread_id = t.id ORDER BY m.seq DESC LIMIT 1
  ) last ON true
  CROSS JOIN LATERAL (${UNREAD_OF_THREAD}) n
  WHERE (t.gc_company_id = $1 OR t.crew_company_id = $1)`;

export const THREADS_PAGE = `${THREAD_VIEW}
  AND ($6::uuid IS NULL OR t.scope_id = $6::uuid)
  AND ($3::timestamptz IS NULL OR (coalesce(t.last_message_at, t.created_at), t.id) < ($3::timestamptz, $4::uuid))
  ORDER BY coalesce(t.last_message_at, t.created_at) DESC, t.id DESC LIMIT $5`;

export const THREAD_BY_ID = `${THREAD_VIEW} AND t.id = $3`;

export const UNREAD_TOTAL = `
  SELECT count(*) AS messages
  FROM thread t
  JOIN message m ON m.thread_id = t.id AND m.company_id <> $1
  LEFT JOIN thread_read r ON r.thread_id = t.id AND r.user_id = $2
  WHERE (t.gc_company_id = $1 OR t.crew_company_id = $1) AND m.seq > coalesce(r.seq, 0)`;

/** The thread's own row when $2 is one of its two companies. */
export const THREAD_SIDES = `
  SELECT id, scope_id, gc_company_id, crew_company_id, seq FROM thread
  WHERE id = $1 AND (gc_company_id = $2 OR crew_company_id = $2)`;

export const LOCK_THREAD = `${THREAD_SIDES} FOR UPDATE`;

const MESSAGE_VIEW = `
  SELECT m.id, m.thread_id, m.seq, m.body, m.sent_at, m.author_id, u.name AS author_name, m.company_id, c.name AS company_name,
         coalesce((SELECT array_agg(f.file_id ORDER BY f.position) FROM message_file f WHERE f.message_id = m.id), '{}') AS file_ids
  FROM message m
  JOIN app_user u ON u.id = m.author_id
  JOIN company c ON c.id = m.company_id`;

export const MESSAGES_PAGE = `${MESSAGE_VIEW}
  WHERE m.thread_id = $1 AND ($2::bigint IS NULL OR m.seq < $2::bigint) ORDER BY m.seq DESC LIMIT $3`;

export const MESSAGE_BY_ID = `${MESSAGE_VIEW} WHERE m.id = $1`;

export const INSERT_MESSAGE = `
  INSERT INTO message (id, thread_id, seq, author_id, company_id, body, sent_at) VALUES ($1, $2, $3, $4, $5, $6, $7)`;

export const INSERT_MESSAGE_FILES = `
  INSERT INTO message_file (message_id, file_id, position)
  SELECT $1, f.id, f.position FROM unnest($2::uuid[]) WITH ORDINALITY AS f (id, position)`;

export const MOVE_THREAD_ON = `UPDATE thread SET seq = $2, last_message_at = $3 WHERE id = $1`;

/** Never beyond what was written, never back. */
export const MARK_READ = `
  INSERT INTO thread_read AS r (thread_id, user_id, seq)
  SELECT t.id, $2, least($3::bigint, t.seq) FROM thread t WHERE t.id = $1
  ON CONFLICT (thread_id, user_id) DO UPDATE SET seq = greatest(r.seq, excluded.seq)`;

/** The scope a thread would be about, and what ties a crew to it. Sealed bids are not looked at: they stay unknown. */
export const SCOPE_FOR_THREAD = `
  SELECT s.id, s.company_id, s.status,
         (SELECT t.id FROM thread t WHERE t.scope_id = s.id AND t.crew_company_id = $2) AS thread_id,
         EXISTS (SELECT 1 FROM bid b WHERE b.scope_id = s.id AND b.company_id = $2) AS has_bid,
         (SELECT x.id FROM subcontract x
          WHERE x.scope_id = s.id AND x.crew_company_id = $2 AND x.status <> 'lapsed') AS subcontract_id
  FROM scope s WHERE s.id = $1`;

export const INSERT_THREAD = `
  INSERT INTO thread (id, scope_id, gc_company_id, crew_company_id, subcontract_id) VALUES ($1, $2, $3, $4, $5)
  ON CONFLICT (scope_id, crew_company_id) DO NOTHING`;

export const THREAD_OF_CREW = `SELECT id FROM thread WHERE scope_id = $1 AND crew_company_id = $2`;

/** $1 a file, $2 the reader's company: it hangs at a message of a thread of theirs. */
export const FILE_IN_OWN_THREAD = `
  SELECT 1 AS found FROM message_file f
  JOIN message m ON m.id = f.message_id
  JOIN thread t ON t.id = m.thread_id
  WHERE f.file_id = $1 AND (t.gc_company_id = $2 OR t.crew_company_id = $2) LIMIT 1`;
