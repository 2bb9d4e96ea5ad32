// npm run pictures: a picture of every page in every role, over a demo of its own. Arguments go on to the program.
import { buildStale } from './lib/build.mjs';
import { ensureChromium } from './lib/chromium.mjs';
import { runAttached } from './lib/commands.mjs';
import { printError } from './lib/failure.mjs';
import { checkNodeVersion, installStale } from './lib/install.mjs';
import { inRoot } from './lib/paths.mjs';
import { step } from './lib/progress.mjs';
import { stackVariables, startStack } from './lib/stack-for-tests.mjs';

const program = inRoot('e2e/pictures/pictures.mjs');

async function main() {
  checkNodeVersion();
  await installStale();
  await ensureChromium();
  await buildStale();
  const stack = await step('Starting a demo for the pictures', () =>
    startStack(['--seed', '--mode', 'demo']),
  );
  try {
    const env = { ...process.env, ...stackVariables(stack.info) };
    return await runAttached(process.execPath, [program, ...process.argv.slice(2)], { env });
  } finally {
    await stack.stop();
  }
}

main().then(
  (code) => {
    process.exitCode = code;
  },
  (error) => {
    printError(error);
    process.exitCode = 1;
  },
);
