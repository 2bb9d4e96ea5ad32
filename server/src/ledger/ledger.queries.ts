export const ENSURE_ACCOUNTS = `
  INSERT INTO ledger_account (book, code, kind, may_be_negative, subcontract_id, company_id, sov_line_id)
  SELECT * FROM jsonb_to_recordset($1::jsonb)
    AS x(book text, code text, kind text, may_be_negative boolean, subcontract_id uuid, company_id uuid, sov_line_id uuid)
  ORDER BY code
  ON CONFLICT (code) DO NOTHING`;

export const ACCOUNT_IDS = `SELECT id, code FROM ledger_account WHERE code = ANY ($1::text[])`;

export const LOCK_ACCOUNTS = `SELECT ledger_lock_accounts($1::bigint[])`;

export const INSERT_ENTRY = `
  INSERT INTO ledger_entry (id, book, event, idempotency_key, request_hash, provider_object_id, provider_event_kind, subcontract_id, memo)
  VALUES ($1, $2, $3, $4, $5, $6, $7, $8, $9)
  ON CONFLICT (idempotency_key) DO NOTHING
  RETURNING id`;

export const ENTRY_BY_KEY = `SELECT id, request_hash FROM ledger_entry WHERE idempotency_key = $1`;

export const INSERT_POSTINGS = `
  INSERT INTO ledger_posting (entry_id, line, account_id, amount_cents)
  SELECT $1, line, account_id, amount_cents
  FROM unnest($2::int[], $3::bigint[], $4::bigint[]) AS x(line, account_id, amount_cents)`;

export const TRIAL_BALANCE = `
  SELECT book, code, kind, balance_cents FROM ledger_account ORDER BY book, code`;

/** Each of these finds rows only when an invariant is broken. */
export const BOOK_CHECKS = {
  'B-I1': {
    name: 'every entry sums to zero and has two lines or more',
    sql: `
      SELECT e.id::text AS subject FROM ledger_entry e LEFT JOIN ledger_posting p ON p.entry_id = e.id
      GROUP BY e.id HAVING count(p.*) < 2 OR coalesce(sum(p.amount_cents), 0) <> 0`,
  },
  'B-I2': {
    name: 'each book sums to zero',
    sql: `SELECT book AS subject FROM ledger_account GROUP BY book HAVING sum(balance_cents) <> 0`,
  },
  'B-I3': {
    name: 'no protected account is overdrawn',
    sql: `
      SELECT code AS subject FROM ledger_account WHERE NOT may_be_negative
        AND ((kind IN ('asset', 'expense') AND balance_cents < 0) OR (kind IN ('liability', 'income') AND balance_cents > 0))`,
  },
  'B-I4': {
    name: 'each balance is the sum of its postings',
    sql: `
      SELECT a.code AS subject FROM ledger_account a LEFT JOIN ledger_posting p ON p.account_id = a.id
      GROUP BY a.id HAVING a.balance_cents <> coalesce(sum(p.amount_cents), 0)`,
  },
  'B-I5': {
    name: 'what was set aside for a subcontract is held, retained, payable, transferred or a fee',
    sql: `
      WITH funded AS (
        SELECT subcontract_id, sum(amount_cents) AS cents FROM funding WHERE status = 'succeeded' GROUP BY subcontract_id
      ), liable AS (
        SELECT subcontract_id, -sum(balance_cents) AS cents FROM ledger_account
        WHERE kind = 'liability' AND book = 'platform' AND subcontract_id IS NOT NULL GROUP BY subcontract_id
      ), transferred AS (
        SELECT e.subcontract_id, sum(p.amount_cents) AS cents
        FROM ledger_entry e JOIN ledger_posting p ON p.entry_id = e.id JOIN ledger_account a ON a.id = p.account_id
        WHERE e.event = 'E08' AND a.code LIKE 'crew_payable:%' GROUP BY e.subcontract_id
      ), fees AS (
        SELECT e.subcontract_id, -sum(p.amount_cents) AS cents
        FROM ledger_entry e JOIN ledger_posting p ON p.entry_id = e.id JOIN ledger_account a ON a.id = p.account_id
        WHERE a.code = 'platform_fee' GROUP BY e.subcontract_id
      )
      SELECT f.subcontract_id::text AS subject
      FROM funded f LEFT JOIN liable l USING (subcontract_id) LEFT JOIN transferred t USING (subcontract_id) LEFT JOIN fees x USING (subcontract_id)
      WHERE f.cents <> coalesce(l.cents, 0) + coalesce(t.cents, 0) + coalesce(x.cents, 0)`,
  },
  'B-I6': {
    name: 'what we have covers all we owe to general contractors and crews',
    sql: `
      SELECT 'solvency' AS subject FROM ledger_account WHERE book = 'platform'
      HAVING coalesce(sum(balance_cents) FILTER (WHERE code IN ('stripe_pending', 'stripe_available')), 0)
        + coalesce(sum(balance_cents) FILTER (WHERE kind = 'liability'), 0) < 0`,
  },
  'B-I8': {
    name: 'every succeeded funding and transfer has its entry',
    sql: `
      SELECT f.id::text AS subject FROM funding f LEFT JOIN ledger_entry e ON e.provider_object_id = f.charge_id AND e.event = 'E01'
      WHERE f.status = 'succeeded' AND e.id IS NULL
      UNION ALL
      SELECT t.transfer_id FROM release_transfer t LEFT JOIN ledger_entry e ON e.provider_object_id = t.transfer_id AND e.event = 'E08'
      WHERE t.transfer_id IS NOT NULL AND e.id IS NULL`,
  },
  'B-I9': {
    name: 'transfers never exceed the charge they draw on',
    sql: `
      SELECT f.id::text AS subject FROM funding f JOIN release_transfer t ON t.funding_id = f.id
      GROUP BY f.id HAVING sum(t.amount_cents) > f.amount_cents + f.platform_charge_cents`,
  },
} as const;
