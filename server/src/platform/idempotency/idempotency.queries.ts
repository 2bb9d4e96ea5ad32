/** $1 owner, $2 key, $3 route, $4 HMAC of the input. No row when the key was used before. */
export const CLAIM_KEY = `
  INSERT INTO idempotency_key (company_id, key, route, input_hmac, created_at)
  VALUES ($1, $2, $3, $4, clock_timestamp()) ON CONFLICT DO NOTHING RETURNING key`;

/**
 * $5 seconds: a server that died in the middle left its claim open; after this long the next try takes it over. What
 * the first try did or did not do, the handler's own constraints tell.
 */
export const TAKE_OVER_KEY = `
  UPDATE idempotency_key SET created_at = clock_timestamp()
  WHERE company_id = $1 AND key = $2 AND route = $3 AND input_hmac = $4 AND status IS NULL
    AND created_at < clock_timestamp() - $5 * interval '1 second' RETURNING key`;

export interface KeyRow {
  route: string;
  input_hmac: Buffer;
  status: number | null;
  response: unknown;
}
export const SELECT_KEY = `
  SELECT route, input_hmac, status, response FROM idempotency_key WHERE company_id = $1 AND key = $2`;

export const FINISH_KEY = `UPDATE idempotency_key SET status = $3, response = $4 WHERE company_id = $1 AND key = $2`;

export const RELEASE_KEY = `DELETE FROM idempotency_key WHERE company_id = $1 AND key = $2 AND status IS NULL`;

export const DELETE_OLD_KEYS = `DELETE FROM idempotency_key WHERE created_at < clock_timestamp() - interval '2 days'`;
