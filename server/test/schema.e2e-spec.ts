import { randomUUID } from 'node:crypto';
import { completionMachine } from '@kerfyard/common/completions';
import { fundingMachine, operationMachine, releaseMachine } from '@kerfyard/common/payments';
import { scopeMachine } from '@kerfyard/common/scopes';
import { subcontractMachine } from '@kerfyard/common/subcontracts';
import { visitMachine } from '@kerfyard/common/visits';
import { Pool } from 'pg';
import { Sequelize } from 'sequelize';
import { migrate, migrations, umzug } from '../src/database/migrator.ts';
import { constraintCodes } from '../src/platform/database/constraint-codes.ts';
import { closeDatabase, sql } from './database.ts';

jest.setTimeout(60_000);
afterAll(closeDatabase);

const silent = () => undefined;

/** Everything in the public schema that a migration makes, one line each; extensions and the runner's own table aside. */
const SCHEMA = `
  SELECT 'column ' || table_name || '.' || column_name || ' ' || data_type || ' ' || is_nullable || ' ' || coalesce(column_default, '') AS line
    FROM information_schema.columns WHERE table_schema = 'public' AND table_name <> 'schema_migration'
  UNION SELECT 'constraint ' || conrelid::regclass || ' ' || conname || ' ' || pg_get_constraintdef(oid)
    FROM pg_constraint WHERE connamespace = 'public'::regnamespace AND conrelid <> 0 AND conrelid::regclass::text <> 'schema_migration'
  UNION SELECT 'index ' || indexdef FROM pg_indexes WHERE schemaname = 'public' AND tablename <> 'schema_migration'
  UNION SELECT 'trigger ' || pg_get_triggerdef(oid) FROM pg_trigger WHERE NOT tgisinternal
  UNION SELECT 'function ' || oid::regprocedure || ' ' || prosrc FROM pg_proc f WHERE pronamespace = 'public'::regnamespace
    AND NOT EXISTS (SELECT 1 FROM pg_depend WHERE objid = f.oid AND deptype = 'e')
  UNION SELECT 'sequence ' || sequencename FROM pg_sequences WHERE schemaname = 'public'
  ORDER BY 1`;

/** An empty database of its own beside the one under test; `work` gets the owner's address and the superuser's eyes. */
async function inEmptyDatabase(work: (ownerUrl: string, read: () => Promise<string[]>) => Promise<void>) {
  const name = `schema_${randomUUID().replaceAll('-', '')}`;
  const inside = (url: string | undefined) => {
    const address = new URL(url ?? '');
    address.pathname = `/${name}`;
    return address.href;
  };
  const cluster = new Pool({ connectionString: process.env.TEST_PG_SUPER_URL, max: 1 });
  await cluster.query(`CREATE DATABASE ${name} OWNER kerfyard_owner TEMPLATE template0`);
  const pool = new Pool({ connectionString: inside(process.env.TEST_PG_SUPER_URL), max: 1 });
  pool.on('error', silent); // its connection may still be closing when the database goes
  try {
    for (const extension of await sql<{ extname: string }>(
      `SELECT extname FROM pg_extension WHERE extname <> 'plpgsql' ORDER BY oid`,
    ))
      await pool.query(`CREATE EXTENSION ${extension.extname}`);
    await pool.query('ALTER SCHEMA public OWNER TO kerfyard_owner');
    await work(inside(process.env.TEST_PG_OWNER_URL), async () =>
      (await pool.query<{ line: string }>(SCHEMA)).rows.map(({ line }) => line),
    );
  } finally {
    await pool.end();
    await cluster.query(`DROP DATABASE ${name} WITH (FORCE)`);
    await cluster.end();
  }
}

async function takeDown(ownerUrl: string): Promise<void> {
  const sequelize = new Sequelize(ownerUrl, { logging: false, pool: { max: 1 } });
  try {
    await umzug(sequelize, silent).down({ to: 0 });
  } finally {
    await sequelize.close();
  }
}

describe('the schema', () => {
  it('goes up, down to nothing and up again to the same, and is what the app runs on', async () => {
    await inEmptyDatabase(async (ownerUrl, read) => {
      const empty = await read();
      await migrate(ownerUrl, silent);
      const first = await read();
      expect(first.length).toBeGreaterThan(300);
      await takeDown(ownerUrl);
      expect(await read()).toEqual(empty);
      await migrate(ownerUrl, silent);
      expect(await read()).toEqual(first);
      const running = await sql<{ line: string }>(SCHEMA, [], 'super');
      expect(running.map(({ line }) => line)).toEqual(first);
    });
  });

  it('is brought up to date once, however many servers start together', async () => {
    await inEmptyDatabase(async (ownerUrl, read) => {
      const applied: string[] = [];
      await Promise.all(
        Array.from({ length: 4 }, () => migrate(ownerUrl, (line) => void applied.push(line))),
      );
      expect(applied).toHaveLength(migrations.length);
      expect((await read()).length).toBeGreaterThan(300);
    });
  });

  it.each([
    ['scope', scopeMachine],
    ['subcontract', subcontractMachine],
    ['visit', visitMachine],
    ['completion', completionMachine],
    ['funding', fundingMachine],
    ['release', releaseMachine],
    ['provider_operation', operationMachine],
  ])('lets a %s be in the states of its table of moves and in no other', async (table, machine) => {
    const [check] = await sql<{ text: string }>(
      `SELECT pg_get_constraintdef(oid) AS text FROM pg_constraint WHERE conname = $1`,
      [`${table}_status_check`],
    );
    const allowed = [...(check?.text ?? '').matchAll(/'(\w+)'/g)].map(([, state]) => state);
    expect(allowed.sort()).toEqual([...machine.states].sort());
  });

  it('has each constraint whose name becomes an answer for people', async () => {
    const rows = await sql<{ name: string }>(
      'SELECT conname AS name FROM pg_constraint UNION SELECT indexname FROM pg_indexes',
    );
    const names = new Set(rows.map(({ name }) => name));
    expect(Object.keys(constraintCodes).filter((name) => !names.has(name))).toEqual([]);
  });
});
