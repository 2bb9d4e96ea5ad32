import { Sequelize } from 'sequelize';
import { Umzug, type UmzugStorage } from 'umzug';
import { platform } from './migrations/20261201-0001-platform.ts';
import { scopesAndBids } from './migrations/20261201-0002-scopes-and-bids.ts';
import { work } from './migrations/20261201-0003-work.ts';
import { money } from './migrations/20261201-0004-money.ts';
import { rateCard } from './migrations/20261201-0005-rate-card.ts';
import { accounts } from './migrations/20261201-0006-accounts.ts';
import { ledgerSeal } from './migrations/20261201-0010-ledger-seal.ts';

/** Plain SQL, up and down; one transaction each. One that has landed is never edited. */
export interface Migration {
  name: string;
  up: string;
  down: string;
}

export const migrations: readonly Migration[] = [
  platform,
  scopesAndBids,
  work,
  money,
  rateCard,
  accounts,
  ledgerSeal,
];

// Two servers starting at once must not migrate twice; any constant number will do.
const LOCK = 460_001;

/** Bring the schema up to date as the owner role; a second caller waits for the first. */
export async function migrate(ownerUrl: string, log: (line: string) => void): Promise<void> {
  const sequelize = new Sequelize(ownerUrl, { logging: false, pool: { max: 2 } });
  try {
    await sequelize.transaction(async (lock) => {
      await sequelize.query('SELECT pg_advisory_xact_lock($1)', { bind: [LOCK], transaction: lock });
      // Under the lock, since two such statements at once collide; on a connection of its own, so that it is there at once.
      await sequelize.query(
        'CREATE TABLE IF NOT EXISTS schema_migration (name text PRIMARY KEY, applied_at timestamptz NOT NULL DEFAULT now())',
      );
      await umzug(sequelize, log).up();
    });
  } finally {
    await sequelize.close();
  }
}

/** The runner of the migrations over one connection pool: all up, or (for developers and tests) down again. */
export function umzug(sequelize: Sequelize, log: (line: string) => void): Umzug<Sequelize> {
  const storage: UmzugStorage<Sequelize> = {
    executed: async () => {
      const [rows] = await sequelize.query('SELECT name FROM schema_migration ORDER BY name');
      return (rows as { name: string }[]).map((row) => row.name);
    },
    logMigration: async ({ name }) =>
      void (await sequelize.query('INSERT INTO schema_migration (name) VALUES ($1)', { bind: [name] })),
    unlogMigration: async ({ name }) =>
      void (await sequelize.query('DELETE FROM schema_migration WHERE name = $1', { bind: [name] })),
  };
  const run = (sql: string) =>
    sequelize.transaction(async (transaction) => void (await sequelize.query(sql, { transaction })));
  return new Umzug({
    migrations: migrations.map((migration) => ({
      name: migration.name,
      up: async () => {
        log(`migrating ${migration.name}`);
        await run(migration.up);
      },
      down: () => run(migration.down),
    })),
    storage,
    context: sequelize,
    logger: undefined,
  });
}
