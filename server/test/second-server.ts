import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { createServer, type AddressInfo } from 'node:net';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';

export interface SecondServer {
  url: string;
  /** Everything it printed. */
  output: () => string;
  signal: (name: NodeJS.Signals) => void;
  exited: Promise<number | null>;
  stop: () => Promise<void>;
}

const program = join(__dirname, '../dist/main.js');

/** The built server once more, beside the one under test, over the same database, with other settings. */
export async function startSecondServer(overrides: Record<string, string> = {}): Promise<SecondServer> {
  const port = await freePort();
  const url = `http://127.0.0.1:${port}`;
  const child = spawn(process.execPath, ['--enable-source-maps', program], {
    stdio: ['ignore', 'pipe', 'pipe'],
    env: { ...secondServerSettings(port, url), ...overrides },
  });
  let output = '';
  child.stdout.on('data', (chunk: Buffer) => (output += chunk.toString()));
  child.stderr.on('data', (chunk: Buffer) => (output += chunk.toString()));
  const exited = once(child, 'exit').then(([code]) => code as number | null);
  const server: SecondServer = {
    url,
    output: () => output,
    signal: (name) => void child.kill(name),
    exited,
    stop: async () => {
      child.kill('SIGTERM');
      await exited;
    },
  };
  await waitUntilHealthy(server, () => child.exitCode);
  return server;
}

/** What the server under test was told, for another process beside it. */
export function secondServerSettings(port: number, url: string): Record<string, string> {
  const env = process.env as Record<string, string>;
  return {
    PATH: env.PATH ?? '',
    NODE_ENV: 'test',
    KERFYARD_MODE: 'test',
    HOST: '127.0.0.1',
    PORT: String(port),
    APP_URL: url,
    DATABASE_URL: env.TEST_PG_URL ?? '',
    KERFYARD_MASTER_KEY_FILE: env.TEST_MASTER_KEY_FILE ?? '',
    KERFYARD_SIGNING_SECRET: env.TEST_SIGNING_SECRET ?? '',
    FILES_DIR: env.TEST_FILES_DIR ?? '',
    STRIPE_SECRET_KEY: env.FAKE_STRIPE_SECRET_KEY ?? '',
    STRIPE_API_URL: env.FAKE_STRIPE_URL ?? '',
    STRIPE_WEBHOOK_SECRET: env.TEST_STRIPE_WEBHOOK_SECRET ?? '',
    STRIPE_CONNECT_WEBHOOK_SECRET: env.TEST_STRIPE_CONNECT_WEBHOOK_SECRET ?? '',
    SMTP_URL: env.TEST_SMTP_URL ?? '',
    MAIL_FROM: 'Kerfyard <no-reply@kerfyard.example>',
    // Counts are shared with the server under test, which all specs ask from one address.
    RATE_LIMIT_FACTOR: '1000',
  };
}

async function waitUntilHealthy(server: SecondServer, exitCode: () => number | null): Promise<void> {
  for (let tries = 0; tries < 300; tries += 1) {
    if (exitCode() !== null)
      throw new Error(`the second server ended with ${exitCode()}:\n${server.output()}`);
    const isUp = await fetch(`${server.url}/api/health`).then(
      (response) => response.ok,
      () => false,
    );
    if (isUp) return;
    await sleep(100);
  }
  await server.stop();
  throw new Error(`the second server did not answer:\n${server.output()}`);
}

async function freePort(): Promise<number> {
  const probe = createServer();
  probe.listen(0, '127.0.0.1');
  await once(probe, 'listening');
  const { port } = probe.address() as AddressInfo;
  probe.close();
  await once(probe, 'close');
  return port;
}
