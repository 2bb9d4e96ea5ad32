import { fork, spawn } from 'node:child_process';
import { once } from 'node:events';
import { createServer } from 'node:net';
import { setTimeout as sleep } from 'node:timers/promises';
import { fileURLToPath } from 'node:url';

const program = fileURLToPath(new URL('../../dist/main.js', import.meta.url));

async function freePort() {
  const probe = createServer().listen(0, '127.0.0.1');
  await once(probe, 'listening');
  const { port } = probe.address();
  probe.close();
  await once(probe, 'close');
  return port;
}

/** The built server once more beside the stack's own, over the same data; resolves to `{ url, stop }`. */
export async function startServer(overrides = {}) {
  const port = await freePort();
  const url = `http://127.0.0.1:${port}`;
  const {
    PATH,
    TEST_PG_URL,
    TEST_MASTER_KEY_FILE,
    TEST_SIGNING_SECRET,
    TEST_FILES_DIR,
    FAKE_STRIPE_SECRET_KEY,
    FAKE_STRIPE_URL,
    TEST_STRIPE_WEBHOOK_SECRET,
    TEST_STRIPE_CONNECT_WEBHOOK_SECRET,
    TEST_SMTP_URL,
  } = process.env;
  const env = {
    PATH,
    KERFYARD_MODE: 'test',
    PORT: String(port),
    APP_URL: url,
    DATABASE_URL: TEST_PG_URL,
    KERFYARD_MASTER_KEY_FILE: TEST_MASTER_KEY_FILE,
    KERFYARD_SIGNING_SECRET: TEST_SIGNING_SECRET,
    FILES_DIR: TEST_FILES_DIR,
    STRIPE_SECRET_KEY: FAKE_STRIPE_SECRET_KEY,
    STRIPE_API_URL: FAKE_STRIPE_URL,
    STRIPE_WEBHOOK_SECRET: TEST_STRIPE_WEBHOOK_SECRET,
    STRIPE_CONNECT_WEBHOOK_SECRET: TEST_STRIPE_CONNECT_WEBHOOK_SECRET,
    SMTP_URL: TEST_SMTP_URL,
    MAIL_FROM: 'Kerfyard <no-reply@kerfyard.example>',
    LOG_LEVEL: 'error',
    RATE_LIMIT_FACTOR: '1000',
    ...overrides,
  };
  const child = spawn(process.execPath, [program], { env, stdio: ['ignore', 'ignore', 'inherit'] });
  for (let tries = 0; tries < 300; tries += 1) {
    if (child.exitCode !== null) throw new Error(`the server ended with ${child.exitCode}`);
    const isUp = await fetch(`${url}/api/health`).then(
      ({ ok }) => ok,
      () => false,
    );
    if (isUp) return { url, stop: () => end(child) };
    await sleep(100);
  }
  await end(child);
  throw new Error('the server did not answer');
}

/** A bench's own bare server in a process of its own; told `settings`, it answers with its address. */
export async function startBare(file, settings) {
  const child = fork(fileURLToPath(file), { stdio: ['ignore', 'ignore', 'inherit', 'ipc'] });
  child.send(settings);
  const [{ url }] = await once(child, 'message');
  return { url, stop: () => end(child) };
}

async function end(child) {
  if (child.exitCode !== null) return;
  child.kill('SIGTERM');
  await once(child, 'exit');
}
