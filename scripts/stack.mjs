// A throwaway Kerfyard for tests: own database cluster, stand-ins, app, on free ports, in a temporary folder.
import { mkdirSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import {
  appUrl,
  mailUrl,
  migrationEnvironment,
  serverEnvironment,
  stripeUrl,
} from './lib/app-environment.mjs';
import {
  clientDist,
  programLog,
  programs,
  runProgram,
  startApp,
  startStandIns,
} from './lib/app-services.mjs';
import { printError } from './lib/failure.mjs';
import { readOptions } from './lib/options.mjs';
import { placesIn } from './lib/paths.mjs';
import { freePorts } from './lib/ports.mjs';
import { openCluster } from './lib/postgres-cluster.mjs';
import { openSecrets } from './lib/secrets.mjs';
import { requireBuilt } from './lib/services.mjs';
import { createShutdown, onStopSignal } from './lib/shutdown.mjs';
import { startControl } from './lib/stack-control.mjs';

const usage = `node scripts/stack.mjs [--seed] [--no-app [--migrate]] [--mode test|demo|development]
  --seed     fill it with the demo
  --no-app   database and stand-ins only; a stand-in that does not start is left out
  --migrate  with --no-app: bring the schema up to date all the same
Environment: PORT (the app's; else a free one), CLIENT_DIST.
Prints one line of JSON when ready (and sends it to a parent process); stops and deletes everything on Ctrl-C.`;

const shutdown = createShutdown();

async function end(code) {
  await shutdown.run();
  process.exit(code);
}

onStopSignal(() => end(0));
process.once('disconnect', () => end(0));

/** The folder, its keys, its ports and its database: what everything else builds on. */
async function openContext(mode) {
  const home = mkdtempSync(join(tmpdir(), 'kerfyard-stack-'));
  shutdown.add(() => rmSync(home, { recursive: true, force: true }));
  const places = placesIn(home);
  for (const folder of [places.files, places.logs, places.run, places.stripe, places.mail]) mkdirSync(folder);
  const secrets = openSecrets(places);
  const [postgres, stripe, mailWeb, smtp, app] = await freePorts(5);
  const ports = { postgres, stripe, mailWeb, smtp, app: Number(process.env.PORT || app) };
  const openDatabase = async () => {
    // The cluster's keeper deletes its folder even when we are killed, so that folder is the whole temporary one.
    const cluster = await openCluster({ home, port: postgres, secrets, throwaway: true });
    shutdown.add(cluster.stop);
    return cluster.urls;
  };
  return { mode, places, secrets, ports, openDatabase };
}

/** The app as a thing that tests can stop, kill, freeze and start again on the same port. */
function createAppControl(context, env) {
  let app = null;
  const start = async () => {
    if (app && !app.hasExited) return;
    app = await startApp({
      context,
      env,
      started: (service) => {
        app = service;
        service.exited.then((code) => {
          if (!service.isExpected) console.error(`The app ended with ${code}; its log: ${service.logFile}`);
        });
      },
    });
  };
  const stop = async () => app?.stop();
  return {
    'start-app': start,
    'stop-app': stop,
    'kill-app': async () => app?.kill(),
    'restart-app': async () => {
      await stop();
      await start();
    },
    // A frozen process keeps its connections open and silent, as a dead line does.
    'pause-app': async () => app?.signal('SIGSTOP'),
    'resume-app': async () => app?.signal('SIGCONT'),
  };
}

async function fillDatabase({ places }, env, urls, options) {
  const ownerEnvironment = migrationEnvironment(env, urls);
  await runProgram(programs.migrate, { env: ownerEnvironment, logFile: programLog(places, 'migrate') });
  if (options.seed) {
    await runProgram(programs.seed, { env: ownerEnvironment, logFile: programLog(places, 'seed') });
  }
}

async function openApp(context, env) {
  const commands = createAppControl(context, env);
  shutdown.add(async () => {
    await commands['resume-app']();
    await commands['stop-app']();
  });
  await commands['start-app']();
  const control = await startControl(commands);
  shutdown.add(control.close);
  return control.url;
}

async function main() {
  const options = readOptions(
    {
      seed: { type: 'boolean', default: false },
      'no-app': { type: 'boolean', default: false },
      migrate: { type: 'boolean', default: false },
      mode: { type: 'string', default: 'test' },
    },
    usage,
  );
  const withApp = !options['no-app'];
  if (withApp) [programs.server, programs.migrate, programs.stripe, programs.mail].forEach(requireBuilt);
  const context = await openContext(options.mode);
  const { ports, places, secrets } = context;
  const standIns = startStandIns({
    context,
    started: (service) => shutdown.add(service.stop),
    whatWorks: !withApp,
  });
  const [urls, present] = await Promise.all([context.openDatabase(), standIns]);
  const env = serverEnvironment({
    ...context,
    urls,
    appUrl: appUrl(ports),
    clientDist: process.env.CLIENT_DIST ?? clientDist,
    // Tests come from one address and sign in far more often than people do.
    rateLimitFactor: 1000,
  });
  if (withApp || options.migrate) await fillDatabase(context, env, urls, options);
  const controlUrl = withApp ? await openApp(context, env) : null;
  announce({
    url: withApp ? appUrl(ports) : null,
    stripeUrl: present.includes('stripe') ? stripeUrl(ports) : null,
    mailUrl: present.includes('mail') ? mailUrl(ports) : null,
    smtpUrl: present.includes('mail') ? env.SMTP_URL : null,
    pgUrl: urls.app,
    pgOwnerUrl: urls.owner,
    pgSuperUrl: urls.super,
    filesDir: places.files,
    masterKeyFile: places.masterKeyFile,
    signInsFile: places.signInsFile,
    logsDir: places.logs,
    controlUrl,
    stripeSecretKey: secrets.stripeSecretKey,
    stripeWebhookSecret: secrets.accountWebhookSecret,
    stripeConnectWebhookSecret: secrets.connectWebhookSecret,
    signingSecret: secrets.signingSecret,
  });
}

function announce(info) {
  console.log(JSON.stringify(info));
  if (process.connected) process.send(info);
}

try {
  await main();
} catch (error) {
  printError(error);
  await end(1);
}
