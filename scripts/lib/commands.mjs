import { spawn } from 'node:child_process';
import { createWriteStream, mkdirSync } from 'node:fs';
import { dirname } from 'node:path';
import { createInterface } from 'node:readline';
import { digest } from './digest.mjs';
import { Failure } from './failure.mjs';
import { root } from './paths.mjs';

const keptLines = 20_000;

/**
 * Runs a command to its end and resolves to `{ code, output }`, where `output` is what matters of both streams.
 * Options: `cwd` (the checkout), `env`, `input` (text for stdin), `logFile` (gets everything), `onLine`, `allowFailure`.
 * A non-zero exit is a Failure that shows that output, unless `allowFailure`.
 */
export async function run(command, args, options = {}) {
  const { cwd = root, env = process.env, input, logFile, onLine, allowFailure = false } = options;
  const child = spawn(command, args, {
    cwd,
    env,
    stdio: [input === undefined ? 'ignore' : 'pipe', 'pipe', 'pipe'],
  });
  const log = logFile ? openLog(logFile) : null;
  const lines = [];
  const readers = [child.stdout, child.stderr].map(async (stream) => {
    for await (const line of createInterface({ input: stream })) {
      lines.push(line);
      if (lines.length > keptLines) lines.shift();
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
  const output = digest(lines);
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
