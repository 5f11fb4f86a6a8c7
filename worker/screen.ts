import { mkdirSync, writeFileSync } from 'node:fs';
import { basename, join } from 'node:path';
import { CaptureError } from '../shared/formats/CaptureError.js';
import type { ScreenError } from '../shared/schemas/screening.js';
import { createRateReader } from './companion/createRateReader.js';
import { findCompanion, type RunOfFiles } from './companion/findCompanion.js';
import { type ScreenArguments, screenArguments, screenUsage, UsageError } from './screenArguments.js';
import { type ScreenedFile, screenFile } from './screenFile.js';
import { readScreenInputs, type ScreenInputs } from './screenInputs.js';
import { spectrumSvg } from './spectrumSvg.js';

process.exitCode = run(process.argv.slice(2));

/** @returns the exit status: 0 all screened, 1 some file failed, 2 bad usage */
function run(argv: string[]): number {
  let options: ScreenArguments;
  let inputs: ScreenInputs;
  try {
    options = screenArguments(argv);
    if (options.help) {
      process.stderr.write(screenUsage);
      return 0;
    }
    inputs = readScreenInputs(options);
    if (options.out !== null) mkdirSync(options.out, { recursive: true });
  } catch (error) {
    process.stderr.write(
      `${error instanceof Error ? error.message : String(error)}\n\n${error instanceof UsageError ? screenUsage : ''}`,
    );
    return 2;
  }
  const { sheetOf, companionSheetOf } = inputs;
  const runOfFiles: RunOfFiles = {
    files: options.files,
    manifestPath: options.manifest,
    companionPath: options.companion,
    sheetOf,
    companionSheetOf,
    rateHzOf: createRateReader(sheetOf),
  };
  let failures = 0;
  options.files.forEach((file, index) => {
    process.stderr.write(`[${index + 1}/${options.files.length}] ${file}\n`);
    try {
      const screened = screenOne(file, inputs, runOfFiles);
      for (const screen of screened.screens) print({ ...screen, file }, options.pretty);
      if (options.out !== null) writeOut(options.out, file, screened);
    } catch (error) {
      failures++;
      print(errorLine(file, error), options.pretty);
    }
  });
  return failures > 0 ? 1 : 0;
}

function screenOne(file: string, inputs: ScreenInputs, run: RunOfFiles): ScreenedFile {
  const companion = findCompanion(file, run);
  if (companion !== null) process.stderr.write(`  companion: ${companion.path}\n`);
  return screenFile(file, {
    sheet: inputs.sheetOf(file),
    thresholds: inputs.thresholds,
    fileName: basename(file),
    companion,
  });
}

function print(line: object, pretty: boolean): void {
  process.stdout.write(`${JSON.stringify(line, null, pretty ? 2 : undefined)}\n`);
}

function errorLine(file: string, error: unknown): ScreenError {
  const code = error instanceof CaptureError ? error.code : systemCode(error);
  const message = error instanceof Error ? error.message : String(error);
  process.stderr.write(`${file}: ${message}\n`);
  return { schema: 'overfold.screen/1', file, error: { code, message } };
}

function systemCode(error: unknown): string {
  const code = error instanceof Error && 'code' in error ? error.code : undefined;
  if (code === 'ENOENT') return 'FILE_NOT_FOUND';
  return code === 'EACCES' || code === 'EISDIR' ? 'FILE_NOT_READABLE' : 'SCREENING_FAILED';
}

function writeOut(directory: string, file: string, screened: ScreenedFile): void {
  screened.measurements.forEach(({ record, spectra }, channel) => {
    const stem = join(directory, `${basename(file)}.ch${channel}`);
    writeFileSync(`${stem}.json`, `${JSON.stringify(record, null, 2)}\n`);
    const survey = spectra.find(({ kind }) => kind === 'survey');
    const screen = screened.screens[channel];
    if (survey !== undefined && screen !== undefined) writeFileSync(`${stem}.svg`, spectrumSvg(screen, survey));
  });
}
