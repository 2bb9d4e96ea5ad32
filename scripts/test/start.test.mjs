import assert from 'node:assert/strict';
import { spawn } from 'node:child_process';
import { once } from 'node:events';
import {
  chmodSync,
  cpSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readFileSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { createServer } from 'node:http';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { after, afterEach, before, describe, it } from 'node:test';
import { setTimeout as sleep } from 'node:timers/promises';
import { fileURLToPath } from 'node:url';
import { freePorts, isPortFree } from '../lib/ports.mjs';

// A checkout in miniature: the real scripts over programs that only keep their part of the contract.
const miniature = {
  'package.json': JSON.stringify({
    name: 'miniature',
    private: true,
    workspaces: ['common', 'server', 'client'],
  }),
  'package-lock.json': JSON.stringify({ name: 'miniature', lockfileVersion: 3, packages: {} }),
  'node_modules/.package-lock.json': JSON.stringify({ packages: {} }),
  'common/package.json': JSON.stringify({
    name: 'common',
    version: '0.0.0',
    scripts: { build: 'mkdir -p dist' },
  }),
  'client/package.json': JSON.stringify({
    name: 'client',
    version: '0.0.0',
    scripts: { build: 'mkdir -p dist && cp src/index.html dist/' },
  }),
  'client/src/index.html': '<!doctype html>Kerfyard',
  'server/package.json': JSON.stringify({
    name: 'server',
    version: '0.0.0',
    type: 'module',
    scripts: { build: 'mkdir -p dist dist-fakes && cp src/*.js dist/ && cp -r fakes/. dist-fakes' },
  }),
  'server/src/migrate.js': "console.log('migrated', new URL(process.env.DATABASE_OWNER_URL).username);",
  'server/src/seed.js': `
    import { appendFileSync, existsSync, writeFileSync } from 'node:fs';
    appendFileSync(process.env.FILES_DIR + '/seeded', 'x');
    if (existsSync(process.env.SEED_HANGS)) setInterval(() => undefined, 1000);
    const signIns = [{ role: 'owner', name: 'Ada Quill', email: 'ada@kerfyard.example', password: 'secret', note: '' }];
    writeFileSync(process.env.DEMO_SIGN_INS_FILE, JSON.stringify(signIns));`,
  'server/src/main.js': `
    import { createServer } from 'node:http';
    import { readFileSync } from 'node:fs';
    const server = createServer((request, response) => {
      if (request.url === '/crash') process.exit(7);
      response.end(request.url === '/' ? readFileSync(process.env.CLIENT_DIST + '/index.html') : 'ok');
    });
    server.listen(Number(process.env.PORT), process.env.HOST);
    process.on('SIGTERM', () => process.exit(0));`,
  'server/fakes/stripe/main.js': `
    import { createServer } from 'node:http';
    createServer((request, response) => response.end('ok')).listen(Number(process.env.FAKE_STRIPE_PORT), 'localhost');`,
  'server/fakes/mail/main.js': `
    import { createServer } from 'node:net';
    for (const port of [process.env.MAIL_SMTP_PORT, process.env.MAIL_WEB_PORT]) createServer().listen(port, 'localhost');`,
};

let checkout;
let data;
let env;
const running = new Set();

before(async () => {
  checkout = mkdtempSync(join(tmpdir(), 'kerfyard-start-test-'));
  chmodSync(checkout, 0o755); // user postgres has to reach the data
  data = join(checkout, 'data');
  cpSync(fileURLToPath(new URL('..', import.meta.url)), join(checkout, 'scripts'), { recursive: true });
  for (const [path, text] of Object.entries(miniature)) {
    mkdirSync(dirname(join(checkout, path)), { recursive: true });
    writeFileSync(join(checkout, path), text);
  }
  const [app, stripe, mail, smtp, postgres] = await freePorts(5);
  env = {
    ...process.env,
    KERFYARD_DATA_DIR: data,
    KERFYARD_PORT: String(app),
    KERFYARD_STRIPE_PORT: String(stripe),
    KERFYARD_MAIL_PORT: String(mail),
    KERFYARD_SMTP_PORT: String(smtp),
    KERFYARD_POSTGRES_PORT: String(postgres),
    SEED_HANGS: join(checkout, 'seed-hangs'),
    npm_lifecycle_event: '',
  };
});

afterEach(async () => {
  for (const child of running) {
    child.kill('SIGTERM');
    await once(child, 'exit');
  }
});

after(() => rmSync(checkout, { recursive: true, force: true }));

/** Runs a script; `text` grows with its output, `ended` resolves to its exit code. */
function launch(script, more = {}) {
  const child = spawn(process.execPath, [`scripts/${script}`], { cwd: checkout, env: { ...env, ...more } });
  running.add(child);
  const launched = { child, text: '' };
  for (const stream of [child.stdout, child.stderr]) stream.on('data', (chunk) => (launched.text += chunk));
  launched.ended = once(child, 'close').then(([code, signal]) => {
    running.delete(child);
    return code ?? signal;
  });
  return launched;
}

async function until(condition, what, withinMs = 60_000) {
  for (let waited = 0; waited < withinMs; waited += 50) {
    if (await condition()) return;
    await sleep(50);
  }
  assert.fail(`never: ${what()}`);
}

async function startUp() {
  const started = launch('start.mjs');
  await until(
    () => started.text.includes('Ctrl-C') || started.child.exitCode !== null,
    () => started.text,
  );
  assert.equal(started.child.exitCode, null, started.text);
  return started;
}

const appAddress = () => `http://127.0.0.1:${env.KERFYARD_PORT}`;
const timesSeeded = () => readFileSync(join(data, 'files', 'seeded'), 'utf8').length;
const portNames = ['PORT', 'STRIPE_PORT', 'MAIL_PORT', 'SMTP_PORT', 'POSTGRES_PORT'];

async function allPortsFree() {
  for (const name of portNames) if (!(await isPortFree(Number(env[`KERFYARD_${name}`])))) return false;
  return true;
}

describe('npm start', () => {
  it('serves the page, shows the app’s address before any other, and stops all on Ctrl-C', async () => {
    const first = await startUp();
    assert.equal(/\bhttps?:\/\/\S+/.exec(first.text)[0], appAddress());
    assert.match(first.text, /owner\s+Ada Quill\s+ada@kerfyard\.example\s+secret/);
    assert.match(first.text, new RegExp(`Mail page\\s+http://localhost:${env.KERFYARD_MAIL_PORT}`));
    assert.match(await (await fetch(appAddress())).text(), /Kerfyard/);
    first.child.kill('SIGINT');
    assert.equal(await first.ended, 0);
    assert.ok(await allPortsFree());
  });

  it('keeps its data, builds nothing twice and serves within 10 s the second time', async () => {
    const startedAt = Date.now();
    const second = await startUp();
    assert.ok(Date.now() - startedAt < 10_000);
    assert.doesNotMatch(second.text, /Building|Making|Filling/);
    assert.equal(timesSeeded(), 1);
  });

  it('refuses to run twice and says where it runs; reset then refuses too', async () => {
    await startUp();
    const again = launch('start.mjs');
    assert.equal(await again.ended, 1);
    assert.match(again.text, new RegExp(`already runs.*${appAddress()}`));
    const reset = launch('reset.mjs');
    assert.equal(await reset.ended, 1);
    assert.match(reset.text, /nothing was wiped/);
    assert.equal(timesSeeded(), 1);
  });

  it('leaves nothing running when it is killed, and starts again', async () => {
    const first = await startUp();
    first.child.kill('SIGKILL');
    await first.ended;
    await until(allPortsFree, () => 'all ports free');
    await startUp();
  });

  it('starts at once after a kill, while the earlier run still ends', async () => {
    const first = await startUp();
    first.child.kill('SIGKILL');
    await first.ended;
    await startUp();
    assert.equal(timesSeeded(), 1);
  });

  it('names the variable to set when the app’s port is taken', async () => {
    const other = createServer().listen(Number(env.KERFYARD_PORT), '127.0.0.1');
    await once(other, 'listening');
    const refused = launch('start.mjs');
    assert.equal(await refused.ended, 1);
    other.close();
    assert.match(
      refused.text,
      new RegExp(`Port ${env.KERFYARD_PORT}.*is used[^]*KERFYARD_PORT=\\d+ npm start`),
    );
  });

  it('ends with the log when the app crashes', async () => {
    const started = await startUp();
    await fetch(`${appAddress()}/crash`).catch(() => undefined);
    assert.equal(await started.ended, 1);
    assert.match(started.text, /app ended unexpectedly \(7\)/);
    assert.ok(await allPortsFree());
  });

  it('makes the demo anew when it was killed while making it', async () => {
    assert.equal(await launch('reset.mjs').ended, 0);
    assert.ok(!existsSync(join(data, 'postgres')));
    writeFileSync(env.SEED_HANGS, '');
    const first = launch('start.mjs');
    await until(
      () => existsSync(join(data, 'files', 'seeded')),
      () => first.text,
    );
    first.child.kill('SIGKILL');
    await first.ended;
    rmSync(env.SEED_HANGS);
    const second = await startUp();
    assert.match(second.text, /making it anew/);
    assert.equal(timesSeeded(), 1);
  });
});
