import { fork } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { buildStale } from '../../scripts/lib/build.mjs';

const stackProgram = fileURLToPath(new URL('../../scripts/stack.mjs', import.meta.url));

/**
 * One whole stack in a child process for all specs: jest's parent transforms what it loads, which gives Nest two copies
 * of itself. Specs find it by the environment variables set here.
 */
export default async function globalSetup() {
  // Specs talk to what is built; while two people edit, yesterday's types error elsewhere must not stop this spec.
  await buildStale(['common', 'server'], { tolerant: true });
  const stack = fork(stackProgram, [], { stdio: ['ignore', 'ignore', 'inherit', 'ipc'], execArgv: [] });
  globalThis.kerfyardStack = stack;
  const info = await new Promise((resolve, reject) => {
    stack.once('message', resolve);
    stack.once('error', reject);
    stack.once('exit', (code) => reject(new Error(`The test stack ended with ${code} before it was ready.`)));
  });
  stack.unref();
  stack.channel.unref();
  Object.assign(process.env, {
    BASE_URL: info.url,
    FAKE_STRIPE_URL: info.stripeUrl,
    FAKE_STRIPE_SECRET_KEY: info.stripeSecretKey,
    MAIL_URL: info.mailUrl,
    TEST_SMTP_URL: info.smtpUrl,
    TEST_PG_URL: info.pgUrl,
    TEST_PG_OWNER_URL: info.pgOwnerUrl,
    TEST_PG_SUPER_URL: info.pgSuperUrl,
    TEST_FILES_DIR: info.filesDir,
    TEST_MASTER_KEY_FILE: info.masterKeyFile,
    TEST_SIGNING_SECRET: info.signingSecret,
    TEST_STRIPE_WEBHOOK_SECRET: info.stripeWebhookSecret,
    TEST_STRIPE_CONNECT_WEBHOOK_SECRET: info.stripeConnectWebhookSecret,
    TEST_LOGS_DIR: info.logsDir,
    STACK_CONTROL_URL: info.controlUrl,
  });
}
