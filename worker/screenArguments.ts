import { parseArgs } from 'node:util';

export interface ScreenArguments {
  files: string[];
  acquisition: string | null;
  manifest: string | null;
  thresholds: string | null;
  companion: string | null;
  out: string | null;
  pretty: boolean;
  help: boolean;
}

export const screenUsage = `Usage: npm run --silent screen -- [options] FILES...

Screens WAV and CSV captures for aliasing. One JSON object a line per channel on standard output.

  --acquisition FILE.json  acquisition sheet for all files
  --manifest FILE.csv      a row a file: file, sampleRateHz, highestFrequencyHz, filterType, filterOrder,
                           filterCornerHz, sources, nominalSpeedHz, companion, unit, scale,
                           logger, position, pair (files of one pair are companions of each other)
  --thresholds FILE.json   thresholds that differ from the defaults
  --companion FILE         the same event at another rate, for all files; without it: the manifest's companion,
                           the other file of its pair, or the only one from its logger and position at another rate
  --out DIR                writes the measurement record (JSON) and a picture (SVG) per channel
  --pretty                 indents the JSON

Exit status: 0 all screened, 1 some file failed, 2 bad usage.
`;

/** The command's arguments. @throws UsageError on an unknown option, a missing value, or no file */
export function screenArguments(argv: string[]): ScreenArguments {
  try {
    const { values, positionals } = parseArgs({
      args: argv,
      allowPositionals: true,
      strict: true,
      options: {
        acquisition: { type: 'string' },
        manifest: { type: 'string' },
        thresholds: { type: 'string' },
        companion: { type: 'string' },
        out: { type: 'string' },
        pretty: { type: 'boolean', default: false },
        help: { type: 'boolean', default: false, short: 'h' },
      },
    });
    if (positionals.length === 0 && !values.help) throw new UsageError('Name at least one capture file.');
    return {
      files: positionals,
      acquisition: values.acquisition ?? null,
      manifest: values.manifest ?? null,
      thresholds: values.thresholds ?? null,
      companion: values.companion ?? null,
      out: values.out ?? null,
      pretty: values.pretty,
      help: values.help,
    };
  } catch (error) {
    if (error instanceof UsageError) throw error;
    throw new UsageError(error instanceof Error ? error.message : String(error));
  }
}

/** The command was called wrongly: exit status 2. */
export class UsageError extends Error {
  override readonly name = 'UsageError';
}
