import type { Migration } from '../migrator.ts';

/** The ledger, its rules in the database itself, and the provider's operations and events. */
export const money: Migration = {
  name: '20261201-0004-money',
  up: `
    CREATE TABLE ledger_account (
      id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
      book text NOT NULL CHECK (book IN ('platform', 'connect')),
      code text NOT NULL UNIQUE,
      kind text NOT NULL CHECK (kind IN ('asset', 'liability', 'income', 'expense')),
      -- Signed cents, debit positive. An asset or expense is protected from going below zero, the others from going above.
      balance_cents bigint NOT NULL DEFAULT 0,
      may_be_negative boolean NOT NULL DEFAULT false,
      subcontract_id uuid REFERENCES subcontract (id),
      company_id uuid REFERENCES company (id),
      sov_line_id uuid REFERENCES sov_line (id),
      created_at timestamptz(3) NOT NULL DEFAULT app_now(),
      CONSTRAINT ledger_no_overdraft CHECK (
        may_be_negative
        OR (kind IN ('asset', 'expense') AND balance_cents >= 0)
        OR (kind IN ('liability', 'income') AND balance_cents <= 0)
      )
    );
    CREATE INDEX ledger_account_subcontract ON ledger_account (subcontract_id);
    CREATE INDEX ledger_account_company ON ledger_account (company_id);

    CREATE TABLE ledger_entry (
      id uuid PRIMARY KEY,
      number bigint GENERATED ALWAYS AS IDENTITY UNIQUE,
      book text NOT NULL CHECK (book IN ('platform', 'connect')),
      event text NOT NULL,
      idempotency_key text NOT NULL UNIQUE,
      request_hash bytea NOT NULL,
      provider_object_id text,
      provider_event_kind text,
      subcontract_id uuid REFERENCES subcontract (id),
      reverses_entry_id uuid REFERENCES ledger_entry (id),
      memo text NOT NULL DEFAULT '',
      created_tx xid8 NOT NULL DEFAULT pg_current_xact_id(),
      posted_at timestamptz(3) NOT NULL DEFAULT app_now(),
      UNIQUE (provider_object_id, provider_event_kind)
    );
    CREATE UNIQUE INDEX ledger_one_reversal ON ledger_entry (reverses_entry_id) WHERE reverses_entry_id IS NOT NULL;
    CREATE INDEX ledger_entry_subcontract ON ledger_entry (subcontract_id, number);

    CREATE TABLE ledger_posting (
      entry_id uuid NOT NULL REFERENCES ledger_entry (id),
      line integer NOT NULL,
      account_id bigint NOT NULL REFERENCES ledger_account (id),
      currency text NOT NULL DEFAULT 'usd' CHECK (currency = 'usd'),
      amount_cents bigint NOT NULL CHECK (amount_cents <> 0),
      PRIMARY KEY (entry_id, line)
    );
    CREATE INDEX ledger_posting_account ON ledger_posting (account_id);

    CREATE FUNCTION ledger_entry_must_balance() RETURNS trigger LANGUAGE plpgsql AS $$
    DECLARE
      entry uuid;
      lines integer;
      unbalanced integer;
      strangers integer;
    BEGIN
      IF TG_TABLE_NAME = 'ledger_entry' THEN entry := NEW.id; ELSE entry := NEW.entry_id; END IF;
      SELECT count(*) INTO lines FROM ledger_posting WHERE entry_id = entry;
      IF lines < 2 THEN
        RAISE EXCEPTION 'entry % has % line(s); at least two are needed', entry, lines USING ERRCODE = '23514', CONSTRAINT = 'ledger_two_lines';
      END IF;
      SELECT count(*) INTO unbalanced FROM (
        SELECT currency FROM ledger_posting WHERE entry_id = entry GROUP BY currency HAVING sum(amount_cents) <> 0
      ) x;
      IF unbalanced > 0 THEN
        RAISE EXCEPTION 'entry % does not sum to zero', entry USING ERRCODE = '23514', CONSTRAINT = 'ledger_sum_zero';
      END IF;
      SELECT count(*) INTO strangers FROM ledger_posting p JOIN ledger_account a ON a.id = p.account_id JOIN ledger_entry e ON e.id = p.entry_id
        WHERE p.entry_id = entry AND a.book <> e.book;
      IF strangers > 0 THEN
        RAISE EXCEPTION 'entry % mixes books', entry USING ERRCODE = '23514', CONSTRAINT = 'ledger_one_book';
      END IF;
      RETURN NULL;
    END $$;
    CREATE CONSTRAINT TRIGGER ledger_posting_balances AFTER INSERT ON ledger_posting
      DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION ledger_entry_must_balance();
    CREATE CONSTRAINT TRIGGER ledger_entry_balances AFTER INSERT ON ledger_entry
      DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION ledger_entry_must_balance();

    -- An entry is closed when its transaction ends: no late line joins it.
    CREATE FUNCTION ledger_entry_is_open() RETURNS trigger LANGUAGE plpgsql AS $$
    BEGIN
      IF (SELECT created_tx FROM ledger_entry WHERE id = NEW.entry_id) IS DISTINCT FROM pg_current_xact_id() THEN
        RAISE EXCEPTION 'entry % is closed', NEW.entry_id USING ERRCODE = '42501';
      END IF;
      RETURN NEW;
    END $$;
    CREATE TRIGGER ledger_posting_in_open_entry BEFORE INSERT ON ledger_posting
      FOR EACH ROW EXECUTE FUNCTION ledger_entry_is_open();

    -- The balance is a cache of the postings; the app's role cannot write it, this function's owner does.
    CREATE FUNCTION ledger_apply_posting() RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER SET search_path = public AS $$
    BEGIN
      UPDATE ledger_account SET balance_cents = balance_cents + NEW.amount_cents WHERE id = NEW.account_id;
      RETURN NULL;
    END $$;
    CREATE TRIGGER ledger_posting_applies AFTER INSERT ON ledger_posting
      FOR EACH ROW EXECUTE FUNCTION ledger_apply_posting();

    -- The app's role has no UPDATE on accounts, so the lock it needs is taken here, in id order.
    CREATE FUNCTION ledger_lock_accounts(account_ids bigint[]) RETURNS void LANGUAGE plpgsql SECURITY DEFINER SET search_path = public AS $$
    BEGIN
      PERFORM id FROM ledger_account WHERE id = ANY (account_ids) ORDER BY id FOR UPDATE;
    END $$;

    CREATE TRIGGER ledger_entry_append_only BEFORE UPDATE OR DELETE OR TRUNCATE ON ledger_entry
      FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
    CREATE TRIGGER ledger_posting_append_only BEFORE UPDATE OR DELETE OR TRUNCATE ON ledger_posting
      FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();

    CREATE TABLE funding (
      id uuid PRIMARY KEY,
      subcontract_id uuid NOT NULL REFERENCES subcontract (id),
      method text NOT NULL CHECK (method IN ('card', 'bank_debit')),
      status text NOT NULL CHECK (status IN ('requested', 'awaiting_payment', 'processing', 'succeeded', 'failed', 'expired')),
      amount_cents bigint NOT NULL CHECK (amount_cents > 0),
      platform_charge_cents bigint NOT NULL CHECK (platform_charge_cents >= 0),
      checkout_session_id text UNIQUE,
      checkout_url text,
      payment_intent_id text UNIQUE,
      charge_id text UNIQUE,
      requested_by uuid NOT NULL REFERENCES app_user (id),
      created_at timestamptz(3) NOT NULL DEFAULT app_now(),
      settled_at timestamptz(3),
      available_at timestamptz(3)
    );
    CREATE INDEX funding_subcontract ON funding (subcontract_id);

    -- One standing funding per line: a second request for the same line is refused by the index.
    CREATE TABLE funding_line (
      funding_id uuid NOT NULL REFERENCES funding (id),
      sov_line_id uuid NOT NULL REFERENCES sov_line (id),
      amount_cents bigint NOT NULL CHECK (amount_cents > 0),
      standing boolean NOT NULL DEFAULT true,
      PRIMARY KEY (funding_id, sov_line_id)
    );
    CREATE UNIQUE INDEX funding_line_once ON funding_line (sov_line_id) WHERE standing;

    CREATE TABLE release (
      id uuid PRIMARY KEY,
      subcontract_id uuid NOT NULL REFERENCES subcontract (id),
      completion_id uuid NOT NULL UNIQUE REFERENCES completion (id),
      status text NOT NULL CHECK (status IN ('posted', 'blocked', 'transferred')),
      blocked_because text CHECK (blocked_because IN ('capability', 'balance')),
      gross_cents bigint NOT NULL CHECK (gross_cents > 0),
      retainage_cents bigint NOT NULL CHECK (retainage_cents >= 0),
      fee_cents bigint NOT NULL CHECK (fee_cents >= 0),
      crew_cents bigint NOT NULL CHECK (crew_cents >= 0),
      entry_id uuid NOT NULL REFERENCES ledger_entry (id),
      released_by uuid NOT NULL REFERENCES app_user (id),
      posted_at timestamptz(3) NOT NULL DEFAULT app_now(),
      transferred_at timestamptz(3),
      CHECK (gross_cents = retainage_cents + fee_cents + crew_cents)
    );

    -- The outbox towards the provider: the row's id is the idempotency key of the call.
    CREATE TABLE provider_operation (
      id uuid PRIMARY KEY,
      kind text NOT NULL,
      status text NOT NULL CHECK (status IN ('requested', 'succeeded', 'refused', 'unknown')),
      subject_type text NOT NULL,
      subject_id uuid NOT NULL,
      params jsonb NOT NULL,
      attempts integer NOT NULL DEFAULT 0,
      provider_object_id text,
      error text,
      first_tried_at timestamptz(3),
      created_at timestamptz(3) NOT NULL DEFAULT app_now(),
      settled_at timestamptz(3)
    );
    CREATE INDEX provider_operation_open ON provider_operation (created_at) WHERE status IN ('requested', 'unknown');
    CREATE INDEX provider_operation_subject ON provider_operation (subject_type, subject_id);

    -- One transfer per release and funding charge, first in first out.
    CREATE TABLE release_transfer (
      release_id uuid NOT NULL REFERENCES release (id),
      funding_id uuid NOT NULL REFERENCES funding (id),
      amount_cents bigint NOT NULL CHECK (amount_cents > 0),
      operation_id uuid NOT NULL UNIQUE REFERENCES provider_operation (id),
      transfer_id text UNIQUE,
      transferred_at timestamptz(3),
      PRIMARY KEY (release_id, funding_id)
    );

    CREATE TABLE stripe_event (
      id text PRIMARY KEY,
      type text NOT NULL,
      account text,
      created timestamptz(3) NOT NULL,
      payload jsonb NOT NULL,
      status text NOT NULL DEFAULT 'received' CHECK (status IN ('received', 'processed', 'parked', 'ignored')),
      attempts integer NOT NULL DEFAULT 0,
      error text,
      received_at timestamptz(3) NOT NULL DEFAULT app_now(),
      processed_at timestamptz(3)
    );
    CREATE INDEX stripe_event_open ON stripe_event (received_at) WHERE status IN ('received', 'parked');

    CREATE TABLE incident (
      id uuid PRIMARY KEY,
      kind text NOT NULL,
      subject text NOT NULL,
      detail text NOT NULL,
      opened_at timestamptz(3) NOT NULL DEFAULT app_now(),
      closed_at timestamptz(3),
      UNIQUE (kind, subject)
    );
  `,
  down: `
    DROP TABLE incident, stripe_event, release_transfer, provider_operation, release, funding_line, funding, ledger_posting, ledger_entry, ledger_account CASCADE;
    DROP FUNCTION ledger_lock_accounts, ledger_apply_posting, ledger_entry_is_open, ledger_entry_must_balance;
  `,
};
