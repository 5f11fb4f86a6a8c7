import { readFileSync } from 'node:fs';
import { basename } from 'node:path';
import type { z } from 'zod';
import { parseManifestCsv } from '../shared/formats/parseManifestCsv.js';
import { type AcquisitionSheet, acquisitionSheetSchema } from '../shared/schemas/acquisitionSheet.js';
import { type Thresholds, thresholdsSchema } from '../shared/schemas/thresholds.js';
import { type ScreenArguments, UsageError } from './screenArguments.js';

export interface ScreenInputs {
  thresholds: Thresholds;
  /** The sheet for all files with the manifest's row for this one on top. */
  sheetOf(file: string): AcquisitionSheet;
  /** The same for a companion: rate and companion are its own, never those meant for the captures screened. */
  companionSheetOf(file: string): AcquisitionSheet;
}

/** Reads sheet, manifest and thresholds. @throws UsageError when one can't be read or is not valid */
export function readScreenInputs(options: ScreenArguments): ScreenInputs {
  const common = options.acquisition === null ? {} : readJson(options.acquisition, acquisitionSheetSchema);
  const thresholds =
    options.thresholds === null ? thresholdsSchema.parse({}) : readJson(options.thresholds, thresholdsSchema);
  const byFile = options.manifest === null ? {} : readManifest(options.manifest);
  const rowOf = (file: string): AcquisitionSheet => byFile[file] ?? byFile[basename(file)] ?? {};
  const { sampleRateHz: _rate, companion: _companion, ...commonForCompanion } = common;
  return {
    thresholds,
    sheetOf: (file) => ({ ...common, ...rowOf(file) }),
    companionSheetOf: (file) => ({ ...commonForCompanion, ...rowOf(file) }),
  };
}

function readText(file: string): string {
  try {
    return readFileSync(file, 'utf8');
  } catch (error) {
    throw new UsageError(`${file} can't be read: ${error instanceof Error ? error.message : String(error)}`);
  }
}

function readJson<T>(file: string, schema: z.ZodType<T>): T {
  let value: unknown;
  try {
    value = JSON.parse(readText(file));
  } catch (error) {
    if (error instanceof UsageError) throw error;
    throw new UsageError(`${file} is no valid JSON: ${error instanceof Error ? error.message : String(error)}`);
  }
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  const issues = parsed.error.issues.map(({ path, message }) => `${path.join('.') || 'file'}: ${message}`);
  throw new UsageError(`${file} is not valid: ${issues.join('; ')}`);
}

function readManifest(file: string): Record<string, AcquisitionSheet> {
  const { byFile, problems } = parseManifestCsv(readText(file));
  if (problems.length === 0) return byFile;
  throw new UsageError(
    `${file} is not valid: ${problems.map(({ line, message }) => `line ${line}: ${message}`).join('; ')}`,
  );
}
