import { fork } from 'node:child_process';
import { once } from 'node:events';
import { fileURLToPath } from 'node:url';
import { buildStale } from './build.mjs';

const stackProgram = fileURLToPath(new URL('../stack.mjs', import.meta.url));

/** What specs read from the environment: one name for each thing that stack.mjs tells. */
const variables = {
  BASE_URL: 'url',
  FAKE_STRIPE_URL: 'stripeUrl',
  FAKE_STRIPE_SECRET_KEY: 'stripeSecretKey',
  MAIL_URL: 'mailUrl',
  TEST_SMTP_URL: 'smtpUrl',
  TEST_PG_URL: 'pgUrl',
  TEST_PG_OWNER_URL: 'pgOwnerUrl',
  TEST_PG_SUPER_URL: 'pgSuperUrl',
  TEST_FILES_DIR: 'filesDir',
  TEST_MASTER_KEY_FILE: 'masterKeyFile',
  TEST_SIGNING_SECRET: 'signingSecret',
  TEST_STRIPE_WEBHOOK_SECRET: 'stripeWebhookSecret',
  TEST_STRIPE_CONNECT_WEBHOOK_SECRET: 'stripeConnectWebhookSecret',
  TEST_SIGN_INS_FILE: 'signInsFile',
  TEST_LOGS_DIR: 'logsDir',
  STACK_CONTROL_URL: 'controlUrl',
};

/** Starts stack.mjs with these options; resolves to `{ info, stop, child }` once it is ready. */
export async function startStack(options = [], env = process.env) {
  const child = fork(stackProgram, options, {
    stdio: ['ignore', 'ignore', 'inherit', 'ipc'],
    execArgv: [],
    env,
  });
  const info = await new Promise((resolve, reject) => {
    child.once('message', resolve);
    child.once('error', reject);
    child.once('exit', (code) => reject(new Error(`The stack ended with ${code} before it was ready.`)));
  });
  // A runner that ends early must not hang on its stack; the stack notices and cleans up.
  child.unref();
  child.channel.unref();
  const stop = async () => {
    if (child.exitCode !== null || child.signalCode !== null) return;
    child.ref();
    child.kill('SIGTERM');
    await once(child, 'exit');
  };
  return { info, stop, child };
}

/** The environment variables by which specs find a running stack. */
export function stackVariables(info) {
  const entries = Object.entries(variables).map(([name, key]) => [name, info[key]]);
  return Object.fromEntries(entries.filter(([, value]) => value));
}

/**
 * A runner's global setup: builds what is stale, starts a stack and puts what specs need into process.env. Resolves to
 * the function that stops it. While people edit, what is broken elsewhere must not stop a spec that does not need it: a
 * failed build leaves what is built, and when the app does not start there are still database and mail. Specs that do
 * need the app then fail, since BASE_URL is not set.
 */
export async function setUpStack(workspaces) {
  await buildStale(workspaces, { tolerant: true });
  const stack = await startStack().catch((error) => {
    console.error(`${error.message} Going on without the app.`);
    return startStack(['--no-app', '--migrate']);
  });
  Object.assign(process.env, stackVariables(stack.info));
  return stack.stop;
}
