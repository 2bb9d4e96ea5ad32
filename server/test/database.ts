import { Pool, type QueryResultRow } from 'pg';

export type DatabaseRole = 'app' | 'owner' | 'super';

const variables: Record<DatabaseRole, string> = {
  app: 'TEST_PG_URL',
  owner: 'TEST_PG_OWNER_URL',
  super: 'TEST_PG_SUPER_URL',
};

const pools = new Map<DatabaseRole, Pool>();

/** Rows straight from the database under test, as the app's role unless told otherwise. */
export async function sql<Row extends QueryResultRow>(
  text: string,
  values: unknown[] = [],
  role: DatabaseRole = 'app',
): Promise<Row[]> {
  let pool = pools.get(role);
  if (pool === undefined) {
    pool = new Pool({ connectionString: process.env[variables[role]], max: 4 });
    pools.set(role, pool);
  }
  const { rows } = await pool.query<Row>(text, values);
  return rows;
}

/** Call in `afterAll` of a spec that used `sql`, so that jest can end. */
export async function closeDatabase(): Promise<void> {
  const open = [...pools.values()];
  pools.clear();
  await Promise.all(open.map((pool) => pool.end()));
}

/**
 * Moves the app's clock (`app_now()`) by milliseconds; the spec moves it back. It moves for every spec that runs at the
 * same time as well, so move it by little, or give the row under test another time instead. Sessions go by real time.
 */
export async function moveClock(milliseconds: number): Promise<void> {
  await sql('UPDATE app_clock SET offset_ms = offset_ms + $1', [milliseconds], 'owner');
}
