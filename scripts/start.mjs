// npm start: everything from a fresh clone to a running demo, and back to rest with Ctrl-C.
import { appUrl } from './lib/app-environment.mjs';
import { startApp } from './lib/app-services.mjs';
import { announce, openLocalRun } from './lib/local-run.mjs';
import { step } from './lib/progress.mjs';
import { runUntilStopped } from './lib/run-until-stopped.mjs';

runUntilStopped(async (shutdown) => {
  const context = await openLocalRun({ mode: 'demo', appUrlOf: appUrl, shutdown });
  const { env, ports, places, services, started } = context;
  await step('Starting the app', () => startApp({ context, env, started }));
  context.tellUrl(appUrl(ports));
  announce({ url: appUrl(ports), ports, places });
  return { services };
});
