import { setUpStack } from '../../scripts/lib/stack-for-tests.mjs';

/**
 * One whole stack for all specs, in a child process: jest's parent transforms what it loads, which would give Nest two
 * copies of itself.
 */
export default async function globalSetup() {
  globalThis.stopKerfyardStack = await setUpStack(['common', 'server']);
}
