// npm run reset: wipes this checkout's database, files, keys and the stand-ins' state. The next start makes a new demo.
import { rmSync } from 'node:fs';
import { printError, Failure } from './lib/failure.mjs';
import { wipeable } from './lib/local-run.mjs';
import { dataDirectory, placesIn } from './lib/paths.mjs';
import { endLeftovers } from './lib/pid-files.mjs';
import { endServerLeftRunning } from './lib/postgres-cluster.mjs';
import { runningInstance } from './lib/run-lock.mjs';

async function reset() {
  const places = placesIn(dataDirectory());
  const running = runningInstance(places.run);
  if (running) {
    throw new Failure(
      `Kerfyard is running (process ${running.pid}); nothing was wiped.\n` +
        `Stop it first: Ctrl-C where it runs, or kill ${running.pid}`,
    );
  }
  await endLeftovers(places.run);
  await endServerLeftRunning(places.clusterHome);
  for (const path of [...wipeable(places), places.logs, places.previousLogs, places.run])
    rmSync(path, { recursive: true, force: true });
  console.log(`Wiped ${places.home}. The next npm start makes a new database and demo.`);
}

reset().catch((error) => {
  printError(error);
  process.exitCode = 1;
});
