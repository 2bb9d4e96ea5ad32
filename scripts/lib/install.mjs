import { existsSync, readFileSync } from 'node:fs';
import { run } from './commands.mjs';
import { Failure } from './failure.mjs';
import { inRoot } from './paths.mjs';
import { step } from './progress.mjs';

const oldestNode = [20, 19];

/** Refuses a Node that the dependencies refuse, before npm says so in fifty lines. */
export function checkNodeVersion(version = process.versions.node) {
  const [major, minor] = version.split('.').map(Number);
  const isNewEnough = major > oldestNode[0] || (major === oldestNode[0] && minor >= oldestNode[1]);
  if (!isNewEnough) throw new Failure(`Node ${oldestNode.join('.')} or newer is needed; this is ${version}.`);
}

const readPackages = (file) => JSON.parse(readFileSync(file, 'utf8')).packages;

/**
 * Whether node_modules is what package-lock.json asks for. npm writes what it installed to
 * node_modules/.package-lock.json as its last act, so an installation that was killed counts as none.
 * Optional packages may be absent: they are for other machines.
 */
export function isInstalled(lockFile = inRoot('package-lock.json'), folder = inRoot('node_modules')) {
  const installedFile = `${folder}/.package-lock.json`;
  if (!existsSync(installedFile)) return false;
  const installed = readPackages(installedFile);
  return Object.entries(readPackages(lockFile))
    .filter(([path]) => path.includes('node_modules/'))
    .every(([path, wanted]) => {
      const found = installed[path];
      if (!found) return Boolean(wanted.optional || wanted.devOptional || wanted.peer);
      return found.version === wanted.version && found.integrity === wanted.integrity;
    });
}

/** Installs the dependencies when they are missing or differ from the lock file. Their own scripts are not needed. */
export async function installStale({ logFile } = {}) {
  if (isInstalled()) return;
  await step('Installing the packages of package-lock.json (about a minute)', (onLine) =>
    run('npm', ['ci', '--ignore-scripts', '--include=dev', '--no-audit', '--no-fund'], { onLine, logFile }),
  );
}
