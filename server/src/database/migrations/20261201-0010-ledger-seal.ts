import type { Migration } from '../migrator.ts';

/** A chain of hashes over the ledger's history: whoever rewrites an entry past the database's own rules breaks it. */
export const ledgerSeal: Migration = {
  name: '20261201-0010-ledger-seal',
  up: `
    -- In the order of sealing, not of entry numbers: a number is taken before its transaction commits, so a lower one
    -- may appear after a higher one has been sealed.
    CREATE TABLE ledger_seal (
      position bigint PRIMARY KEY CHECK (position > 0),
      entry_id uuid NOT NULL UNIQUE REFERENCES ledger_entry (id),
      previous bytea NOT NULL UNIQUE,
      hash bytea NOT NULL UNIQUE,
      sealed_at timestamptz(3) NOT NULL DEFAULT app_now()
    );
    CREATE TRIGGER ledger_seal_append_only BEFORE UPDATE OR DELETE OR TRUNCATE ON ledger_seal
      FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
  `,
  down: `DROP TABLE ledger_seal;`,
};
