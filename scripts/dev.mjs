// npm run dev: the app with hot reload. The page comes from Vite; the server restarts when its compiled files change.
import { existsSync, watch as watchFiles } from 'node:fs';
import { startApp } from './lib/app-services.mjs';
import { spawnTool } from './lib/dev-tools.mjs';
import { printError } from './lib/failure.mjs';
import { announce, openLocalRun } from './lib/local-run.mjs';
import { inRoot } from './lib/paths.mjs';
import { choosePort } from './lib/ports.mjs';
import { step } from './lib/progress.mjs';
import { runUntilStopped } from './lib/run-until-stopped.mjs';
import { waitForHttp } from './lib/services.mjs';

const quietMs = 300;

/** Calls `changed` once the compiler has been still for a moment: one edit writes many files. */
function watchCompiled(changed) {
  let timer = null;
  const watchers = ['common/dist', 'server/dist']
    .filter((folder) => existsSync(inRoot(folder)))
    .map((folder) =>
      watchFiles(inRoot(folder), { recursive: true }, (event, file) => {
        if (!file?.endsWith('.js')) return;
        clearTimeout(timer);
        timer = setTimeout(changed, quietMs);
      }),
    );
  return () => {
    clearTimeout(timer);
    watchers.forEach((watcher) => watcher.close());
  };
}

/** The server, started again at every change; a server that fails shows its log and waits for the next change. */
function createRestarter({ context, env, shutdown }) {
  let app = null;
  let queue = Promise.resolve();
  const restart = async () => {
    await app?.stop();
    if (shutdown.isEnding) return;
    try {
      await startApp({ context, env, started: (service) => (app = service) });
      console.log('The server is up.');
    } catch (error) {
      printError(error);
    }
  };
  shutdown.add(async () => {
    await queue;
    await app?.stop();
  });
  return () => (queue = queue.then(restart));
}

runUntilStopped(async (shutdown) => {
  const clientPort = await choosePort({
    name: 'the page in development',
    variable: 'KERFYARD_CLIENT_PORT',
    fallback: 4605,
    fixed: true,
  });
  const url = `http://127.0.0.1:${clientPort}`;
  const context = await openLocalRun({
    mode: 'development',
    appUrlOf: () => url,
    workspaces: ['common', 'server'],
    shutdown,
  });
  const { env, ports, places, services } = context;
  const restart = createRestarter({ context, env, shutdown });
  await step('Starting the server', restart);
  const toolEnv = {
    ...process.env,
    API_URL: `http://127.0.0.1:${ports.app}`,
    CLIENT_PORT: String(clientPort),
  };
  const compiler = [
    '-b',
    'server/tsconfig.json',
    'server/fakes/tsconfig.json',
    '--watch',
    '--preserveWatchOutput',
  ];
  shutdown.add(spawnTool({ name: 'tsc', args: compiler, env: toolEnv }).stop);
  const page = spawnTool({
    name: 'vite',
    args: ['--clearScreen', 'false'],
    cwd: inRoot('client'),
    env: toolEnv,
  });
  shutdown.add(page.stop);
  shutdown.add(watchCompiled(restart));
  await waitForHttp(page, url);
  context.tellUrl(url);
  announce({ url, ports, places });
  return { services };
});
