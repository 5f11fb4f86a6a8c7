import { spawnSync } from 'node:child_process';

/**
 * Has the user's own command make a labelled set: `COMMAND --seed N --out DIR` must leave DIR/labels.csv and the captures.
 * @throws Error with what the command said when it fails
 */
export function makeLabelledSet(command: string, seed: string, directory: string): void {
  // The command is split at blanks, not handed to a shell: nothing in it is expanded.
  const [program, ...rest] = command.trim().split(/\s+/);
  if (program === undefined || program === '') throw new Error('The command that makes labelled sets is empty.');
  const { status, error, stderr } = spawnSync(program, [...rest, '--seed', seed, '--out', directory], {
    encoding: 'utf8',
  });
  if (error) throw new Error(`${program} could not be started: ${error.message}`);
  if (status !== 0) throw new Error(`${command} --seed ${seed} ended with status ${status}:\n${stderr.trim()}`);
}
