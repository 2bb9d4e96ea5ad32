import type { Migration } from '../migrator.ts';

/** Subcontracts, visits, completions, talk. */
export const work: Migration = {
  name: '20261201-0003-work',
  up: `
    CREATE TABLE subcontract (
      id uuid PRIMARY KEY,
      number bigint NOT NULL UNIQUE,
      scope_id uuid NOT NULL REFERENCES scope (id),
      revision integer NOT NULL,
      award_id uuid NOT NULL UNIQUE REFERENCES award (id),
      bid_id uuid NOT NULL REFERENCES bid (id),
      gc_company_id uuid NOT NULL REFERENCES company (id),
      crew_company_id uuid NOT NULL REFERENCES company (id),
      status text NOT NULL CHECK (status IN ('awaiting_signatures', 'active', 'completed', 'lapsed')),
      total_cents bigint NOT NULL CHECK (total_cents > 0),
      retainage_basis_points integer NOT NULL CHECK (retainage_basis_points BETWEEN 0 AND 1000),
      fee_basis_points integer NOT NULL CHECK (fee_basis_points BETWEEN 0 AND 3000),
      answer_days integer NOT NULL CHECK (answer_days BETWEEN 1 AND 60),
      document_file_id uuid NOT NULL REFERENCES file (id),
      signed_document_file_id uuid REFERENCES file (id),
      sign_by timestamptz(3) NOT NULL,
      seq bigint NOT NULL DEFAULT 0,
      created_at timestamptz(3) NOT NULL DEFAULT app_now(),
      updated_at timestamptz(3) NOT NULL DEFAULT app_now(),
      FOREIGN KEY (scope_id, revision) REFERENCES scope_revision (scope_id, revision),
      CHECK (gc_company_id <> crew_company_id)
    );
    CREATE INDEX subcontract_gc ON subcontract (gc_company_id, created_at DESC, id DESC);
    CREATE INDEX subcontract_crew ON subcontract (crew_company_id, created_at DESC, id DESC);

    CREATE TABLE sov_line (
      id uuid PRIMARY KEY,
      subcontract_id uuid NOT NULL REFERENCES subcontract (id),
      position integer NOT NULL,
      description text NOT NULL,
      cut_ids uuid[] NOT NULL DEFAULT '{}',
      amount_cents bigint NOT NULL CHECK (amount_cents >= 0),
      UNIQUE (subcontract_id, position)
    );

    CREATE TABLE signature (
      subcontract_id uuid NOT NULL REFERENCES subcontract (id),
      side text NOT NULL CHECK (side IN ('gc', 'crew')),
      user_id uuid NOT NULL REFERENCES app_user (id),
      typed_name text NOT NULL,
      document_sha256 text NOT NULL CHECK (document_sha256 ~ '^[0-9a-f]{64}$'),
      ip text NOT NULL,
      signed_at timestamptz(3) NOT NULL DEFAULT app_now(),
      PRIMARY KEY (subcontract_id, side)
    );
    CREATE TRIGGER signature_immutable BEFORE UPDATE OR DELETE OR TRUNCATE ON signature
      FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();

    CREATE TABLE crew (
      id uuid PRIMARY KEY,
      company_id uuid NOT NULL REFERENCES company (id),
      name text NOT NULL,
      UNIQUE (company_id, name)
    );
    CREATE TABLE truck (
      id uuid PRIMARY KEY,
      company_id uuid NOT NULL REFERENCES company (id),
      name text NOT NULL,
      UNIQUE (company_id, name)
    );

    CREATE TABLE visit (
      id uuid PRIMARY KEY,
      subcontract_id uuid NOT NULL REFERENCES subcontract (id),
      crew_id uuid NOT NULL REFERENCES crew (id),
      truck_id uuid NOT NULL REFERENCES truck (id),
      status text NOT NULL CHECK (status IN ('proposed', 'confirmed', 'on_site', 'finished', 'cancelled')),
      windows jsonb NOT NULL,
      during tstzrange,
      time_zone text NOT NULL,
      note text NOT NULL DEFAULT '',
      proposed_by uuid NOT NULL REFERENCES app_user (id),
      confirmed_by uuid REFERENCES app_user (id),
      started_at timestamptz(3),
      finished_at timestamptz(3),
      cancel_reason text,
      created_at timestamptz(3) NOT NULL DEFAULT app_now(),
      updated_at timestamptz(3) NOT NULL DEFAULT app_now(),
      CHECK (status IN ('proposed', 'cancelled') OR during IS NOT NULL),
      CONSTRAINT visit_crew_once EXCLUDE USING gist (crew_id WITH =, during WITH &&)
        WHERE (status IN ('confirmed', 'on_site', 'finished')) DEFERRABLE INITIALLY IMMEDIATE,
      CONSTRAINT visit_truck_once EXCLUDE USING gist (truck_id WITH =, during WITH &&)
        WHERE (status IN ('confirmed', 'on_site', 'finished')) DEFERRABLE INITIALLY IMMEDIATE
    );
    CREATE INDEX visit_subcontract ON visit (subcontract_id);
    CREATE INDEX visit_during ON visit USING gist (during);

    CREATE TABLE visit_line (
      visit_id uuid NOT NULL REFERENCES visit (id),
      sov_line_id uuid NOT NULL REFERENCES sov_line (id),
      PRIMARY KEY (visit_id, sov_line_id)
    );

    CREATE TABLE completion (
      id uuid PRIMARY KEY,
      subcontract_id uuid NOT NULL REFERENCES subcontract (id),
      visit_id uuid NOT NULL REFERENCES visit (id),
      status text NOT NULL CHECK (status IN ('submitted', 'accepted', 'released', 'withdrawn')),
      as_cut jsonb NOT NULL,
      note text NOT NULL DEFAULT '',
      submitted_by uuid NOT NULL REFERENCES app_user (id),
      submitted_at timestamptz(3) NOT NULL DEFAULT app_now(),
      accepted_by uuid REFERENCES app_user (id),
      accepted_at timestamptz(3),
      answer_by timestamptz(3) NOT NULL
    );
    CREATE INDEX completion_subcontract ON completion (subcontract_id);

    -- A line of the schedule of values is in one standing completion at most.
    CREATE TABLE completion_line (
      completion_id uuid NOT NULL REFERENCES completion (id),
      sov_line_id uuid NOT NULL REFERENCES sov_line (id),
      standing boolean NOT NULL DEFAULT true,
      PRIMARY KEY (completion_id, sov_line_id)
    );
    CREATE UNIQUE INDEX completion_line_once ON completion_line (sov_line_id) WHERE standing;

    CREATE TABLE completion_photo (
      completion_id uuid NOT NULL REFERENCES completion (id),
      file_id uuid NOT NULL REFERENCES file (id),
      position integer NOT NULL,
      PRIMARY KEY (completion_id, file_id)
    );

    CREATE TABLE thread (
      id uuid PRIMARY KEY,
      scope_id uuid NOT NULL REFERENCES scope (id),
      gc_company_id uuid NOT NULL REFERENCES company (id),
      crew_company_id uuid NOT NULL REFERENCES company (id),
      subcontract_id uuid UNIQUE REFERENCES subcontract (id),
      seq bigint NOT NULL DEFAULT 0,
      last_message_at timestamptz(3),
      created_at timestamptz(3) NOT NULL DEFAULT app_now(),
      UNIQUE (scope_id, crew_company_id)
    );
    CREATE INDEX thread_gc ON thread (gc_company_id, last_message_at DESC);
    CREATE INDEX thread_crew ON thread (crew_company_id, last_message_at DESC);

    CREATE TABLE message (
      id uuid PRIMARY KEY,
      thread_id uuid NOT NULL REFERENCES thread (id),
      seq bigint NOT NULL,
      author_id uuid NOT NULL REFERENCES app_user (id),
      company_id uuid NOT NULL REFERENCES company (id),
      body text NOT NULL CHECK (length(body) <= 4000),
      sent_at timestamptz(3) NOT NULL DEFAULT app_now(),
      UNIQUE (thread_id, seq)
    );
    CREATE TABLE message_file (
      message_id uuid NOT NULL REFERENCES message (id),
      file_id uuid NOT NULL REFERENCES file (id),
      position integer NOT NULL,
      PRIMARY KEY (message_id, file_id)
    );
    CREATE TABLE thread_read (
      thread_id uuid NOT NULL REFERENCES thread (id),
      user_id uuid NOT NULL REFERENCES app_user (id),
      seq bigint NOT NULL,
      PRIMARY KEY (thread_id, user_id)
    );

    -- One waiting e-mail about unseen messages per person, and when the last one went.
    CREATE TABLE message_notice (
      user_id uuid PRIMARY KEY REFERENCES app_user (id),
      due_at timestamptz(3),
      mailed_at timestamptz(3),
      mail_id uuid
    );
  `,
  down: `DROP TABLE message_notice, thread_read, message_file, message, thread, completion_photo, completion_line, completion, visit_line, visit, truck, crew, signature, sov_line, subcontract CASCADE;`,
};
