import { once } from 'node:events';

/** Stops the stack that global-setup.mjs started and waits until it has cleaned up. */
export default async function globalTeardown() {
  const stack = globalThis.kerfyardStack;
  if (!stack || stack.exitCode !== null) return;
  stack.ref();
  stack.kill('SIGTERM');
  await once(stack, 'exit');
}
