// npm run bench: measures, prints tables, writes .tmp/bench.json.
//
// A bench is a file NAME.bench.mjs in common/bench, server/bench or e2e/bench whose default export is an async function
// that returns { title, rows } with one object of columns per row. Those of server and e2e find a stack with the demo
// by the variables of lib/stack-for-tests.mjs; each runs in a process of its own.
import { fork } from 'node:child_process';
import { once } from 'node:events';
import { existsSync, mkdirSync, readdirSync, writeFileSync } from 'node:fs';
import { cpus } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { buildStale } from './lib/build.mjs';
import { ensureChromium } from './lib/chromium.mjs';
import { Failure, printError } from './lib/failure.mjs';
import { checkNodeVersion, installStale } from './lib/install.mjs';
import { readOptions } from './lib/options.mjs';
import { inRoot } from './lib/paths.mjs';
import { stackVariables, startStack } from './lib/stack-for-tests.mjs';

const usage = 'npm run bench [-- --only PART-OF-A-NAME]';
const folders = ['common/bench', 'server/bench', 'e2e/bench'];
const runner = fileURLToPath(new URL('./lib/run-bench.mjs', import.meta.url));

function benchesIn(folder) {
  if (!existsSync(inRoot(folder))) return [];
  return readdirSync(inRoot(folder))
    .filter((name) => name.endsWith('.bench.mjs'))
    .sort()
    .map((name) => join(folder, name));
}

async function runBench(file, env) {
  const child = fork(runner, [inRoot(file)], { env, execArgv: ['--enable-source-maps'] });
  let result = null;
  child.once('message', (message) => (result = message));
  const [code] = await once(child, 'exit');
  if (code !== 0 || !result) throw new Failure(`${file} ended with ${code} and no result.`);
  console.log(`\n${result.title}`);
  console.table(result.rows);
  return { file, ...result };
}

async function runBenches(files) {
  const needsStack = files.some((file) => !file.startsWith('common/'));
  if (files.some((file) => file.startsWith('e2e/'))) await ensureChromium();
  const stack = needsStack ? await startStack(['--seed']) : null;
  try {
    const env = { ...process.env, ...(stack ? stackVariables(stack.info) : {}) };
    const results = [];
    for (const file of files) results.push(await runBench(file, env));
    return results;
  } finally {
    await stack?.stop();
  }
}

async function main() {
  const { only = '' } = readOptions({ only: { type: 'string' } }, usage);
  const files = folders.flatMap(benchesIn).filter((file) => file.includes(only));
  if (files.length === 0)
    throw new Failure(`No bench ${only ? `with "${only}" in its name` : ''} in ${folders.join(', ')}.`);
  checkNodeVersion();
  await installStale();
  await buildStale();
  const results = await runBenches(files);
  const machine = { node: process.version, processors: cpus().map(({ model }) => model) };
  mkdirSync(inRoot('.tmp'), { recursive: true });
  writeFileSync(
    inRoot('.tmp/bench.json'),
    JSON.stringify({ takenAt: new Date(), machine, results }, null, 2),
  );
  console.log('\nAlso in .tmp/bench.json');
}

main().catch((error) => {
  printError(error);
  process.exitCode = 1;
});
