import { spawn } from 'node:child_process';
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs';
import { buildStale } from './build.mjs';
import { ensureChromium } from './chromium.mjs';
import { printError } from './failure.mjs';
import { inRoot, root } from './paths.mjs';

const results = (name) => inRoot('.tmp', `results-${name}`);
const readJson = (file) => JSON.parse(readFileSync(file, 'utf8'));

/** How each runner's own report tells what passed. vitest writes jest's format. */
const countJest = (file) => {
  const { numPassedTests, numFailedTests, numFailedTestSuites, testResults } = readJson(file);
  // A file that does not even load has no failed test to show.
  const filesWithoutTests = testResults.filter(
    (result) => result.status === 'failed' && !result.assertionResults.length,
  );
  const failed = numFailedTests + filesWithoutTests.length;
  return { passed: numPassedTests, failed: failed || Math.min(numFailedTestSuites, 1) };
};
const countPlaywright = (file) => {
  const { stats, errors } = readJson(file);
  return { passed: stats.expected + stats.flaky, failed: stats.unexpected + (errors?.length ? 1 : 0) };
};
const countTap = (file) => {
  const text = readFileSync(file, 'utf8');
  const count = (name) => Number(new RegExp(`^# ${name} (\\d+)$`, 'm').exec(text)[1]);
  return { passed: count('pass'), failed: count('fail') + count('cancelled') };
};

/**
 * All checks in the order they run. `command` is from node_modules/.bin unless it is `node`; without `count` the check
 * counts as one. `prepare` gets what it needs onto the machine.
 */
const allChecks = {
  build: { run: () => buildStale() },
  format: { command: 'prettier', args: ['--check', '.', '--log-level', 'warn'] },
  lint: { command: 'eslint', args: ['.', '--cache', '--cache-location', '.tmp/eslintcache'] },
  types: { command: 'tsc', args: ['-b'] },
  size: { command: 'node', args: ['client/scripts/size-check.mjs'] },
  scripts: {
    command: 'node',
    args: [
      '--test',
      '--test-reporter=spec',
      '--test-reporter-destination=stdout',
      '--test-reporter=tap',
      `--test-reporter-destination=${results('scripts')}`,
      'scripts/test/',
    ],
    count: countTap,
  },
  unit: {
    command: 'vitest',
    args: ['run', '--reporter=default', '--reporter=json', `--outputFile.json=${results('unit')}`],
    count: countJest,
  },
  server: {
    command: 'jest',
    args: ['--json', `--outputFile=${results('server')}`],
    cwd: 'server',
    count: countJest,
  },
  browser: {
    command: 'playwright',
    args: ['test', '--reporter=list,json'],
    cwd: 'e2e',
    env: { PLAYWRIGHT_JSON_OUTPUT_NAME: results('browser') },
    prepare: ensureChromium,
    count: countPlaywright,
  },
};

export const checkNames = Object.keys(allChecks);

/** Runs one command in the open; resolves to its exit code. A signal to us is passed on, so that it can clean up. */
async function runInTheOpen({ command, args, cwd = '.', env = {} }) {
  const program = command === 'node' ? process.execPath : inRoot('node_modules/.bin', command);
  const child = spawn(program, args, {
    cwd: inRoot(cwd),
    env: { ...process.env, ...env },
    stdio: ['ignore', 'inherit', 'inherit'],
  });
  const forward = (signal) => child.kill(signal);
  process.on('SIGTERM', forward);
  try {
    return await new Promise((resolve, reject) => {
      child.once('error', reject);
      child.once('exit', (code, signal) => resolve(code ?? signal));
    });
  } finally {
    process.off('SIGTERM', forward);
  }
}

/** Runs one check to its end and counts; whatever goes wrong counts as failed, never as nothing. */
async function runCheck(name) {
  const check = allChecks[name];
  const file = results(name);
  rmSync(file, { force: true });
  try {
    await check.prepare?.();
    if (check.run) {
      await check.run();
      return { passed: 1, failed: 0 };
    }
    const code = await runInTheOpen(check);
    if (!check.count) return code === 0 ? { passed: 1, failed: 0 } : { passed: 0, failed: 1 };
    const { passed, failed } = existsSync(file) ? check.count(file) : { passed: 0, failed: 1 };
    return { passed, failed: code === 0 ? failed : Math.max(failed, 1) };
  } catch (error) {
    printError(error);
    return { passed: 0, failed: 1 };
  }
}

/**
 * Runs the named checks one after the other, going on when one fails. The last line printed is `N passed, N failed`.
 * Resolves to whether all passed.
 */
export async function runChecks(names) {
  mkdirSync(inRoot('.tmp'), { recursive: true });
  process.chdir(root);
  let isStopped = false;
  for (const signal of ['SIGINT', 'SIGTERM']) process.once(signal, () => (isStopped = true));
  const rows = [];
  for (const name of names) {
    if (isStopped) break;
    console.log(`\n── ${name} ──`);
    const startedAt = Date.now();
    const counts = await runCheck(name);
    rows.push({ name, ...counts, seconds: (Date.now() - startedAt) / 1000 });
  }
  console.log();
  for (const { name, passed, failed, seconds } of rows) {
    const verdict = failed ? `${passed} passed, ${failed} failed` : `${passed} passed`;
    console.log(`${failed ? '✗' : '✓'} ${name.padEnd(8)} ${verdict} (${seconds.toFixed(1)} s)`);
  }
  const sum = (key) => rows.reduce((total, row) => total + row[key], 0);
  const notRun = names.length - rows.length;
  if (notRun) console.log(`Stopped; not run: ${names.slice(rows.length).join(', ')}`);
  const failed = sum('failed') + notRun;
  console.log(`${sum('passed')} passed, ${failed} failed`);
  return failed === 0;
}
