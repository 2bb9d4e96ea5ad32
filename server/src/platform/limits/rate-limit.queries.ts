/**
 * $1 keys, $2 window lengths in seconds (one each): counts one more in the running window of each. Ordered, so that
 * two requests with keys in common never wait for each other in a circle. By real time, not `app_now()`.
 */
export const COUNT_HIT = `
  INSERT INTO rate_limit (key, window_start, hits)
  SELECT key, to_timestamp(floor(extract(epoch FROM clock_timestamp()) / seconds) * seconds), 1
  FROM unnest($1::text[], $2::integer[]) AS wanted (key, seconds)
  ORDER BY key
  ON CONFLICT (key, window_start) DO UPDATE SET hits = rate_limit.hits + 1
  RETURNING key, hits, extract(epoch FROM clock_timestamp() - window_start)::float8 AS age_seconds`;

export const FORGET_HITS = `DELETE FROM rate_limit WHERE key = ANY($1::text[])`;

export const DELETE_OLD_HITS = `DELETE FROM rate_limit WHERE window_start < clock_timestamp() - interval '2 days'`;
