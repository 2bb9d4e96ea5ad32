import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { run } from './commands.mjs';
import { Failure } from './failure.mjs';
import { inRoot } from './paths.mjs';
import { step } from './progress.mjs';

const stampName = '.built-from';

/** What each workspace's build reads and writes. `outputs`: folder of results → folder of their sources. */
const workspaces = {
  common: {
    inputs: ['tsconfig.base.json', 'common/package.json', 'common/tsconfig.json', 'common/src'],
    outputs: { 'common/dist': 'common/src' },
  },
  server: {
    inputs: ['common', 'server/package.json', 'server/tsconfig.json', 'server/src', 'server/fakes'],
    outputs: { 'server/dist': 'server/src', 'server/dist-fakes': 'server/fakes' },
  },
  client: {
    inputs: [
      'common',
      'client/package.json',
      'client/vite.config.ts',
      'client/index.html',
      'client/scripts',
      'client/public',
      'client/src',
    ],
    outputs: { 'client/dist': null },
  },
};

const isTest = (name) => /\.(test|spec)\.tsx?$/.test(name);

/** Every file below a folder (or the file itself), in a fixed order, as paths from the checkout. */
function filesBelow(path) {
  if (!existsSync(inRoot(path))) return [];
  const entries = readdirSync(inRoot(dirname(path)), { withFileTypes: true });
  const own = entries.find((entry) => join(dirname(path), entry.name) === path);
  if (!own.isDirectory()) return [path];
  return readdirSync(inRoot(path), { withFileTypes: true, recursive: true })
    .filter((entry) => entry.isFile() && !isTest(entry.name))
    .map((entry) => join(entry.parentPath ?? entry.path, entry.name).slice(inRoot().length + 1))
    .sort();
}

/** A hash over everything a workspace's build reads, the versions of its tools included. */
function sourceHash(name) {
  const hash = createHash('sha256').update(readFileSync(inRoot('package-lock.json')));
  const inputs = workspaces[name].inputs.flatMap((input) => workspaces[input]?.inputs ?? [input]);
  for (const file of inputs.flatMap(filesBelow)) {
    hash.update(`\0${file}\0`).update(readFileSync(inRoot(file)));
  }
  return hash.digest('hex');
}

function isFresh(name, hash) {
  const folders = Object.keys(workspaces[name].outputs);
  return folders.every((folder) => {
    const stamp = inRoot(folder, stampName);
    return existsSync(stamp) && readFileSync(stamp, 'utf8') === hash;
  });
}

/**
 * Removes results whose source is gone. The compiler leaves them, and a leftover migration would still be run.
 */
function removeOrphans(name) {
  for (const [output, source] of Object.entries(workspaces[name].outputs)) {
    if (!source || !existsSync(inRoot(output))) continue;
    for (const file of filesBelow(output)) {
      const stem = /^(.*?)\.(?:js|js\.map|d\.ts|d\.ts\.map)$/.exec(file.slice(output.length + 1))?.[1];
      if (!stem) continue;
      const hasSource = ['.ts', '.tsx'].some((extension) => existsSync(inRoot(source, stem + extension)));
      if (!hasSource) rmSync(inRoot(file));
    }
  }
}

/**
 * Builds those of the named workspaces whose sources changed since their last build; returns the names of the built
 * ones. `tolerant`: a failed build is shown, and what is there is used as it is.
 */
export async function buildStale(names = ['common', 'server', 'client'], { tolerant = false } = {}) {
  const built = [];
  const env = { ...process.env, NO_COLOR: '1', FORCE_COLOR: '0' }; // what is shown of it is cut into lines
  for (const name of names) {
    const hash = sourceHash(name);
    if (isFresh(name, hash)) continue;
    built.push(name);
    removeOrphans(name);
    const { code, output } = await step(`Building ${name}`, (onLine) =>
      run('npm', ['run', 'build', '-w', name, '--silent'], { env, onLine, allowFailure: true }),
    );
    if (code === 0) stamp(name, hash);
    else if (tolerant) console.error(`The build of ${name} failed; going on with what is built.\n${output}`);
    else throw new Failure(`The build of ${name} failed:\n${output}`);
  }
  return built;
}

function stamp(name, hash) {
  for (const folder of Object.keys(workspaces[name].outputs)) {
    mkdirSync(inRoot(folder), { recursive: true });
    writeFileSync(inRoot(folder, stampName), hash);
  }
}
