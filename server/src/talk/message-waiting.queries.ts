/**
 * Whom a thread concerns at one side: those who wrote in it, or while nobody has, the owners and managers.
 * `me` is the membership, `t` the thread.
 */
const CONCERNED = `(
  EXISTS (SELECT 1 FROM message own WHERE own.thread_id = t.id AND own.author_id = me.user_id)
  OR (me.role IN ('owner', 'manager')
      AND NOT EXISTS (SELECT 1 FROM message own WHERE own.thread_id = t.id AND own.company_id = me.company_id)))`;

/** $1 the thread, $2 the company that did not write. */
export const PEOPLE_CONCERNED = `
  SELECT me.user_id
  FROM thread t
  JOIN membership me ON me.company_id = $2
  JOIN app_user u ON u.id = me.user_id AND u.deactivated_at IS NULL AND u.email_verified_at IS NOT NULL
  WHERE t.id = $1 AND ${CONCERNED}
  ORDER BY me.user_id`;

/** Messages of the other side that a person has not seen and nobody of the company has answered, by thread. */
export const WAITING_THREADS = `
  SELECT t.id, s.title, writer.name AS company, count(*) AS count, min(m.sent_at) AS oldest
  FROM membership me
  JOIN thread t ON t.gc_company_id = me.company_id OR t.crew_company_id = me.company_id
  JOIN scope s ON s.id = t.scope_id
  JOIN message m ON m.thread_id = t.id AND m.company_id <> me.company_id
  JOIN company writer ON writer.id = m.company_id
  LEFT JOIN thread_read r ON r.thread_id = t.id AND r.user_id = me.user_id
  WHERE me.user_id = $1 AND m.seq > coalesce(r.seq, 0) AND ${CONCERNED}
    AND NOT EXISTS (
      SELECT 1 FROM message answer
      WHERE answer.thread_id = t.id AND answer.company_id = me.company_id AND answer.seq > m.seq)
  GROUP BY t.id, s.title, writer.name
  ORDER BY min(m.sent_at), t.id`;

/** Ask for a mail unless one is asked for already; an hour-old request that nothing came of does not block. */
export const ASK_FOR_NOTICE = `
  INSERT INTO message_notice AS n (user_id, due_at) VALUES ($1, app_now() + $2 * interval '1 millisecond')
  ON CONFLICT (user_id) DO UPDATE
    SET due_at = greatest(app_now() + $2 * interval '1 millisecond', n.mailed_at + $3 * interval '1 millisecond')
    WHERE n.due_at IS NULL OR n.due_at < app_now() - interval '1 hour'
  RETURNING extract(epoch FROM n.due_at - app_now()) * 1000 AS wait_ms`;

export const LOCK_NOTICE = `SELECT mail_id FROM message_notice WHERE user_id = $1 FOR UPDATE`;

export const NOTICE_DROPPED = `UPDATE message_notice SET due_at = NULL WHERE user_id = $1`;

export const NOTICE_PUT_OFF = `UPDATE message_notice SET due_at = $2 WHERE user_id = $1`;

export const NOTICE_MAILED = `
  UPDATE message_notice SET due_at = NULL, mailed_at = app_now(), mail_id = $2 WHERE user_id = $1`;
