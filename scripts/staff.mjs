// npm run staff -- --email ada@kerfyard.example --name "Ada Quill": makes a staff person in this checkout's database.
import { mkdirSync } from 'node:fs';
import { appUrl, serverEnvironment } from './lib/app-environment.mjs';
import { clientDist, programs } from './lib/app-services.mjs';
import { Failure, printError } from './lib/failure.mjs';
import { readOptions } from './lib/options.mjs';
import { dataDirectory, placesIn } from './lib/paths.mjs';
import { freePorts } from './lib/ports.mjs';
import { connectionUrls, isClusterComplete, openCluster } from './lib/postgres-cluster.mjs';
import { runAttached } from './lib/commands.mjs';
import { runningInstance } from './lib/run-lock.mjs';
import { openSecrets } from './lib/secrets.mjs';

const usage = 'npm run staff -- --email ada@kerfyard.example --name "Ada Quill"';

async function main() {
  const { email, name } = readOptions({ email: { type: 'string' }, name: { type: 'string' } }, usage);
  if (!email || !name) throw new Failure(`Both are needed:\n  ${usage}`);
  const places = placesIn(dataDirectory());
  if (!isClusterComplete(places.clusterHome))
    throw new Failure('There is no database yet. Run npm start once.');
  const secrets = openSecrets(places, { clusterExists: true });

  const running = runningInstance(places.run);
  if (running && !running.databasePort)
    throw new Failure('Kerfyard is still starting. Try again in a moment.');
  const [postgres, unused] = await freePorts(2);
  const cluster = running ? null : await openCluster({ home: places.clusterHome, port: postgres, secrets });
  try {
    mkdirSync(places.files, { recursive: true });
    const ports = { app: unused, stripe: unused, mailWeb: unused, smtp: unused };
    const urls = cluster ? cluster.urls : connectionUrls(running.databasePort, secrets);
    const env = serverEnvironment({
      mode: 'demo',
      ports,
      appUrl: running?.url ?? appUrl(ports),
      urls,
      secrets,
      places,
      clientDist,
    });
    return await runAttached(process.execPath, [programs.staff, '--email', email, '--name', name], { env });
  } finally {
    await cluster?.stop();
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
