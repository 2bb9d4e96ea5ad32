// npm run check: the fast part of npm test, without a database or a browser.
import { runChecks } from './lib/checks.mjs';
import { printError } from './lib/failure.mjs';
import { checkNodeVersion, installStale } from './lib/install.mjs';

async function main() {
  checkNodeVersion();
  await installStale();
  return runChecks(['format', 'lint', 'types', 'unit']);
}

main().then(
  (isGood) => process.exit(isGood ? 0 : 1),
  (error) => {
    printError(error);
    process.exit(1);
  },
);
