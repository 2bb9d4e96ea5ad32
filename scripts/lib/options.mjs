import { parseArgs } from 'node:util';
import { Failure } from './failure.mjs';

/** The command line's options, by node:util's parseArgs; a wrong one is a Failure that shows `usage`. */
export function readOptions(options, usage) {
  try {
    return parseArgs({ options, allowPositionals: false }).values;
  } catch (error) {
    throw new Failure(`${error.message}\n\n${usage}`);
  }
}
