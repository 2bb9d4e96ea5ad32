import { cpSync, existsSync, mkdirSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { mailUrl, migrationEnvironment, serverEnvironment, stripeUrl } from './app-environment.mjs';
import { clientDist, programLog, programs, runProgram, startStandIns } from './app-services.mjs';
import { buildStale } from './build.mjs';
import { Failure } from './failure.mjs';
import { checkNodeVersion, installStale } from './install.mjs';
import { dataDirectory, makeHome, placesIn } from './paths.mjs';
import { endLeftovers, npmLaunchers } from './pid-files.mjs';
import { choosePort } from './ports.mjs';
import { endServerLeftRunning, isClusterComplete, openCluster } from './postgres-cluster.mjs';
import { postgresPrograms } from './postgres-programs.mjs';
import { step } from './progress.mjs';
import { takeRunLock } from './run-lock.mjs';
import { openSecrets } from './secrets.mjs';
import { createShutdown } from './shutdown.mjs';

/** Everything a person can lose by `npm run reset`, and the keys that belong to it. */
export const wipeable = (places) => [
  places.clusterHome,
  places.files,
  places.keys,
  places.stripe,
  places.mail,
  places.signInsFile,
];

const seedingMarker = (places) => join(places.home, 'seeding');
const seededMarker = (places) => join(places.clusterHome, 'seeded');

/** Takes the data folder for this run; a Failure that names the run which has it. */
async function lockHome(places, shutdown) {
  try {
    makeHome(places.home);
  } catch (error) {
    throw new Failure(
      `${places.home} cannot be made (${error.code}). Set KERFYARD_DATA_DIR to a folder of yours.`,
    );
  }
  const lock = await takeRunLock(places.run);
  if (lock.heldBy) {
    const { pid, url } = lock.heldBy;
    throw new Failure(
      `Kerfyard already runs from this checkout${url ? `: ${url}` : ''} (process ${pid}).\n` +
        `Stop it with Ctrl-C where it runs, or with: kill ${pid}`,
    );
  }
  shutdown.add(lock.release);
  const launchers = npmLaunchers();
  lock.describe({ launchers });
  return (url, { postgres, stripe }) =>
    lock.describe({ launchers, url, databasePort: postgres, stripePort: stripe });
}

/** The ports of a run. Only the app's own is fixed: the others are found through the links on the page. */
async function choosePorts() {
  return {
    app: await choosePort({ name: 'the app', variable: 'KERFYARD_PORT', fallback: 4600, fixed: true }),
    stripe: await choosePort({
      name: 'the Stripe stand-in',
      variable: 'KERFYARD_STRIPE_PORT',
      fallback: 4610,
    }),
    mailWeb: await choosePort({ name: 'the mail page', variable: 'KERFYARD_MAIL_PORT', fallback: 4620 }),
    smtp: await choosePort({ name: 'the mail server', variable: 'KERFYARD_SMTP_PORT', fallback: 4625 }),
    postgres: await choosePort({ name: 'PostgreSQL', variable: 'KERFYARD_POSTGRES_PORT', fallback: 54620 }),
  };
}

function makeFolders(places) {
  rmSync(places.previousLogs, { recursive: true, force: true });
  if (existsSync(places.logs)) renameSync(places.logs, places.previousLogs);
  for (const folder of [places.files, places.logs, places.run, places.stripe, places.mail]) {
    mkdirSync(folder, { recursive: true, mode: 0o700 });
  }
}

/**
 * A demo that was killed while it was being made is made anew. Nobody could work in it, since the app only starts
 * afterwards; half of it would stay half for good.
 */
function wipeHalfSeeded(places) {
  if (!existsSync(seedingMarker(places))) return;
  console.log('An earlier start was stopped while making the demo; making it anew.');
  for (const path of wipeable(places)) rmSync(path, { recursive: true, force: true });
  rmSync(seedingMarker(places), { force: true });
}

async function seedOnce({ places, env }) {
  if (existsSync(seededMarker(places))) return;
  writeFileSync(seedingMarker(places), '');
  await step('Filling an empty database with the demo', (onLine) =>
    runProgram(programs.seed, { env, logFile: programLog(places, 'seed'), onLine }),
  );
  writeFileSync(seededMarker(places), '');
  rmSync(seedingMarker(places), { force: true });
}

/** The app serves a copy, so that a build for tests never changes a page under a person's hands. */
function copyClient(places) {
  const copy = join(places.run, 'client');
  rmSync(copy, { recursive: true, force: true });
  if (existsSync(clientDist)) cpSync(clientDist, copy, { recursive: true });
  return copy;
}

/**
 * Does everything up to the app itself: packages, builds, database, stand-ins, migrations, demo. Returns the run's
 * context: `ports`, `places`, `env` (the server's), `shutdown` (already knows how to stop what was started),
 * `services`, `tellUrl`.
 */
export async function openLocalRun({ mode, appUrlOf, workspaces, shutdown = createShutdown() }) {
  checkNodeVersion();
  const places = placesIn(dataDirectory());
  const tell = await lockHome(places, shutdown);
  for (const name of await endLeftovers(places.run)) console.log(`Ended ${name}, left by an earlier run.`);
  await endServerLeftRunning(places.clusterHome);
  const ports = await choosePorts();
  wipeHalfSeeded(places);
  makeFolders(places);
  const logFile = programLog(places, 'install');
  await installStale({ logFile });
  await buildStale(workspaces);

  const secrets = openSecrets(places, { clusterExists: isClusterComplete(places.clusterHome) });
  const cluster = await openLocalCluster({ places, ports, secrets });
  shutdown.add(cluster.stop);

  const services = [];
  const started = (service) => {
    services.push(service);
    shutdown.add(service.stop);
  };
  const { urls } = cluster;
  const context = { mode, ports, places, secrets, urls, shutdown, services, started };
  const env = serverEnvironment({ ...context, appUrl: appUrlOf(ports), clientDist: copyClient(places) });
  const ownerEnv = migrationEnvironment(env, urls);
  await step('Starting the stand-ins, updating the database', () =>
    Promise.all([
      startStandIns({ context, started }),
      runProgram(programs.migrate, { env: ownerEnv, logFile: programLog(places, 'migrate') }),
    ]),
  );
  await seedOnce({ places, env: ownerEnv });
  return { ...context, env, tellUrl: (url) => tell(url, ports) };
}

/** Opens this checkout's database. The programs are looked for first, since installing them shows its own progress. */
export async function openLocalCluster({ places, ports, secrets }) {
  const isNew = !isClusterComplete(places.clusterHome);
  await postgresPrograms(join(places.clusterHome, 'cluster'));
  return step(isNew ? 'Making the database' : 'Starting the database', () =>
    openCluster({ home: places.clusterHome, port: ports.postgres, secrets }),
  );
}

/** Prints where everything is, the app first. */
export function announce({ url, ports, places }) {
  console.log(`\nKerfyard is running at  ${url}\n`);
  printSignIns(places.signInsFile);
  console.log(`Mail page        ${mailUrl(ports)}   (all mail the app sends; none leaves this machine)`);
  console.log(`Stripe stand-in  ${stripeUrl(ports)}   (payments; no real money moves)`);
  console.log(`Data and logs    ${places.home}`);
  console.log('\nCtrl-C stops everything. The data stays; npm run reset wipes it.');
}

function printSignIns(file) {
  if (!existsSync(file)) return;
  const signIns = JSON.parse(readFileSync(file, 'utf8'));
  const columns = ['role', 'name', 'email', 'password', 'note'];
  const widths = columns.map((column) => Math.max(...signIns.map((row) => String(row[column] ?? '').length)));
  console.log('Demo sign-ins');
  for (const row of signIns) {
    const cells = columns.map((column, index) => String(row[column] ?? '').padEnd(widths[index]));
    console.log(`  ${cells.join('  ').trimEnd()}`);
  }
  console.log();
}
