/** Stops the stack that global-setup.mjs started and waits until it has cleaned up. */
export default async function globalTeardown() {
  await globalThis.stopKerfyardStack?.();
}
