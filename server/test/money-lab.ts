import { fork, type ChildProcess } from 'node:child_process';
import { randomBytes, randomUUID } from 'node:crypto';
import { once } from 'node:events';
import { mkdtempSync, rmSync } from 'node:fs';
import { createServer, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { Pool, type QueryResultRow } from 'pg';
import Stripe from 'stripe';
import { grantAppRole } from '../src/database/grants.ts';
import { migrate } from '../src/database/migrator.ts';

/** A database and a provider's stand-in of one spec's own: it may empty them and check all there is. */
export interface MoneyLab {
  appUrl: string;
  ownerUrl: string;
  stripeUrl: string;
  stripeKey: string;
  provider: Stripe;
  /** Rows by the superuser, whom no rule of the schema stops when asked for `unruled`. */
  sql: <Row extends QueryResultRow>(text: string, values?: unknown[]) => Promise<Row[]>;
  unruled: (text: string, values?: unknown[]) => Promise<void>;
  /** Press a button of the stand-in. */
  control: (path: string, body?: object, method?: string) => Promise<unknown>;
  /** Forget all money, companies and people, here and at the provider. */
  empty: () => Promise<void>;
  close: () => Promise<void>;
}

const EXTENSIONS = ['btree_gist', 'citext', 'pgcrypto', 'cube', 'earthdistance'];

const EMPTY = [
  'incident',
  'stripe_event',
  'release_transfer',
  'provider_operation',
  'release',
  'funding_line',
  'funding',
  'ledger_seal',
  'ledger_posting',
  'ledger_entry',
  'ledger_account',
  'completion_line',
  'completion',
  'sov_line',
  'subcontract',
  'audit_event',
  'membership',
  'app_user',
  'company',
]
  .map((table) => `DELETE FROM ${table};`)
  .join('\n');

function withDatabase(url: string | undefined, name: string): string {
  const address = new URL(url ?? '');
  address.pathname = `/${name}`;
  return address.href;
}

export async function freePort(): Promise<number> {
  const probe = createServer().listen(0, '127.0.0.1');
  await once(probe, 'listening');
  const { port } = probe.address() as AddressInfo;
  probe.close();
  await once(probe, 'close');
  return port;
}

/** Where the stand-in sends its events, if anywhere: the app under test. */
export interface WebhookTarget {
  url: string;
  secret: string;
  connect: boolean;
}

async function startProvider(dataDir: string, webhooks: WebhookTarget[]) {
  const port = await freePort();
  const key = `sk_test_${randomBytes(12).toString('hex')}`;
  const child = fork(join(__dirname, '../dist-fakes/stripe/main.js'), {
    env: {
      PATH: process.env.PATH,
      FAKE_STRIPE_HOST: '127.0.0.1',
      FAKE_STRIPE_PORT: String(port),
      FAKE_STRIPE_DATA_DIR: dataDir,
      FAKE_STRIPE_SECRET_KEY: key,
      FAKE_STRIPE_WEBHOOKS: JSON.stringify(webhooks),
    },
    stdio: ['ignore', 'ignore', 'inherit', 'ipc'],
    execArgv: [],
  });
  const url = `http://127.0.0.1:${port}`;
  await waitForHealth(url, child);
  return { url, port, key, child };
}

async function waitForHealth(url: string, child: ChildProcess): Promise<void> {
  for (let tries = 0; tries < 300; tries += 1) {
    if (child.exitCode !== null) throw new Error(`the stand-in ended with ${child.exitCode}`);
    const isUp = await fetch(`${url}/_fake/health`).then(
      (response) => response.ok,
      () => false,
    );
    if (isUp) return;
    await sleep(50);
  }
  throw new Error('the stand-in did not answer');
}

/** A database of this schema beside the one under test, in the same cluster. */
async function makeDatabase(): Promise<{ name: string; drop: () => Promise<void> }> {
  const name = `money_${randomUUID().replaceAll('-', '')}`;
  const cluster = new Pool({ connectionString: process.env.TEST_PG_SUPER_URL, max: 1 });
  await cluster.query(`CREATE DATABASE ${name} OWNER kerfyard_owner TEMPLATE template0`);
  const inside = new Pool({ connectionString: withDatabase(process.env.TEST_PG_SUPER_URL, name), max: 1 });
  await inside.query(EXTENSIONS.map((extension) => `CREATE EXTENSION ${extension};`).join('\n'));
  await inside.query('ALTER SCHEMA public OWNER TO kerfyard_owner');
  await inside.end();
  const drop = async () => {
    await cluster.query(`DROP DATABASE ${name} WITH (FORCE)`);
    await cluster.end();
  };
  return { name, drop };
}

/** @param prepare what must be there before rights are granted (the job runner's schema) */
export async function openMoneyLab(
  prepare: (ownerUrl: string) => Promise<void>,
  webhooks: WebhookTarget[] = [],
): Promise<MoneyLab> {
  const home = mkdtempSync(join(tmpdir(), 'kerfyard-money-'));
  const [database, stripe] = await Promise.all([makeDatabase(), startProvider(home, webhooks)]);
  const ownerUrl = withDatabase(process.env.TEST_PG_OWNER_URL, database.name);
  await migrate(ownerUrl, () => undefined);
  await prepare(ownerUrl);
  await grantAppRole(ownerUrl);
  const superUrl = withDatabase(process.env.TEST_PG_SUPER_URL, database.name);
  const ruled = new Pool({ connectionString: superUrl, max: 2 });
  const unruled = new Pool({
    connectionString: superUrl,
    max: 1,
    options: '-c session_replication_role=replica',
  });
  const control = async (path: string, body: object = {}, method = 'POST') => {
    const init = method === 'GET' ? { method } : { method, body: JSON.stringify(body) };
    const response = await fetch(`${stripe.url}/_fake/${path}`, init);
    if (!response.ok) throw new Error(`stand-in ${path}: ${response.status} ${await response.text()}`);
    return response.json();
  };
  return {
    appUrl: withDatabase(process.env.TEST_PG_URL, database.name),
    ownerUrl,
    stripeUrl: stripe.url,
    stripeKey: stripe.key,
    provider: new Stripe(stripe.key, {
      host: '127.0.0.1',
      port: stripe.port,
      protocol: 'http',
      telemetry: false,
      maxNetworkRetries: 0,
    }),
    sql: async <Row extends QueryResultRow>(text: string, values: unknown[] = []) =>
      (await ruled.query<Row>(text, values)).rows,
    unruled: async (text, values) => void (await unruled.query(text, values)),
    control,
    empty: async () => {
      await unruled.query(EMPTY);
      await control('reset');
    },
    close: async () => {
      await Promise.all([ruled.end(), unruled.end()]);
      stripe.child.kill('SIGTERM');
      await once(stripe.child, 'exit');
      await database.drop();
      rmSync(home, { recursive: true, force: true });
    },
  };
}
