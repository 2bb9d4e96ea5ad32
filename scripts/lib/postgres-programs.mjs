import { accessSync, constants, existsSync, readdirSync, readFileSync } from 'node:fs';
import { delimiter, join } from 'node:path';
import { installPackage } from './apt.mjs';
import { run } from './commands.mjs';
import { Failure } from './failure.mjs';
import { isRoot } from './paths.mjs';

const debianPrograms = '/usr/lib/postgresql';
const oldestMajor = 13;

function isExecutable(file) {
  try {
    accessSync(file, constants.X_OK);
    return true;
  } catch {
    return false;
  }
}

/** Folders with a whole PostgreSQL server, newest first: Debian's, then whatever is on the PATH. */
function installedFolders() {
  const debian = existsSync(debianPrograms)
    ? readdirSync(debianPrograms)
        .sort((left, right) => Number(right) - Number(left))
        .map((version) => join(debianPrograms, version, 'bin'))
    : [];
  const onPath = (process.env.PATH ?? '').split(delimiter).filter(Boolean);
  return [...debian, ...onPath].filter((folder) =>
    ['initdb', 'pg_ctl', 'postgres', 'psql'].every((name) => isExecutable(join(folder, name))),
  );
}

async function majorOf(folder) {
  const { output } = await run(join(folder, 'postgres'), ['--version'], { cwd: '/' });
  return Number(/\b(\d+)(?:\.|devel|beta|rc)/.exec(output)?.[1] ?? 0);
}

async function findPrograms(wantedMajor) {
  for (const folder of installedFolders()) {
    const major = await majorOf(folder);
    if (wantedMajor ? major === wantedMajor : major >= oldestMajor) return { folder, major };
  }
  return null;
}

/**
 * The PostgreSQL programs to use, as `{ folder, major }`: those a cluster at `directory` was made with, or the newest
 * ones for a cluster still to be made. Installs Debian's when there are none and we are root.
 */
export async function postgresPrograms(directory) {
  const versionFile = join(directory, 'PG_VERSION');
  const wantedMajor = existsSync(versionFile) ? Number(readFileSync(versionFile, 'utf8')) : null;
  const found = await findPrograms(wantedMajor);
  if (found) return found;
  if (wantedMajor && (await findPrograms(null))) {
    throw new Failure(
      `The database in ${directory} was made by PostgreSQL ${wantedMajor}, which is no longer installed.\n` +
        `Install it (apt-get install -y postgresql-${wantedMajor}), or start over with an empty demo: npm run reset`,
    );
  }
  await installPackage(wantedMajor ? `postgresql-${wantedMajor}` : 'postgresql', 'PostgreSQL');
  const installed = await findPrograms(wantedMajor);
  if (!installed)
    throw new Failure('PostgreSQL was installed, but initdb, pg_ctl, postgres and psql were not found.');
  return installed;
}

/** The command line that runs a PostgreSQL program: PostgreSQL refuses root, so root runs it as user postgres. */
export function asPostgres(command) {
  return isRoot ? ['runuser', '-u', 'postgres', '--', ...command] : command;
}
