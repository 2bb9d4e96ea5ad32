import type { Migration } from '../migrator.ts';

/** Scopes as immutable revisions, bids sealed at rest, award. */
export const scopesAndBids: Migration = {
  name: '20261201-0002-scopes-and-bids',
  up: `
    CREATE TABLE scope (
      id uuid PRIMARY KEY,
      company_id uuid NOT NULL REFERENCES company (id),
      number bigint NOT NULL UNIQUE,
      status text NOT NULL CHECK (status IN ('draft', 'open', 'due', 'awarded', 'closed_without_award', 'withdrawn', 'discarded')),
      created_by uuid NOT NULL REFERENCES app_user (id),
      draft jsonb,
      draft_version integer NOT NULL DEFAULT 1,
      revision integer CHECK (revision >= 1),
      -- Read model of the newest revision, for lists and filters.
      title text NOT NULL DEFAULT '',
      mode text CHECK (mode IN ('sealed', 'ranked')),
      due_at timestamptz(3),
      extensions integer NOT NULL DEFAULT 0 CHECK (extensions BETWEEN 0 AND 10),
      time_zone text,
      city text NOT NULL DEFAULT '',
      state text NOT NULL DEFAULT '',
      lat double precision CHECK (lat BETWEEN -90 AND 90),
      lon double precision CHECK (lon BETWEEN -180 AND 180),
      -- The site on the unit sphere: distance between two such points grows exactly as the way over the ground
      -- does, so an index on it answers "nearest first".
      place cube GENERATED ALWAYS AS (
        CASE WHEN lat IS NOT NULL AND lon IS NOT NULL THEN cube(ARRAY[
          cos(radians(lat)) * cos(radians(lon)), cos(radians(lat)) * sin(radians(lon)), sin(radians(lat))
        ]) END
      ) STORED,
      -- The quarter-degree square the site lies in, for "within so many miles": unlike a box on "place", the planner
      -- has statistics on it, so that it uses the index for a short way and the list's order for a long one.
      cell integer GENERATED ALWAYS AS ((floor(lat * 4)::integer + 360) * 1440 + floor(lon * 4)::integer + 720) STORED,
      methods text[] NOT NULL DEFAULT '{}',
      indoors boolean NOT NULL DEFAULT false,
      inch_feet double precision,
      totals jsonb,
      sketch jsonb NOT NULL DEFAULT '[]',
      cut_count integer NOT NULL DEFAULT 0,
      plugs jsonb NOT NULL DEFAULT '[]',
      published_at timestamptz(3),
      opened_at timestamptz(3),
      closed_reason text,
      -- One more with each change that people hear of, taken under this row's lock. Bids coming in count apart:
      -- only the general contractor hears of them, and gaps in "seq" would tell rivals how many there are.
      seq bigint NOT NULL DEFAULT 0,
      bid_seq bigint NOT NULL DEFAULT 0,
      created_at timestamptz(3) NOT NULL DEFAULT app_now(),
      updated_at timestamptz(3) NOT NULL DEFAULT app_now(),
      CHECK (status IN ('draft', 'discarded') OR (revision IS NOT NULL AND due_at IS NOT NULL AND mode IS NOT NULL))
    );
    CREATE INDEX scope_own ON scope (company_id, updated_at DESC, id DESC);
    CREATE INDEX scope_open_newest ON scope (published_at DESC, id DESC) WHERE status = 'open';
    CREATE INDEX scope_open_due ON scope (due_at, id) WHERE status = 'open';
    CREATE INDEX scope_open_size ON scope (inch_feet DESC, id DESC) WHERE status = 'open';
    CREATE INDEX scope_open_place ON scope USING gist (place) WHERE status = 'open';
    CREATE INDEX scope_open_cell ON scope (cell) WHERE status = 'open';
    -- How many scopes of a company came due, and how many it awarded: counted from the index alone.
    CREATE INDEX scope_record ON scope (company_id, status) WHERE status IN ('due', 'awarded', 'closed_without_award');

    CREATE TABLE scope_revision (
      scope_id uuid NOT NULL REFERENCES scope (id),
      revision integer NOT NULL CHECK (revision >= 1),
      body jsonb NOT NULL,
      totals jsonb NOT NULL,
      published_by uuid NOT NULL REFERENCES app_user (id),
      published_at timestamptz(3) NOT NULL DEFAULT app_now(),
      PRIMARY KEY (scope_id, revision)
    );
    CREATE TRIGGER scope_revision_immutable BEFORE UPDATE OR DELETE OR TRUNCATE ON scope_revision
      FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();

    CREATE TABLE scope_file (
      scope_id uuid NOT NULL REFERENCES scope (id),
      file_id uuid NOT NULL REFERENCES file (id),
      caption text NOT NULL DEFAULT '',
      position integer NOT NULL,
      -- The first revision that shows it; a draft's files have revision 1 to be.
      revision integer NOT NULL DEFAULT 1,
      PRIMARY KEY (scope_id, file_id)
    );

    -- A key pair per scope: sealing needs the public half, opening the private one, which is wrapped by the master key.
    CREATE TABLE scope_key (
      scope_id uuid PRIMARY KEY REFERENCES scope (id),
      public_key bytea NOT NULL,
      wrapped_private_key bytea NOT NULL
    );

    -- Until due a bid exists only here. No column says an amount.
    CREATE TABLE sealed_bid (
      id uuid PRIMARY KEY,
      scope_id uuid NOT NULL REFERENCES scope (id),
      company_id uuid NOT NULL REFERENCES company (id),
      revision integer NOT NULL,
      -- 'opened': its content has become a row of "bid" with the same id.
      status text NOT NULL CHECK (status IN ('in', 'withdrawn', 'opened')),
      ciphertext bytea NOT NULL,
      key_for_scope bytea NOT NULL,
      key_for_bidder bytea NOT NULL,
      submitted_by uuid NOT NULL REFERENCES app_user (id),
      submitted_at timestamptz(3) NOT NULL,
      version integer NOT NULL DEFAULT 1,
      UNIQUE (scope_id, company_id)
    );
    CREATE INDEX sealed_bid_company ON sealed_bid (company_id, submitted_at DESC, id DESC);

    CREATE TABLE bid_draft (
      scope_id uuid NOT NULL REFERENCES scope (id),
      company_id uuid NOT NULL REFERENCES company (id),
      ciphertext bytea NOT NULL,
      key_for_bidder bytea NOT NULL,
      updated_at timestamptz(3) NOT NULL DEFAULT app_now(),
      PRIMARY KEY (scope_id, company_id)
    );

    -- Opened sealed bids and ranked bids, readable by the general contractor.
    CREATE TABLE bid (
      id uuid PRIMARY KEY,
      scope_id uuid NOT NULL REFERENCES scope (id),
      company_id uuid NOT NULL REFERENCES company (id),
      revision integer NOT NULL,
      status text NOT NULL CHECK (status IN ('in', 'withdrawn', 'opened')),
      input jsonb NOT NULL,
      priced jsonb NOT NULL,
      total_cents bigint NOT NULL CHECK (total_cents > 0),
      submitted_by uuid NOT NULL REFERENCES app_user (id),
      submitted_at timestamptz(3) NOT NULL,
      version integer NOT NULL DEFAULT 1,
      UNIQUE (scope_id, company_id)
    );
    CREATE INDEX bid_company ON bid (company_id, submitted_at DESC, id DESC);

    CREATE TABLE bid_line (
      bid_id uuid NOT NULL REFERENCES bid (id) ON DELETE CASCADE,
      cut_id uuid NOT NULL,
      position integer NOT NULL,
      unit text NOT NULL,
      quantity bigint NOT NULL CHECK (quantity >= 0),
      rate bigint NOT NULL CHECK (rate >= 0),
      factors integer[] NOT NULL DEFAULT '{}',
      cents bigint NOT NULL CHECK (cents >= 0),
      PRIMARY KEY (bid_id, position)
    );

    CREATE TABLE award (
      id uuid PRIMARY KEY,
      scope_id uuid NOT NULL REFERENCES scope (id),
      bid_id uuid NOT NULL REFERENCES bid (id),
      awarded_by uuid NOT NULL REFERENCES app_user (id),
      reason text NOT NULL,
      note text NOT NULL DEFAULT '',
      awarded_at timestamptz(3) NOT NULL DEFAULT app_now(),
      lapsed_at timestamptz(3)
    );
    -- One standing award per scope; a lapsed one makes room.
    CREATE UNIQUE INDEX award_one_standing ON award (scope_id) WHERE lapsed_at IS NULL;

    CREATE TABLE bid_outcome (
      bid_id uuid PRIMARY KEY REFERENCES bid (id),
      award_id uuid NOT NULL REFERENCES award (id),
      won boolean NOT NULL,
      rank integer,
      out_of integer,
      band text,
      reason text,
      note text NOT NULL DEFAULT ''
    );
  `,
  down: `DROP TABLE bid_outcome, award, bid_line, bid, bid_draft, sealed_bid, scope_key, scope_file, scope_revision, scope CASCADE;`,
};
