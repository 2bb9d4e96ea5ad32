import { setUpStack } from '../scripts/lib/stack-for-tests.mjs';

/** One stack for all journeys; Playwright calls the function returned here at the end. */
export default async function globalSetup() {
  return setUpStack(['common', 'server', 'client']);
}
