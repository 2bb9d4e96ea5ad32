import type { Migration } from '../migrator.ts';

/** A crew's rate card. With a scope's quantities it tells a sealed bid, so no column says an amount either. */
export const rateCard: Migration = {
  name: '20261201-0005-rate-card',
  up: `
    CREATE TABLE rate_card (
      company_id uuid PRIMARY KEY REFERENCES company (id),
      -- Under the company's own key.
      ciphertext bytea NOT NULL,
      version integer NOT NULL CHECK (version >= 1),
      updated_by uuid NOT NULL REFERENCES app_user (id),
      updated_at timestamptz(3) NOT NULL DEFAULT app_now()
    );
  `,
  down: `
    DROP TABLE rate_card;
  `,
};
