/** A problem the person at the terminal can act on: printed as it is, without a stack trace. */
export class Failure extends Error {}

/** Prints an error the way a person needs it: plain for a Failure, with its stack when it is a defect. */
export function printError(error) {
  console.error(`\n${error instanceof Failure ? error.message : (error?.stack ?? error)}`);
}
