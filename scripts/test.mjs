// npm test: every check there is, from a fresh clone, with a database and ports of its own.
import { checkNames, runChecks } from './lib/checks.mjs';
import { Failure, printError } from './lib/failure.mjs';
import { checkNodeVersion, installStale } from './lib/install.mjs';
import { readOptions } from './lib/options.mjs';
import { inRoot } from './lib/paths.mjs';
import { postgresPrograms } from './lib/postgres-programs.mjs';

const usage = `npm test [-- --only NAME]...   NAME: ${checkNames.join(', ')}`;

async function main() {
  const { only } = readOptions({ only: { type: 'string', multiple: true } }, usage);
  const unknown = only?.filter((name) => !checkNames.includes(name)) ?? [];
  if (unknown.length) throw new Failure(`No such check: ${unknown.join(', ')}\n${usage}`);
  checkNodeVersion();
  await installStale({ logFile: inRoot('.tmp/install.log') });
  await postgresPrograms(inRoot('.tmp/no-cluster'));
  return runChecks(checkNames.filter((name) => !only || only.includes(name)));
}

main().then(
  (isGood) => process.exit(isGood ? 0 : 1),
  (error) => {
    printError(error);
    console.log('0 passed, 1 failed');
    process.exit(1);
  },
);
