import { mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';

/**
 * When a process began, in clock ticks since boot, or null when it is gone or cannot be told. Pids are used again; pid
 * and start together are not. Field 22 of /proc/PID/stat (proc(5)); the second field may contain spaces and brackets.
 */
export function processStart(pid) {
  const found = describeProcess(pid);
  return found && found.state !== 'Z' ? found.start : null;
}

/**
 * The processes that stand between npm and this one, npm included, as `{ pid, start }`; none when npm did not start it.
 * npm runs scripts through a shell, which may stay or may replace itself by the script.
 */
export function npmLaunchers() {
  if (!process.env.npm_lifecycle_event) return [];
  const parent = describeProcess(process.ppid);
  if (!parent) return [];
  const isShell = /sh$/.test(parent.name);
  const grandparent = isShell ? describeProcess(parent.parentPid) : null;
  return [parent, grandparent].filter(Boolean).map(({ pid, start }) => ({ pid, start }));
}

/** Name, parent and start of a process from /proc/PID/stat, or null when there is none to be read. */
function describeProcess(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    const end = stat.lastIndexOf(')');
    const fields = stat.slice(end + 2).split(' ');
    const name = stat.slice(stat.indexOf('(') + 1, end);
    return { pid, name, state: fields[0], parentPid: Number(fields[1]), start: fields[19] };
  } catch {
    return null;
  }
}

/** Whether the process a pid file describes is still that process. */
export function isAlive(entry) {
  if (!entry || !Number.isInteger(entry.pid)) return false;
  if (entry.start !== null) return processStart(entry.pid) === entry.start;
  try {
    process.kill(entry.pid, 0);
    return true;
  } catch (error) {
    return error.code === 'EPERM';
  }
}

export function readPidFile(file) {
  try {
    return JSON.parse(readFileSync(file, 'utf8'));
  } catch {
    return null; // missing, or cut short by a kill: nothing to go by
  }
}

export function writePidFile(file, pid, more = {}) {
  mkdirSync(dirname(file), { recursive: true });
  writeFileSync(file, JSON.stringify({ pid, start: processStart(pid), ...more }));
}

/** Waits until the described process is gone; false when it is still there after `timeoutMs`. */
export async function waitUntilGone(entry, timeoutMs) {
  const endsAt = Date.now() + timeoutMs;
  while (isAlive(entry)) {
    if (Date.now() > endsAt) return false;
    await sleep(50);
  }
  return true;
}

/** Ends whatever an earlier, killed run left behind, as its pid files tell. Returns the names of what was ended. */
export async function endLeftovers(directory) {
  const ended = [];
  for (const name of pidFilesIn(directory)) {
    const file = join(directory, name);
    const entry = readPidFile(file);
    if (isAlive(entry)) {
      await endProcess(entry);
      ended.push(name.replace(/\.pid$/, ''));
    }
    rmSync(file, { force: true });
  }
  return ended;
}

async function endProcess(entry) {
  for (const [signal, waitMs] of [
    ['SIGTERM', 8_000],
    ['SIGKILL', 2_000],
  ]) {
    try {
      process.kill(entry.pid, signal);
    } catch {
      return; // gone in between
    }
    if (await waitUntilGone(entry, waitMs)) return;
  }
}

function pidFilesIn(directory) {
  try {
    return readdirSync(directory).filter((name) => name.endsWith('.pid'));
  } catch {
    return [];
  }
}
