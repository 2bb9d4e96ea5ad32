import { printError } from './failure.mjs';
import { npmLaunchers } from './pid-files.mjs';
import { logTail } from './services.mjs';
import { createShutdown, onStopSignal, watchLaunchers } from './shutdown.mjs';

/**
 * Runs a script that starts services and then lasts until it is stopped: by a signal, by the end of the program that
 * started it, or by the unexpected end of one of its services. Whatever was started is stopped, newest first.
 *
 * `open(shutdown)` starts everything and resolves to `{ services }`, the ones whose end is the end of the run.
 */
export function runUntilStopped(open) {
  const shutdown = createShutdown();
  const end = async (code, message) => {
    if (shutdown.isEnding) return;
    if (message) console.log(message);
    await shutdown.run();
    process.exit(code);
  };
  onStopSignal(() => end(0, '\nStopping…'));
  const launchers = npmLaunchers();
  if (launchers.length) watchLaunchers(launchers, () => end(0));
  const watch = async (service) => {
    const code = await service.exited;
    if (service.isExpected || shutdown.isEnding) return;
    await end(
      1,
      `\n${service.name} ended unexpectedly (${code}). Its log, ${service.logFile}, ends:\n${logTail(service.logFile)}`,
    );
  };
  open(shutdown).then(
    ({ services }) => services.forEach(watch),
    (error) => {
      if (shutdown.isEnding) return;
      printError(error);
      end(1);
    },
  );
}
