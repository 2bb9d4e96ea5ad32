import { join } from 'node:path';
import { mailEnvironment, stripeEnvironment } from './app-environment.mjs';
import { run } from './commands.mjs';
import { inRoot } from './paths.mjs';
import { requireBuilt, startService, waitForHttp, waitForPort } from './services.mjs';

/** The programs that `npm run build` makes. */
export const programs = {
  server: inRoot('server/dist/main.js'),
  migrate: inRoot('server/dist/migrate.js'),
  seed: inRoot('server/dist/seed.js'),
  staff: inRoot('server/dist/staff.js'),
  books: inRoot('server/dist/books.js'),
  stripe: inRoot('server/dist-fakes/stripe/main.js'),
  mail: inRoot('server/dist-fakes/mail/main.js'),
};

export const clientDist = inRoot('client/dist');

/** Runs one of the server's programs that end by themselves (migrate, seed, staff). */
export function runProgram(program, { args = [], env, logFile, onLine }) {
  requireBuilt(program);
  return run(process.execPath, ['--enable-source-maps', program, ...args], { env, logFile, onLine });
}

/**
 * Starts the stand-ins for the payment provider and the mail server and waits until both listen. With `whatWorks` one
 * that is not built or does not start is left out. Resolves to the names of those that run; hands each service to
 * `started` at once, so that it is stopped even when the other one fails.
 */
export async function startStandIns({ context, started, whatWorks = false }) {
  const { ports, places } = context;
  const wanted = [
    { name: 'stripe', env: stripeEnvironment(context), listens: [ports.stripe] },
    { name: 'mail', env: mailEnvironment(context), listens: [ports.smtp, ports.mailWeb] },
  ];
  const start = async ({ name, env, listens }) => {
    const service = startService({ name, program: programs[name], env, logs: places.logs, run: places.run });
    started(service);
    for (const port of listens) await waitForPort(service, port);
    return name;
  };
  const leaveOut = (error) => {
    console.error(`Left out: ${error.message}`);
    return null;
  };
  const running = await Promise.all(
    wanted.map((standIn) => (whatWorks ? start(standIn).catch(leaveOut) : start(standIn))),
  );
  return running.filter(Boolean);
}

/** Starts the server and waits until it answers. */
export async function startApp({ context, env, started }) {
  const { ports, places } = context;
  const service = startService({
    name: 'app',
    program: programs.server,
    env,
    logs: places.logs,
    run: places.run,
  });
  started(service);
  await waitForHttp(service, `http://127.0.0.1:${ports.app}/api/health`);
  return service;
}

/** Where a data folder's logs of short programs go. */
export const programLog = (places, name) => join(places.logs, `${name}.log`);
