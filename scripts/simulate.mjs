// npm run simulate: many random histories of money (server/test/money-model.e2e-spec.ts), and one again that failed.
import { runAttached } from './lib/commands.mjs';
import { printError } from './lib/failure.mjs';
import { readOptions } from './lib/options.mjs';
import { inRoot } from './lib/paths.mjs';

const usage = `npm run simulate [-- --histories 10000] [-- --seed N [--path P] [--replay R]]
  --seed, --path, --replay  as a failed run printed them`;

const { histories, seed, path, replay } = readOptions(
  {
    histories: { type: 'string', default: '10000' },
    seed: { type: 'string' },
    path: { type: 'string' },
    replay: { type: 'string' },
  },
  usage,
);
const settings = {
  KERFYARD_HISTORIES: histories,
  ...(seed ? { KERFYARD_SEED: seed } : {}),
  ...(path ? { KERFYARD_PATH: path } : {}),
  ...(replay ? { KERFYARD_REPLAY: replay } : {}),
};
runAttached(process.execPath, [inRoot('node_modules/jest/bin/jest.js'), 'test/money-model'], {
  cwd: inRoot('server'),
  env: { ...process.env, ...settings },
}).then(
  (code) => {
    process.exitCode = code;
  },
  (error) => {
    printError(error);
    process.exitCode = 1;
  },
);
