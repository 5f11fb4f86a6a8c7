import { existsSync } from 'node:fs';
import { basename, dirname, resolve } from 'node:path';
import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import type { CompanionFile } from './addCompanion.js';

export interface RunOfFiles {
  /** Every file screened in this run. */
  files: readonly string[];
  manifestPath: string | null;
  /** Given for all files by the option; outweighs everything else. */
  companionPath: string | null;
  sheetOf(file: string): AcquisitionSheet;
  companionSheetOf(file: string): AcquisitionSheet;
  /** Sampling rate of a file, null where unknown or unreadable. */
  rateHzOf(file: string): number | null;
}

/**
 * The companion of a file: the one given for all; the one that its sheet names, looked for beside the file, then beside the
 * manifest; the file of this run with the same `pair`; the only file of this run from the same logger and position at another
 * rate. Of several with the same `pair` the fastest shows most.
 */
export function findCompanion(file: string, run: RunOfFiles): CompanionFile | null {
  const made = (path: string): CompanionFile | null =>
    isSame(path, file) ? null : { path, name: basename(path), sheet: run.companionSheetOf(path) };
  if (run.companionPath !== null) return made(run.companionPath);
  const sheet = run.sheetOf(file);
  const named = sheet.companion ?? '';
  if (named !== '') return made(placeOf(named, file, run));
  const others = run.files.filter((other) => !isSame(other, file));
  const pair = sheet.pair ?? '';
  if (pair !== '') {
    const paired = others.filter((other) => run.sheetOf(other).pair === pair);
    const [only] = paired;
    if (only === undefined) return null;
    return made(paired.length === 1 ? only : fastest(paired, run));
  }
  if ((sheet.logger ?? '') === '' || (sheet.position ?? '') === '') return null;
  const rateHz = run.rateHzOf(file);
  const alike = others.filter((other) => {
    const { logger, position } = run.sheetOf(other);
    if (logger !== sheet.logger || position !== sheet.position || rateHz === null) return false;
    const otherRateHz = run.rateHzOf(other);
    return otherRateHz !== null && Math.abs(otherRateHz / rateHz - 1) > 1e-6;
  });
  const [candidate] = alike;
  return alike.length === 1 && candidate !== undefined ? made(candidate) : null;
}

/** Where nothing is found the place beside the file is kept: the message names it. */
function placeOf(named: string, file: string, { manifestPath, files }: RunOfFiles): string {
  const beside = resolve(dirname(file), named);
  const inRun = files.find((other) => basename(other) === named);
  const places = [beside, ...(manifestPath === null ? [] : [resolve(dirname(manifestPath), named)])];
  return places.find((place) => existsSync(place)) ?? inRun ?? beside;
}

function fastest(files: string[], run: RunOfFiles): string {
  return files.reduce((best, one) => ((run.rateHzOf(one) ?? 0) > (run.rateHzOf(best) ?? 0) ? one : best));
}

const isSame = (a: string, b: string): boolean => resolve(a) === resolve(b);
