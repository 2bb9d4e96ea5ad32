/** One sealer at a time, also of two servers; any constant number will do. */
export const LOCK_SEALER = `SELECT pg_advisory_xact_lock(460002)`;

export const LAST_SEAL = `SELECT position, hash FROM ledger_seal ORDER BY position DESC LIMIT 1`;

/** What is hashed of an entry: everything that is said once and never changes, with its lines in their order. */
const CONTENT = `
  e.id, e.number, e.book, e.event, e.idempotency_key, e.request_hash, e.provider_object_id, e.provider_event_kind,
  e.subcontract_id, e.reverses_entry_id, e.memo, e.posted_at,
  (SELECT jsonb_agg(jsonb_build_array(p.line, a.code, p.currency, p.amount_cents::text) ORDER BY p.line)
   FROM ledger_posting p JOIN ledger_account a ON a.id = p.account_id WHERE p.entry_id = e.id) AS lines`;

export const UNSEALED_ENTRIES = `
  SELECT ${CONTENT} FROM ledger_entry e
  WHERE NOT EXISTS (SELECT 1 FROM ledger_seal s WHERE s.entry_id = e.id)
  ORDER BY e.number LIMIT $1`;

export const UNSEALED_COUNT = `
  SELECT count(*)::int AS entries FROM ledger_entry e
  WHERE NOT EXISTS (SELECT 1 FROM ledger_seal s WHERE s.entry_id = e.id)`;

export const INSERT_SEALS = `
  INSERT INTO ledger_seal (position, entry_id, previous, hash)
  SELECT x.position, x.entry_id, x.previous, x.hash
  FROM unnest($1::bigint[], $2::uuid[], $3::bytea[], $4::bytea[]) AS x(position, entry_id, previous, hash)`;

/** Seals after $1 with the entries as they stand now; an entry that is gone leaves its columns null. */
export const SEALED_ENTRIES = `
  SELECT s.position, s.previous, s.hash, s.entry_id, ${CONTENT}
  FROM ledger_seal s LEFT JOIN ledger_entry e ON e.id = s.entry_id
  WHERE s.position > $1 ORDER BY s.position LIMIT $2`;

export const SEAL_AT = `SELECT position, hash FROM ledger_seal WHERE position = $1`;
