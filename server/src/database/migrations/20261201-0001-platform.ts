import type { Migration } from '../migrator.ts';

/** Clock, people, sessions, limits, files, audit: what every feature stands on. */
export const platform: Migration = {
  name: '20261201-0001-platform',
  up: `
    CREATE TABLE app_clock (
      only_row boolean PRIMARY KEY DEFAULT true CHECK (only_row),
      offset_ms bigint NOT NULL DEFAULT 0
    );
    INSERT INTO app_clock DEFAULT VALUES;

    -- The one clock. Only the owner role moves the offset; deadlines, reminders and the server's Clock all read this.
    CREATE FUNCTION app_now() RETURNS timestamptz LANGUAGE sql VOLATILE SECURITY DEFINER SET search_path = public AS $$
      SELECT clock_timestamp() + (SELECT offset_ms FROM app_clock) * interval '1 millisecond'
    $$;

    CREATE TABLE counter (
      name text PRIMARY KEY,
      value bigint NOT NULL DEFAULT 1000
    );

    CREATE TABLE company (
      id uuid PRIMARY KEY,
      kind text NOT NULL CHECK (kind IN ('general_contractor', 'cutting_contractor')),
      name text NOT NULL CHECK (length(name) BETWEEN 1 AND 160),
      phone text NOT NULL,
      yard_zip text,
      yard_city text,
      yard_state text,
      yard_lat double precision CHECK (yard_lat BETWEEN -90 AND 90),
      yard_lon double precision CHECK (yard_lon BETWEEN -180 AND 180),
      service_radius_mi integer CHECK (service_radius_mi BETWEEN 1 AND 1000),
      methods text[] NOT NULL DEFAULT '{}',
      payout_account_id text UNIQUE,
      payouts_ready boolean NOT NULL DEFAULT false,
      payout_requirements text[] NOT NULL DEFAULT '{}',
      wrapped_key bytea NOT NULL,
      version integer NOT NULL DEFAULT 1,
      created_at timestamptz(3) NOT NULL DEFAULT app_now(),
      updated_at timestamptz(3) NOT NULL DEFAULT app_now()
    );

    CREATE TABLE app_user (
      id uuid PRIMARY KEY,
      email citext NOT NULL UNIQUE,
      name text NOT NULL CHECK (length(name) BETWEEN 1 AND 120),
      password_hash text NOT NULL,
      is_staff boolean NOT NULL DEFAULT false,
      email_verified_at timestamptz(3),
      deactivated_at timestamptz(3),
      created_at timestamptz(3) NOT NULL DEFAULT app_now(),
      updated_at timestamptz(3) NOT NULL DEFAULT app_now()
    );

    CREATE TABLE membership (
      user_id uuid PRIMARY KEY REFERENCES app_user (id),
      company_id uuid NOT NULL REFERENCES company (id),
      role text NOT NULL CHECK (role IN ('owner', 'accounts', 'manager', 'field')),
      sign_limit_cents bigint CHECK (sign_limit_cents >= 0),
      set_aside_limit_cents bigint CHECK (set_aside_limit_cents >= 0),
      change_limit_cents bigint CHECK (change_limit_cents >= 0),
      created_at timestamptz(3) NOT NULL DEFAULT app_now()
    );
    CREATE INDEX membership_company ON membership (company_id);

    -- Whom one press may sign in as, in demo and development mode; filled by the seeder and by nothing else.
    CREATE TABLE demo_person (
      key text PRIMARY KEY,
      user_id uuid NOT NULL UNIQUE REFERENCES app_user (id),
      position integer NOT NULL
    );

    CREATE TABLE session (
      id uuid PRIMARY KEY,
      user_id uuid NOT NULL REFERENCES app_user (id),
      refresh_hash bytea NOT NULL UNIQUE,
      previous_hash bytea,
      -- The successor is kept, encrypted, through the grace so that two tabs or a lost reply get the same one.
      successor_sealed bytea,
      rotated_at timestamptz(3),
      created_at timestamptz(3) NOT NULL DEFAULT app_now(),
      last_used_at timestamptz(3) NOT NULL DEFAULT app_now(),
      expires_at timestamptz(3) NOT NULL,
      ended_at timestamptz(3),
      ended_because text,
      ip text NOT NULL,
      user_agent text NOT NULL
    );
    CREATE INDEX session_by_user ON session (user_id) WHERE ended_at IS NULL;

    -- A sign-up waits here until its link is used; only then are person and company made. So the same address may wait
    -- several times, each with the password typed then, and an unproven address owns nothing.
    CREATE TABLE sign_up (
      id uuid PRIMARY KEY,
      email citext NOT NULL,
      name text NOT NULL,
      password_hash text NOT NULL,
      company_kind text NOT NULL,
      company_name text NOT NULL,
      company_phone text NOT NULL,
      token_hash bytea NOT NULL UNIQUE,
      expires_at timestamptz(3) NOT NULL,
      used_at timestamptz(3),
      created_at timestamptz(3) NOT NULL DEFAULT app_now()
    );
    CREATE INDEX sign_up_email ON sign_up (email);

    -- Limits are counted here and not in memory, so that two servers do not double them.
    -- Unlogged: a crash may forget counts, and a count costs no disk flush.
    CREATE UNLOGGED TABLE rate_limit (
      key text NOT NULL,
      window_start timestamptz(3) NOT NULL,
      hits integer NOT NULL,
      PRIMARY KEY (key, window_start)
    );

    CREATE TABLE idempotency_key (
      company_id uuid NOT NULL,
      key uuid NOT NULL,
      route text NOT NULL,
      input_hmac bytea NOT NULL,
      status integer,
      response jsonb,
      created_at timestamptz(3) NOT NULL DEFAULT app_now(),
      PRIMARY KEY (company_id, key)
    );

    CREATE TABLE file (
      id uuid PRIMARY KEY,
      company_id uuid NOT NULL REFERENCES company (id),
      uploaded_by uuid NOT NULL REFERENCES app_user (id),
      kind text NOT NULL CHECK (kind IN ('photo', 'drawing', 'document')),
      name text NOT NULL CHECK (length(name) BETWEEN 1 AND 200),
      type text NOT NULL,
      bytes bigint NOT NULL CHECK (bytes >= 0),
      sha256 text NOT NULL CHECK (sha256 ~ '^[0-9a-f]{64}$'),
      original_sha256 text NOT NULL CHECK (original_sha256 ~ '^[0-9a-f]{64}$'),
      thumbnail_sha256 text,
      width integer,
      height integer,
      pages integer,
      taken_at timestamptz(3),
      created_at timestamptz(3) NOT NULL DEFAULT app_now()
    );
    CREATE INDEX file_company ON file (company_id);

    -- Who, what, when, from where, before and after. Append-only for every role.
    CREATE TABLE audit_event (
      id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
      at timestamptz(3) NOT NULL DEFAULT app_now(),
      actor_user_id uuid,
      actor_company_id uuid,
      action text NOT NULL,
      subject_type text NOT NULL,
      subject_id text NOT NULL,
      detail jsonb NOT NULL DEFAULT '{}',
      ip text,
      request_id text
    );
    CREATE INDEX audit_subject ON audit_event (subject_type, subject_id);

    CREATE FUNCTION refuse_change() RETURNS trigger LANGUAGE plpgsql AS $$
    BEGIN
      RAISE EXCEPTION '% is append-only', TG_TABLE_NAME USING ERRCODE = '42501';
    END $$;
    CREATE TRIGGER audit_event_append_only BEFORE UPDATE OR DELETE OR TRUNCATE ON audit_event
      FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
  `,
  down: `
    DROP TABLE audit_event, file, idempotency_key, rate_limit, sign_up, demo_person, session, membership, app_user, company, counter, app_clock CASCADE;
    DROP FUNCTION refuse_change, app_now;
  `,
};
