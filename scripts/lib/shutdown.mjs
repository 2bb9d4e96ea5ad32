import { setTimeout as sleep } from 'node:timers/promises';
import { printError } from './failure.mjs';
import { isAlive } from './pid-files.mjs';

/**
 * What has to be undone when the script ends: steps run last in, first out, each once, however the end comes.
 */
export function createShutdown() {
  const steps = [];
  let ending = null;
  const runSteps = async () => {
    while (steps.length > 0) {
      try {
        await steps.pop()();
      } catch (error) {
        printError(error); // the others still have to be stopped
      }
    }
  };
  return {
    add: (undo) => steps.push(undo),
    run: () => (ending ??= runSteps()),
    get isEnding() {
      return ending !== null;
    },
  };
}

/** Runs `end(signal)` once, at the first signal that asks this process to stop. */
export function onStopSignal(end) {
  let asked = false;
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
    process.on(signal, () => {
      if (asked) return;
      asked = true;
      end(signal);
    });
  }
}

/**
 * Runs `end()` when npm, which started this process, is killed. npm passes signals on, but a killed npm cannot, and what
 * it started would run on unseen.
 */
export async function watchLaunchers(launchers, end) {
  while (launchers.every(isAlive)) await sleep(500, undefined, { ref: false });
  end();
}
