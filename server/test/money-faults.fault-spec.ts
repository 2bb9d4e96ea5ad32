import { spawn, type ChildProcess } from 'node:child_process';
import { randomUUID } from 'node:crypto';
import { once } from 'node:events';
import { createServer, request as forward, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { Passwords } from '../src/platform/auth/passwords.ts';
import { BOOK_CHECKS } from '../src/ledger/ledger.queries.ts';
import { acceptLines, makeMoneyWork, type MoneyWork } from './builders/money-work.ts';
import { signIn } from './builders/people.ts';
import type { Client } from './client.ts';
import { freePort, openMoneyLab, type MoneyLab } from './money-lab.ts';
import { wireMoney } from './money-services.ts';
import { secondServerSettings } from './second-server.ts';
import { until } from './provider.ts';

/*
 * C-01, C-02, C-04: the app is killed (SIGKILL) at random moments while money is released, and the provider loses
 * requests and answers. Afterwards every release has exactly its transfers, and the books hold and equal the provider.
 * The control run takes the idempotency keys out of the requests on their way: then money must go twice, or the test
 * could not have seen it.
 *
 * KERFYARD_KILLS how many, KERFYARD_SEED repeats a run's choices (`npm run faults`).
 */
const KILLS = Number(process.env.KERFYARD_KILLS ?? 200);
const CONTROL_KILLS = Math.max(10, Math.round(KILLS / 5));
const RELEASES_A_LIFE = 8;
const seed = Number(process.env.KERFYARD_SEED ?? Math.floor(Math.random() * 2 ** 31));
const PASSWORD = 'a kettle on the ninth stair';
const WEBHOOK_SECRET = 'whsec_faults_account';

jest.setTimeout((KILLS + CONTROL_KILLS) * 30_000 + 900_000);

/** Numbers from 0 to 1 that a seed repeats (mulberry32). */
function createRandom(from: number): () => number {
  let state = from;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296;
  };
}

interface Task {
  releaseId: string;
  completionId: string;
  isDone: boolean;
}

interface Scene {
  lab: MoneyLab;
  work: MoneyWork;
  email: string;
  tasks: Task[];
}

/** The app as one process that can be killed and started again at the same address. */
class App {
  private child: ChildProcess | null = null;

  constructor(
    private readonly lab: MoneyLab,
    private readonly port: number,
    private readonly stripeUrl: string,
  ) {}

  get url(): string {
    return `http://127.0.0.1:${this.port}`;
  }

  start(): void {
    this.child = spawn(process.execPath, [join(__dirname, '../dist/main.js')], {
      stdio: ['ignore', 'ignore', 'inherit'],
      env: {
        ...secondServerSettings(this.port, this.url),
        DATABASE_URL: this.lab.appUrl,
        STRIPE_SECRET_KEY: this.lab.stripeKey,
        STRIPE_API_URL: this.stripeUrl,
        STRIPE_WEBHOOK_SECRET: WEBHOOK_SECRET,
        RATE_LIMIT_FACTOR: '1000',
        LOG_LEVEL: 'silent',
      },
    });
  }

  async untilUp(): Promise<void> {
    const isUp = async () => {
      if (this.child?.exitCode != null) throw new Error(`the app ended with ${this.child.exitCode}`);
      const health = await fetch(`${this.url}/api/health`).catch(() => null);
      return health?.ok === true ? true : null;
    };
    await until('the app', isUp, 120_000);
  }

  async kill(): Promise<void> {
    const child = this.child;
    if (child === null || child.exitCode !== null || child.signalCode !== null) return;
    child.kill('SIGKILL');
    await once(child, 'exit');
  }
}

/** The job runner's schema with the rest, by the program that a deployment runs. */
async function migrateAsDeployed(ownerUrl: string): Promise<void> {
  const env = { PATH: process.env.PATH, DATABASE_OWNER_URL: ownerUrl };
  const child = spawn(process.execPath, [join(__dirname, '../dist/migrate.js')], { stdio: 'inherit', env });
  const [code] = (await once(child, 'exit')) as [number | null];
  if (code !== 0) throw new Error(`migrating ended with ${code}`);
}

/** Passes requests on to the provider without their idempotency keys. */
async function startKeyStripper(target: string): Promise<{ url: string; server: Server }> {
  const { hostname, port } = new URL(target);
  const server = createServer((incoming, outgoing) => {
    const { 'idempotency-key': _, ...headers } = incoming.headers;
    const onward = forward(
      { hostname, port, path: incoming.url, method: incoming.method, headers },
      (answer) => {
        outgoing.writeHead(answer.statusCode ?? 502, answer.headers);
        answer.pipe(outgoing);
      },
    );
    // A line that the provider drops is dropped towards the app as well.
    onward.on('error', () => incoming.socket.destroy());
    incoming.pipe(onward);
  });
  server.listen(0, '127.0.0.1');
  await once(server, 'listening');
  return { url: `http://127.0.0.1:${(server.address() as AddressInfo).port}`, server };
}

/** One subcontract of many lines, all paid for, accepted and waiting to be released; the crew can be paid. */
async function setScene(lab: MoneyLab, app: App, lineCount: number): Promise<Scene> {
  const work = await makeMoneyWork(lab, {
    lineCents: Array.from({ length: lineCount }, (_, index) => 10_000 + index),
    retainageBasisPoints: 500,
    feeBasisPoints: 500,
  });
  const email = `${work.gc.userId}@northpier.example`;
  await lab.unruled('UPDATE app_user SET password_hash = $2, email_verified_at = app_now() WHERE id = $1', [
    work.gc.userId,
    await new Passwords().hash(PASSWORD),
  ]);
  await lab.unruled(`INSERT INTO membership (user_id, company_id, role) VALUES ($1, $2, 'owner')`, [
    work.gc.userId,
    work.gc.company?.id,
  ]);
  const account = await lab.provider.accounts.create({ capabilities: { transfers: { requested: true } } });
  await lab.control('onboard', { account: account.id });
  await lab.unruled('UPDATE company SET payout_account_id = $2, payouts_ready = true WHERE id = $1', [
    work.crew.company?.id,
    account.id,
  ]);
  const client = await signIn(email, PASSWORD, app.url);
  // Several payments, so that releases draw on more than one charge.
  const size = Math.ceil(lineCount / 5);
  for (let from = 0; from < lineCount; from += size) {
    await payFor(
      lab,
      client,
      work,
      work.lines.slice(from, from + size).map((line) => line.id),
    );
  }
  const tasks: Task[] = [];
  for (const line of work.lines) {
    const completionId = await acceptLines(lab, work, [line.id]);
    tasks.push({ releaseId: randomUUID(), completionId, isDone: false });
  }
  return { lab, work, email, tasks };
}

async function payFor(lab: MoneyLab, client: Client, work: MoneyWork, sovLineIds: string[]): Promise<void> {
  const id = randomUUID();
  const path = `/api/subcontracts/${work.subcontractId}/set-aside`;
  const answer = await client.post(path, { id, sovLineIds, method: 'card' });
  if (answer.status !== 201) throw new Error(`setting aside gave ${answer.status}: ${answer.text}`);
  const funding = async () =>
    (
      await lab.sql<{ status: string; checkout_session_id: string | null }>(
        'SELECT status, checkout_session_id FROM funding WHERE id = $1',
        [id],
      )
    )[0];
  const session = await until('the payment page', async () => (await funding())?.checkout_session_id ?? null);
  await lab.control('pay', { session });
  await until('the money', async () => ((await funding())?.status === 'succeeded' ? true : null), 60_000);
}

/** Send a release; done once it was answered, however often it was asked. */
async function release(client: Client, task: Task): Promise<void> {
  const body = { id: task.releaseId, completionId: task.completionId };
  const status = await client.post('/api/releases', body).then(
    (answer) => answer.status,
    () => 0,
  );
  if (status === 201) task.isDone = true;
  else if (status !== 0 && status < 500) throw new Error(`a release gave ${status}`);
}

/** What the provider does wrong during one life of the app. */
async function orderFaults(lab: MoneyLab, random: () => number): Promise<void> {
  await lab.control('faults', {}, 'DELETE');
  for (const kind of ['drop_before', 'drop_after', '409', 'delay']) {
    if (random() < 0.4) continue;
    const delay = kind === 'delay' ? { delayMs: Math.round(random() * 300) } : {};
    const count = 1 + Math.floor(random() * 2);
    await lab.control('faults', { kind, path: '/v1/transfers', method: 'POST', count, ...delay });
  }
}

async function liveAndDie(scene: Scene, app: App, random: () => number): Promise<void> {
  await orderFaults(scene.lab, random);
  app.start();
  if (random() < 0.1) {
    // Some die while they start.
    await sleep(random() * 2_500);
    return app.kill();
  }
  await app.untilUp();
  const client = await signIn(scene.email, PASSWORD, app.url);
  const tasks = scene.tasks.filter(({ isDone }) => !isDone).slice(0, RELEASES_A_LIFE);
  const releases = Promise.all(tasks.map((task) => release(client, task)));
  await sleep(random() * 900);
  await app.kill();
  await releases;
}

/** A last life without faults, until nothing is left to do. */
async function comeToRest(scene: Scene, app: App): Promise<void> {
  await scene.lab.control('faults', {}, 'DELETE');
  app.start();
  await app.untilUp();
  const client = await signIn(scene.email, PASSWORD, app.url);
  for (const task of scene.tasks.filter(({ isDone }) => !isDone)) await release(client, task);
  await until(
    'all transfers',
    async () => {
      const [row] = await scene.lab.sql<{ open: number }>(
        `SELECT (SELECT count(*) FROM provider_operation WHERE status IN ('requested', 'unknown'))::int
           + (SELECT count(*) FROM stripe_event WHERE status IN ('received', 'parked'))::int AS open`,
      );
      return row?.open === 0 ? true : null;
    },
    600_000,
  );
  await app.kill();
}

async function transfersByOperation(lab: MoneyLab): Promise<Map<string, number>> {
  const counts = new Map<string, number>();
  for await (const transfer of lab.provider.transfers.list({ limit: 100 })) {
    const id = transfer.metadata.operation_id ?? '';
    counts.set(id, (counts.get(id) ?? 0) + 1);
  }
  return counts;
}

async function brokenRules(lab: MoneyLab): Promise<string[]> {
  const broken: string[] = [];
  for (const [id, check] of Object.entries(BOOK_CHECKS)) {
    if ((await lab.sql(check.sql)).length > 0) broken.push(id);
  }
  return broken;
}

/** Everything up to the end of the last life. Gives how often each operation moved money, and what differs. */
async function runKills(kills: number, withKeys: boolean) {
  const random = createRandom(withKeys ? seed : seed + 1);
  const port = await freePort();
  const webhook = { url: `http://127.0.0.1:${port}/api/payments/webhooks/account`, secret: WEBHOOK_SECRET };
  const lab = await openMoneyLab(migrateAsDeployed, [{ ...webhook, connect: false }]);
  const stripper = withKeys ? null : await startKeyStripper(lab.stripeUrl);
  const app = new App(lab, port, stripper?.url ?? lab.stripeUrl);
  try {
    app.start();
    await app.untilUp();
    const scene = await setScene(lab, app, kills * RELEASES_A_LIFE);
    await app.kill();
    for (let kill = 0; kill < kills; kill += 1) await liveAndDie(scene, app, random);
    await comeToRest(scene, app);
    const money = wireMoney(lab);
    await money.fundings.settleAll();
    const differences = await money.reconciliation.compare();
    await money.close();
    const counts = await transfersByOperation(lab);
    const [row] = await lab.sql<{ releases: number; transfers: number; waiting: number }>(
      `SELECT (SELECT count(*) FROM release)::int AS releases, (SELECT count(*) FROM release_transfer)::int AS transfers,
        (SELECT count(*) FROM release WHERE status <> 'transferred')::int AS waiting`,
    );
    return {
      tasks: scene.tasks.length,
      releases: row?.releases,
      waiting: row?.waiting,
      recorded: row?.transfers,
      operations: counts.size,
      doubles: [...counts.values()].filter((count) => count > 1).length,
      broken: await brokenRules(lab),
      differences,
    };
  } finally {
    await app.kill();
    stripper?.server.close();
    await lab.close();
  }
}

describe(`kills while money is released (seed ${seed})`, () => {
  it(`C-01, C-04: after ${KILLS} kills every release has exactly its transfers, and the books hold`, async () => {
    const outcome = await runKills(KILLS, true);
    process.stdout.write(`with keys, ${KILLS} kills: ${JSON.stringify(outcome)}\n`);
    expect(outcome).toMatchObject({
      releases: outcome.tasks,
      waiting: 0,
      operations: outcome.recorded,
      doubles: 0,
      broken: [],
      differences: [],
    });
  });

  it(`C-02: without idempotency keys ${CONTROL_KILLS} kills show money that went twice`, async () => {
    const outcome = await runKills(CONTROL_KILLS, false);
    const { differences, ...shown } = outcome;
    process.stdout.write(`without keys, ${CONTROL_KILLS} kills: ${JSON.stringify(shown)}\n`);
    expect(outcome.doubles).toBeGreaterThan(0);
    // Our own rules cannot see it; the comparison with the provider does.
    expect(outcome.broken).toEqual([]);
    expect(differences.filter(({ kind }) => kind === 'transfer_unknown').length).toBeGreaterThanOrEqual(
      outcome.doubles,
    );
  });
});
