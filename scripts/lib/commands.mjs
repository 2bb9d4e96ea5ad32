import { spawn } from 'node:child_process';
import { createWriteStream, mkdirSync } from 'node:fs';
import { dirname } from 'node:path';
import { createInterface } from 'node:readline';
import { Failure } from './failure.mjs';
import { root } from './paths.mjs';

const tailLines = 30;

/**
 * Runs a command to its end and resolves to `{ code, output }`, where `output` is the last lines of both streams.
 * Options: `cwd` (the checkout), `env`, `input` (text for stdin), `logFile` (gets everything), `onLine`, `allowFailure`.
 * A non-zero exit is a Failure that shows the output's tail, unless `allowFailure`.
 */
export async function run(command, args, options = {}) {
  const { cwd = root, env = process.env, input, logFile, onLine, allowFailure = false } = options;
  const child = spawn(command, args, {
    cwd,
    env,
    stdio: [input === undefined ? 'ignore' : 'pipe', 'pipe', 'pipe'],
  });
  const log = logFile ? openLog(logFile) : null;
  const tail = [];
  const readers = [child.stdout, child.stderr].map(async (stream) => {
    for await (const line of createInterface({ input: stream })) {
      tail.push(line);
      if (tail.length > tailLines) tail.shift();
      log?.write(`${line}\n`);
      onLine?.(line);
    }
  });
  if (input !== undefined) child.stdin.end(input);
  const code = await new Promise((resolve, reject) => {
    child.once('error', reject);
    child.once('close', (exitCode, signal) => resolve(exitCode ?? signal));
  });
  await Promise.all(readers);
  log?.end();
  const output = tail.join('\n');
  if (code !== 0 && !allowFailure) {
    throw new Failure(`${[command, ...args].join(' ')} ended with ${code}:\n${output}`);
  }
  return { code, output };
}

/** Runs a command that talks to the person itself; resolves to its exit code. */
export function runAttached(command, args, { cwd = root, env = process.env } = {}) {
  const child = spawn(command, args, { cwd, env, stdio: 'inherit' });
  return new Promise((resolve, reject) => {
    child.once('error', reject);
    child.once('exit', (code) => resolve(code ?? 1));
  });
}

function openLog(logFile) {
  mkdirSync(dirname(logFile), { recursive: true });
  return createWriteStream(logFile, { flags: 'a' });
}
