import { parseArgs } from 'node:util';

export const usage = `npm run bench:screening -- [options]
  --corpus DIR[,DIR…]     labelled sets that exist (DIR/labels.csv beside the captures)
  --make COMMAND          makes labelled sets: called as COMMAND --seed N --out DIR; also OVERFOLD_LABELLED_SET_COMMAND
  --seeds N[,N…]          the seeds to call it with; each set is deleted once screened
  --builtin N[,N…]        seeds of the built-in synthetic set; alone without any of these: seed 1
  --monte-carlo N         runs of each simulated case: tone estimator against its bound, clean noise; alone: no set
  --per-family N          captures of each built-in family (default 4)
  --no-pairs              screens the two files of a pair apart
  --threads N             computing threads (default: one a core)
  --list                  names what was missed, with the reason
  --json FILE             figures and every capture's result
  --markdown FILE         the tables for the documents`;

export interface BenchArguments {
  directories: string[];
  command: string | null;
  seeds: string[];
  builtinSeeds: number[];
  perFamily: number;
  monteCarloRuns: number | null;
  withPairs: boolean;
  threads: number | null;
  list: boolean;
  jsonPath: string | null;
  markdownPath: string | null;
}

/** @throws Error that says what is wrong with the arguments */
export function benchArguments(args: string[], environment: Record<string, string | undefined>): BenchArguments {
  const { values } = parseArgs({
    args,
    options: {
      corpus: { type: 'string' },
      make: { type: 'string' },
      seeds: { type: 'string' },
      builtin: { type: 'string' },
      'per-family': { type: 'string', default: '4' },
      'monte-carlo': { type: 'string' },
      'no-pairs': { type: 'boolean', default: false },
      threads: { type: 'string' },
      list: { type: 'boolean', default: false },
      json: { type: 'string' },
      markdown: { type: 'string' },
    },
  });
  const list = (text: string | undefined): string[] => (text ?? '').split(',').filter((one) => one !== '');
  const seeds = list(values.seeds);
  const command = values.make ?? environment['OVERFOLD_LABELLED_SET_COMMAND'] ?? null;
  if (seeds.length > 0 && command === null)
    throw new Error('--seeds needs --make COMMAND (or OVERFOLD_LABELLED_SET_COMMAND): what is to make the sets?');
  if (values.make !== undefined && seeds.length === 0)
    throw new Error('--make needs --seeds: which sets is the command to make?');
  const directories = list(values.corpus);
  const isAlone = directories.length === 0 && seeds.length === 0 && values['monte-carlo'] === undefined;
  return {
    directories,
    command,
    seeds,
    builtinSeeds: list(values.builtin ?? (isAlone ? '1' : '')).map((one) => wholeNumber(one, '--builtin')),
    perFamily: wholeNumber(values['per-family'], '--per-family'),
    monteCarloRuns: values['monte-carlo'] === undefined ? null : wholeNumber(values['monte-carlo'], '--monte-carlo'),
    withPairs: !values['no-pairs'],
    threads: values.threads === undefined ? null : wholeNumber(values.threads, '--threads'),
    list: values.list,
    jsonPath: values.json ?? null,
    markdownPath: values.markdown ?? null,
  };
}

function wholeNumber(text: string, option: string): number {
  const value = Number(text);
  if (!Number.isInteger(value) || value < 1) throw new Error(`${option}: "${text}" is no whole number above 0.`);
  return value;
}
