/** One line on what happens, for whoever started the command. */
export function say(text) {
  process.stdout.write(`overfold: ${text}\n`);
}

/** Ends with a message and without a stack: the reader is to act on it, not to debug it. */
export function fail(text) {
  process.stderr.write(`overfold: ${text}\n`);
  process.exit(1);
}
