/** A stop with a message for the person at the terminal: printed without a stack. */
export class Halt extends Error {}

/** Prints one line of progress. */
export function say(text = '') {
  process.stdout.write(`${text}\n`);
}

/** Prints what went wrong: the message alone for a `Halt`, everything for what nobody expected. */
export function complain(error) {
  process.stderr.write(`\n${error instanceof Halt ? error.message : (error?.stack ?? String(error))}\n`);
}
