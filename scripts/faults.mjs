// npm run faults: kills the app at random moments while money is released (server/test/money-faults.fault-spec.ts).
import { runAttached } from './lib/commands.mjs';
import { printError } from './lib/failure.mjs';
import { readOptions } from './lib/options.mjs';
import { inRoot } from './lib/paths.mjs';

const usage = 'npm run faults [-- --kills 200] [-- --seed N]';

const { kills, seed } = readOptions(
  { kills: { type: 'string', default: '200' }, seed: { type: 'string' } },
  usage,
);
runAttached(
  process.execPath,
  [inRoot('node_modules/jest/bin/jest.js'), '--testMatch', '<rootDir>/test/**/*.fault-spec.ts'],
  {
    cwd: inRoot('server'),
    env: { ...process.env, KERFYARD_KILLS: kills, ...(seed ? { KERFYARD_SEED: seed } : {}) },
  },
).then(
  (code) => {
    process.exitCode = code;
  },
  (error) => {
    printError(error);
    process.exitCode = 1;
  },
);
