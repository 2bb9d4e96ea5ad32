// npm run books: every rule of this checkout's books as a query, its trial balance, and the comparison with the provider.
import { mkdirSync } from 'node:fs';
import { appUrl, serverEnvironment } from './lib/app-environment.mjs';
import { clientDist, programs, startStandIns } from './lib/app-services.mjs';
import { runAttached } from './lib/commands.mjs';
import { Failure, printError } from './lib/failure.mjs';
import { readOptions } from './lib/options.mjs';
import { dataDirectory, placesIn } from './lib/paths.mjs';
import { freePorts } from './lib/ports.mjs';
import { connectionUrls, isClusterComplete, openCluster } from './lib/postgres-cluster.mjs';
import { runningInstance } from './lib/run-lock.mjs';
import { openSecrets } from './lib/secrets.mjs';
import { requireBuilt } from './lib/services.mjs';
import { createShutdown } from './lib/shutdown.mjs';

const usage = 'npm run books';

/** The database and the payment stand-in: those of the run that is on, else opened for as long as this takes. */
async function openMoney(places, secrets, shutdown) {
  const running = runningInstance(places.run);
  if (running) {
    const { databasePort, stripePort, url } = running;
    if (!databasePort || !stripePort) throw new Failure('Kerfyard is still starting. Try again in a moment.');
    return { url, ports: { stripe: stripePort }, urls: connectionUrls(databasePort, secrets) };
  }
  const [postgres, stripe, mailWeb, smtp, app] = await freePorts(5);
  const ports = { stripe, mailWeb, smtp, app };
  const cluster = await openCluster({ home: places.clusterHome, port: postgres, secrets });
  shutdown.add(cluster.stop);
  for (const folder of [places.logs, places.run, places.stripe, places.mail])
    mkdirSync(folder, { recursive: true });
  const context = { ports, places, secrets };
  await startStandIns({ context, started: (service) => shutdown.add(service.stop) });
  return { url: appUrl(ports), ports, urls: cluster.urls };
}

async function main() {
  readOptions({}, usage);
  requireBuilt(programs.books);
  const places = placesIn(dataDirectory());
  if (!isClusterComplete(places.clusterHome))
    throw new Failure('There is no database yet. Run npm start once.');
  const secrets = openSecrets(places, { clusterExists: true });
  const shutdown = createShutdown();
  try {
    const { url, ports, urls } = await openMoney(places, secrets, shutdown);
    const env = serverEnvironment({
      mode: 'demo',
      ports: { app: 1, smtp: 1, mailWeb: 1, ...ports },
      appUrl: url,
      urls,
      secrets,
      places,
      clientDist,
    });
    return await runAttached(process.execPath, ['--enable-source-maps', programs.books], { env });
  } finally {
    await shutdown.run();
  }
}

main().then(
  (code) => {
    process.exitCode = code;
  },
  (error) => {
    printError(error);
    process.exitCode = 1;
  },
);
