import type { Migration } from '../migrator.ts';

/** Links by e-mail, invitations, second factors, and when a session last proved who holds it. */
export const accounts: Migration = {
  name: '20261201-0006-accounts',
  up: `
    -- When the person behind a session last gave a password or a code: sensitive acts ask for it to be recent.
    ALTER TABLE session ADD COLUMN proved_at timestamptz(3) NOT NULL DEFAULT clock_timestamp();

    -- A reset asked for an address without an account has a row as well, so that both are the same work.
    CREATE TABLE password_reset (
      id uuid PRIMARY KEY,
      email citext NOT NULL,
      user_id uuid REFERENCES app_user (id),
      token_hash bytea NOT NULL UNIQUE,
      expires_at timestamptz(3) NOT NULL,
      used_at timestamptz(3),
      created_at timestamptz(3) NOT NULL DEFAULT clock_timestamp()
    );
    CREATE INDEX password_reset_email ON password_reset (email);

    CREATE TABLE email_change (
      id uuid PRIMARY KEY,
      user_id uuid NOT NULL REFERENCES app_user (id),
      old_email citext NOT NULL,
      new_email citext NOT NULL,
      token_hash bytea NOT NULL UNIQUE,
      expires_at timestamptz(3) NOT NULL,
      used_at timestamptz(3),
      -- A later change or a newer wish takes an open one's place.
      dropped_at timestamptz(3),
      created_at timestamptz(3) NOT NULL DEFAULT clock_timestamp()
    );
    CREATE INDEX email_change_user ON email_change (user_id);

    CREATE TABLE invitation (
      id uuid PRIMARY KEY,
      company_id uuid NOT NULL REFERENCES company (id),
      email citext NOT NULL,
      role text NOT NULL CHECK (role IN ('owner', 'accounts', 'manager', 'field')),
      sign_limit_cents bigint CHECK (sign_limit_cents >= 0),
      set_aside_limit_cents bigint CHECK (set_aside_limit_cents >= 0),
      change_limit_cents bigint CHECK (change_limit_cents >= 0),
      invited_by uuid NOT NULL REFERENCES app_user (id),
      token_hash bytea NOT NULL UNIQUE,
      expires_at timestamptz(3) NOT NULL,
      used_at timestamptz(3),
      accepted_by uuid REFERENCES app_user (id),
      withdrawn_at timestamptz(3),
      created_at timestamptz(3) NOT NULL DEFAULT clock_timestamp(),
      CHECK ((used_at IS NULL) = (accepted_by IS NULL))
    );
    CREATE UNIQUE INDEX invitation_one_open ON invitation (company_id, email)
      WHERE used_at IS NULL AND withdrawn_at IS NULL;

    -- The secret is encrypted under the master key. Not confirmed: being set up, asked of nobody.
    CREATE TABLE second_factor (
      user_id uuid PRIMARY KEY REFERENCES app_user (id),
      secret_sealed bytea NOT NULL,
      confirmed_at timestamptz(3),
      -- The newest time step whose code was taken: a code counts once (RFC 6238, 5.2).
      last_step bigint NOT NULL DEFAULT 0,
      created_at timestamptz(3) NOT NULL DEFAULT clock_timestamp()
    );

    CREATE TABLE recovery_code (
      user_id uuid NOT NULL REFERENCES app_user (id),
      code_hash bytea NOT NULL,
      used_at timestamptz(3),
      PRIMARY KEY (user_id, code_hash)
    );
  `,
  down: `
    DROP TABLE recovery_code, second_factor, invitation, email_change, password_reset;
    ALTER TABLE session DROP COLUMN proved_at;
  `,
};
