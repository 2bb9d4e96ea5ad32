import { linkSync, mkdirSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { isAlive, processStart, readPidFile, waitUntilGone } from './pid-files.mjs';

const lockName = 'kerfyard.lock';
const endingGraceMs = 15_000;

/** What the running `npm start` or `npm run dev` of this data folder says of itself, or null when none runs. */
export function runningInstance(runDirectory) {
  const entry = readPidFile(join(runDirectory, lockName));
  return isAlive(entry) ? entry : null;
}

/**
 * Takes the data folder for this process. Returns `{ describe, release }`, or `{ heldBy }` when another live process
 * has it. A lock whose process is gone counts for nothing.
 */
export async function takeRunLock(runDirectory) {
  mkdirSync(runDirectory, { recursive: true });
  const file = join(runDirectory, lockName);
  const own = { pid: process.pid, start: processStart(process.pid) };
  const describe = (more) => writeFileSync(file, JSON.stringify({ ...own, ...more }));
  for (;;) {
    if (createWhole(file, JSON.stringify(own)))
      return { describe, release: () => rmSync(file, { force: true }) };
    const holder = readPidFile(file);
    // A run whose npm was killed is about to stop by itself.
    const isEnding = holder?.launchers?.some((launcher) => !isAlive(launcher));
    if (isAlive(holder) && !(isEnding && (await waitUntilGone(holder, endingGraceMs)))) {
      return { heldBy: holder };
    }
    rmSync(file, { force: true });
  }
}

/** Creates a file that is never seen half written; false when it exists already. */
function createWhole(file, text) {
  const draft = `${file}.${process.pid}`;
  writeFileSync(draft, text);
  try {
    linkSync(draft, file);
    return true;
  } catch (error) {
    if (error.code !== 'EEXIST') throw error;
    return false;
  } finally {
    rmSync(draft, { force: true });
  }
}
