import { execFileSync, spawn } from 'node:child_process';
import type { ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { appendFileSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import Stripe from 'stripe';
import { Journal } from './journal.ts';
import { PLATFORM } from './records.ts';
import { Store } from './store.ts';
import { Harness, SECRET_KEY } from './test/harness.ts';

describe('state survives', () => {
  const harness = new Harness();
  beforeAll(() => harness.start());
  afterAll(() => harness.stop());

  test('a restart: objects, keys, the moved clock, timers and undelivered webhooks', async () => {
    await harness.control('POST', 'clock/advance', { days: 3 });
    await harness.control('POST', 'webhooks', { isHolding: true });
    const debit = await harness.paidCharge(10_000, 'pm_usBankAccount_success');
    const customer = await harness.stripe.customers.create({ name: 'A' }, { idempotencyKey: 'kept' });
    const clockBefore = await harness.control<{ offsetSeconds: number }>('GET', 'clock');
    await harness.stopStandIn();
    await harness.startStandIn();
    expect(await harness.control('GET', 'clock')).toMatchObject({ offsetSeconds: clockBefore.offsetSeconds });
    const again = await harness.stripe.customers.create({ name: 'A' }, { idempotencyKey: 'kept' });
    expect(again.id).toBe(customer.id);
    expect(again.lastResponse.headers['idempotent-replayed']).toBe('true');
    expect(harness.receiver.received).toEqual([]);
    await harness.control('POST', 'webhooks', { isHolding: false });
    await harness.webhook('platform', 'customer.created', customer.id);
    await harness.advance({ days: 7 });
    expect((await harness.stripe.charges.retrieve(debit.id)).status).toBe('succeeded');
    const endpoints = await harness.stripe.webhookEndpoints.list();
    expect(endpoints.data).toHaveLength(2);
  });

  test('a line that a crash cut short is dropped, the rest is read', async () => {
    const customer = await harness.stripe.customers.create({ name: 'B' });
    await harness.stopStandIn();
    const journal = join(harness.dataDir, 'journal.ndjson');
    appendFileSync(journal, '{"put":[["customer",{"id":"cus_half"');
    await harness.startStandIn();
    expect((await harness.stripe.customers.retrieve(customer.id)).id).toBe(customer.id);
    await harness.stripe.customers.create({ name: 'C' });
    const lines = readFileSync(journal, 'utf8').trimEnd().split('\n');
    expect(() => lines.map((line) => JSON.parse(line) as unknown)).not.toThrow();
    expect(lines.join('')).not.toContain('cus_half');
  });

  test('reset forgets everything but the seeded endpoints', async () => {
    await harness.stripe.customers.create({ name: 'D' });
    await harness.control('POST', 'reset');
    expect((await harness.stripe.customers.list()).data).toEqual([]);
    expect((await harness.stripe.webhookEndpoints.list()).data).toHaveLength(2);
    expect(await harness.control('GET', 'clock')).toMatchObject({ offsetSeconds: 0 });
  });
});

describe('the journal', () => {
  test('is rewritten as it stands when it has grown, and not with every change after that', () => {
    const dataDir = mkdtempSync(join(tmpdir(), 'journal-'));
    const path = join(dataDir, 'journal.ndjson');
    const lines = () => readFileSync(path, 'utf8').trimEnd().split('\n').length;
    const journal = new Journal(dataDir, 5_000);
    const store = new Store(journal);
    store.load();
    const customer = (id: string, name: string) =>
      ({ id, owner: PLATFORM, api: { id, name }, notes: {} }) as never;
    const write = (id: string, name: string) => {
      const change = store.begin();
      change.put('customer', customer(id, name));
      change.commit();
    };
    for (let round = 0; round < 200; round += 1) write(`cus_${round % 10}`, `name ${round}`);
    expect(lines()).toBeLessThan(100);
    for (let round = 0; round < 200; round += 1) write(`cus_more_${round}`, 'x'.repeat(100));
    expect(lines()).toBeGreaterThan(200);
    journal.close();

    const reopened = new Store(new Journal(dataDir));
    reopened.load();
    const all = reopened.begin().list('customer', PLATFORM);
    expect(all).toHaveLength(210);
    expect(all.at(-1)!.api.name).toBe('name 190');
    rmSync(dataDir, { recursive: true });
  });
});

/** The program as people start it, built first. */
class Program {
  readonly dataDir = mkdtempSync(join(tmpdir(), 'payment-stand-in-'));
  private child: ChildProcess | null = null;
  url = '';

  async start(env: Record<string, string> = {}): Promise<void> {
    const main = join(__dirname, '../../dist-fakes/stripe/main.js');
    this.child = spawn(process.execPath, [main], {
      stdio: ['ignore', 'pipe', 'inherit'],
      env: {
        ...process.env,
        FAKE_STRIPE_PORT: '0',
        FAKE_STRIPE_DATA_DIR: this.dataDir,
        FAKE_STRIPE_SECRET_KEY: SECRET_KEY,
        ...env,
      },
    });
    const [line] = (await once(this.child.stdout!, 'data')) as [Buffer];
    this.url = String(line).match(/http:\S+/)![0];
  }

  async end(signal: NodeJS.Signals): Promise<number | null> {
    const child = this.child!;
    const ended = once(child, 'exit');
    child.kill(signal);
    const [code] = (await ended) as [number | null];
    return code;
  }

  sdk(): Stripe {
    const { hostname: host, port } = new URL(this.url);
    return new Stripe(SECRET_KEY, { host, port: Number(port), protocol: 'http', maxNetworkRetries: 0 });
  }
}

describe('the program', () => {
  const program = new Program();

  beforeAll(() => {
    const compiler = join(
      dirname(createRequire(__filename).resolve('@kerfyard/tsc/package.json')),
      'bin/tsc',
    );
    execFileSync(process.execPath, [compiler, '-b', join(__dirname, '..')], { stdio: 'inherit' });
  }, 60_000);
  afterAll(() => rmSync(program.dataDir, { recursive: true, force: true }));

  test('kill -9 while requests are under way: what was answered is there, nothing is there twice', async () => {
    const answered = new Map<string, string>();
    let sent = 0;
    for (let round = 0; round < 5; round += 1) {
      await program.start();
      const stripe = program.sdk();
      const ask = async (): Promise<void> => {
        for (;;) {
          const name = `customer-${(sent += 1)}`;
          const customer = await stripe.customers.create(
            { name, email: `${name}@example.test` },
            { idempotencyKey: name },
          );
          answered.set(name, customer.id);
        }
      };
      const askers = [ask(), ask(), ask(), ask()].map((asker) => asker.catch(() => undefined));
      await new Promise((resolve) => setTimeout(resolve, 150 + round * 40));
      await program.end('SIGKILL');
      await Promise.all(askers);
    }
    await program.start();
    const stripe = program.sdk();
    // The requests that were cut are asked again under their keys, as an app would.
    for (let index = 1; index <= sent; index += 1) {
      const name = `customer-${index}`;
      const { id } = await stripe.customers.create(
        { name, email: `${name}@example.test` },
        { idempotencyKey: name },
      );
      if (answered.has(name)) expect(id).toBe(answered.get(name));
    }
    const all = await stripe.customers.list({ limit: 100 }).autoPagingToArray({ limit: 10_000 });
    expect(answered.size).toBeGreaterThan(20);
    expect(all).toHaveLength(sent);
    expect(new Set(all.map(({ name }) => name)).size).toBe(sent);
    expect(await program.end('SIGTERM')).toBe(0);
  }, 60_000);

  test('SIGTERM ends it at once, also with a request and webhooks hanging', async () => {
    await program.start();
    await fetch(`${program.url}/_fake/faults`, {
      method: 'POST',
      body: JSON.stringify({ kind: 'delay', path: '/v1/balance', delayMs: 60_000 }),
    });
    const hanging = program
      .sdk()
      .balance.retrieve()
      .catch(() => 'cut');
    await new Promise((resolve) => setTimeout(resolve, 100));
    const started = Date.now();
    expect(await program.end('SIGTERM')).toBe(0);
    expect(Date.now() - started).toBeLessThan(4000);
    expect(await hanging).toBe('cut');
  });

  test.each([
    ['a live key', { FAKE_STRIPE_SECRET_KEY: 'sk_live_0123456789' }],
    [
      'a webhook beyond this machine',
      { FAKE_STRIPE_WEBHOOKS: '[{"url":"https://example.test/x","secret":"whsec_1"}]' },
    ],
    ['no port', { FAKE_STRIPE_PORT: 'many' }],
  ])('refuses to start with %s', async (_name, env) => {
    const child = spawn(process.execPath, [join(__dirname, '../../dist-fakes/stripe/main.js')], {
      stdio: ['ignore', 'ignore', 'pipe'],
      env: { ...process.env, FAKE_STRIPE_PORT: '0', FAKE_STRIPE_DATA_DIR: program.dataDir, ...env },
    });
    let said = '';
    child.stderr.on('data', (chunk: Buffer) => (said += String(chunk)));
    const [code] = (await once(child, 'exit')) as [number];
    expect(code).toBe(1);
    expect(said.trim().split('\n')).toHaveLength(1);
  });
});
