import { spawn } from 'node:child_process';
import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { createInterface } from 'node:readline';
import { inRoot, root } from './paths.mjs';

// The shell ends its whole process group as soon as its input closes: when we ask for it, and when we are killed.
const untilInputCloses = '"$@" </dev/null & cat >/dev/null; trap "" TERM; kill -TERM 0; wait';

/**
 * Starts a watching tool from node_modules/.bin with its lines shown under its name. Returns it as a
 * service: `{ name, hasExited, exited, stop, logFile }`.
 */
export function spawnTool({ name, args, env, cwd = root }) {
  // A workspace may have a version of its own.
  const program = [join(cwd, 'node_modules/.bin', name), inRoot('node_modules/.bin', name)].find(existsSync);
  const command = [program, ...args];
  const shell = spawn('/bin/sh', ['-c', untilInputCloses, name, ...command], {
    cwd,
    env,
    detached: true,
    stdio: ['pipe', 'pipe', 'pipe'],
  });
  const tool = { name, hasExited: false, logFile: '' };
  tool.exited = new Promise((resolve) => {
    shell.once('close', (code) => {
      tool.hasExited = true;
      resolve(code);
    });
  });
  for (const stream of [shell.stdout, shell.stderr]) {
    createInterface({ input: stream }).on('line', (line) => {
      // The first address a person sees is the app's, so a tool does not announce its own.
      if (line.trim() && !line.includes('://')) console.log(`[${name}] ${line}`);
    });
  }
  tool.stop = () => {
    shell.stdin.end();
    return tool.exited;
  };
  return tool;
}
