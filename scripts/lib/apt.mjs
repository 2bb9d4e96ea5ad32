import { existsSync } from 'node:fs';
import { run } from './commands.mjs';
import { Failure } from './failure.mjs';
import { isRoot } from './paths.mjs';
import { step } from './progress.mjs';

/**
 * Installs a Debian package when we may; otherwise a Failure with the exact line to run. `what` says why it is needed.
 */
export async function installPackage(name, what) {
  const line = `apt-get update && apt-get install -y --no-install-recommends ${name}`;
  if (!existsSync('/usr/bin/apt-get')) {
    throw new Failure(`${what} is missing, and this is no Debian: please install ${name} by hand.`);
  }
  if (!isRoot) throw new Failure(`${what} is missing. Install it with:\n\n  sudo sh -c '${line}'\n`);
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  await step(`Installing ${name} (apt-get)`, async (onLine) => {
    await run('apt-get', ['update'], { env, onLine, cwd: '/' });
    await run('apt-get', ['install', '-y', '--no-install-recommends', name], { env, onLine, cwd: '/' });
  });
}
