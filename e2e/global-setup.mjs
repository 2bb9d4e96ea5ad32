import { buildStale } from '../scripts/lib/build.mjs';
import { stackVariables, startStack } from '../scripts/lib/stack-for-tests.mjs';

/**
 * Two stacks: one that journeys share, and one of its own for the journey that cuts the server and adds up the books.
 * Playwright calls the function returned here at the end.
 */
export default async function globalSetup() {
  await buildStale(['common', 'server', 'client'], { tolerant: true });
  // Development mode has the demo's doors, which test mode keeps shut.
  const [shared, own] = await Promise.all([startStack(['--mode', 'development']), startStack()]);
  Object.assign(process.env, stackVariables(shared.info));
  process.env.OWN_STACK = JSON.stringify(stackVariables(own.info));
  return () => Promise.all([shared.stop(), own.stop()]);
}
