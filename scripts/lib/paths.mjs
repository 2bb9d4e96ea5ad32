import { createHash } from 'node:crypto';
import { chmodSync, mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** Absolute path of the checkout, without a trailing slash. */
export const root = fileURLToPath(new URL('../..', import.meta.url)).replace(/\/$/, '');

export const isRoot = process.getuid?.() === 0;

/** Absolute path of something inside the checkout. */
export const inRoot = (...parts) => join(root, ...parts);

const rootHome = '/var/lib/kerfyard';

/**
 * The folder that holds everything this checkout keeps between runs: database cluster, uploaded files, keys, state of
 * the stand-ins, logs, pid files. It is one folder so that a database never outlives the key its sealed bids need.
 *
 * PostgreSQL refuses to run as root, so root's cluster belongs to user postgres and must lie where that user can walk:
 * a checkout below /root is closed to it.
 */
export function dataDirectory() {
  if (process.env.KERFYARD_DATA_DIR) return process.env.KERFYARD_DATA_DIR;
  if (!isRoot) return inRoot('.data');
  return join(rootHome, createHash('sha256').update(root).digest('hex').slice(0, 12));
}

/** Makes a data folder; root's is open to be walked through whatever the umask says. */
export function makeHome(home) {
  mkdirSync(home, { recursive: true });
  if (!isRoot) return;
  if (home.startsWith(rootHome)) chmodSync(rootHome, 0o755);
  chmodSync(home, 0o711);
}

/** The places inside a data folder. */
export function placesIn(home) {
  return {
    home,
    clusterHome: join(home, 'postgres'),
    files: join(home, 'files'),
    keys: join(home, 'keys'),
    logs: join(home, 'logs'),
    previousLogs: join(home, 'logs.previous'),
    run: join(home, 'run'),
    stripe: join(home, 'stripe'),
    mail: join(home, 'mail'),
    masterKeyFile: join(home, 'keys', 'master.key'),
    secretsFile: join(home, 'keys', 'secrets.json'),
    signInsFile: join(home, 'demo-sign-ins.json'),
  };
}
