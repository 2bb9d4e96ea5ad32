import { spawn } from 'node:child_process';
import { closeSync, existsSync, mkdirSync, openSync, readFileSync, rmSync } from 'node:fs';
import { connect } from 'node:net';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { digest } from './digest.mjs';
import { Failure } from './failure.mjs';
import { root } from './paths.mjs';
import { writePidFile } from './pid-files.mjs';

const guard = new URL('./end-with-parent.mjs', import.meta.url).href;
const stopWaitMs = 8_000;
const lastLines = 200;

/** What matters of a log's end, for an error message. */
export function logTail(logFile) {
  if (!existsSync(logFile)) return '(no log)';
  return digest(readFileSync(logFile, 'utf8').trimEnd().split('\n').slice(-lastLines));
}

/** Throws a Failure that says what to do when a program is not built. */
export function requireBuilt(file) {
  if (!existsSync(file)) throw new Failure(`${file} is missing. Build first: npm run build`);
}

/**
 * Starts a Node program that runs until it is told to stop. Its output goes to `logs/NAME.log`, its pid to
 * `run/NAME.pid`. It has a process group of its own, so that Ctrl-C reaches only the script, which stops all in order;
 * and it ends by itself when the script is killed.
 *
 * Returns `{ name, pid, exited, hasExited, stop, kill, signal, logFile }`; `exited` resolves to the exit code or signal.
 */
export function startService({ name, program, args = [], env, logs, run, cwd = root }) {
  requireBuilt(program);
  mkdirSync(logs, { recursive: true });
  const logFile = join(logs, `${name}.log`);
  const log = openSync(logFile, 'a');
  const child = spawn(process.execPath, ['--enable-source-maps', '--import', guard, program, ...args], {
    cwd,
    env,
    detached: true,
    stdio: ['ignore', log, log, 'ipc'],
  });
  closeSync(log);
  const pidFile = join(run, `${name}.pid`);
  writePidFile(pidFile, child.pid);
  const service = { name, pid: child.pid, logFile, hasExited: false, isExpected: false };
  service.exited = new Promise((resolve) => {
    child.once('exit', (code, signal) => {
      service.hasExited = true;
      rmSync(pidFile, { force: true });
      resolve(code ?? signal);
    });
  });
  service.signal = (signal) => child.kill(signal);
  service.kill = async () => {
    service.isExpected = true;
    child.kill('SIGKILL');
    await service.exited;
  };
  service.stop = async () => {
    service.isExpected = true;
    child.kill('SIGTERM');
    const late = new AbortController();
    const ended = service.exited.then(() => late.abort());
    await sleep(stopWaitMs, undefined, { signal: late.signal }).then(
      () => child.kill('SIGKILL'),
      () => undefined, // ended in time
    );
    await ended;
  };
  return service;
}

/** Waits until `isReady()` holds; a Failure with the log's tail when the service ends first or takes too long. */
async function waitFor(service, what, isReady, timeoutMs) {
  const endsAt = Date.now() + timeoutMs;
  while (!(await isReady())) {
    if (service.hasExited) {
      throw new Failure(
        `${service.name} ended with ${await service.exited} before ${what}.\n${logTail(service.logFile)}`,
      );
    }
    if (Date.now() > endsAt) {
      throw new Failure(
        `${service.name}: still not ${what} after ${timeoutMs / 1000} s.\n${logTail(service.logFile)}`,
      );
    }
    await sleep(40);
  }
}

/** Waits until `url` answers 200. */
export function waitForHttp(service, url, timeoutMs = 60_000) {
  const answers = async () => {
    try {
      const response = await fetch(url, { signal: AbortSignal.timeout(2_000) });
      await response.arrayBuffer();
      return response.status === 200;
    } catch {
      return false;
    }
  };
  return waitFor(service, 'answering', answers, timeoutMs);
}

/** Waits until something listens on the port of `localhost`. */
export function waitForPort(service, port, timeoutMs = 30_000) {
  const listens = () =>
    new Promise((resolve) => {
      const socket = connect({ port, host: 'localhost' });
      const done = (result) => {
        socket.destroy();
        resolve(result);
      };
      socket.once('connect', () => done(true));
      socket.once('error', () => done(false));
    });
  return waitFor(service, `listening on port ${port}`, listens, timeoutMs);
}
