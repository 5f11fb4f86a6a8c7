import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { basename, join } from 'node:path';
import { benchArguments, type BenchArguments, usage } from './benchArguments.js';
import { benchFigures } from './figures/benchFigures.js';
import { markdownReport } from './report/markdownReport.js';
import { runMonteCarlo } from './monteCarlo/runMonteCarlo.js';
import { missTables } from './report/missTables.js';
import { monteCarloTables } from './report/monteCarloTables.js';
import { reportTables } from './report/reportTables.js';
import { textReport } from './report/textReport.js';
import type { ScreenedCapture } from './screening/ScreenedCapture.js';
import { screenSet } from './screening/screenSet.js';
import { makeLabelledSet } from './sets/makeLabelledSet.js';
import { readLabelledSet } from './sets/readLabelledSet.js';
import { writeSyntheticSet } from './synthetic/writeSyntheticSet.js';

interface SetToScreen {
  name: string;
  /** Fills a directory that is deleted once screened; null where the set is there already. */
  make: ((directory: string) => void) | null;
  directory: string | null;
}

function setsOf(given: BenchArguments): SetToScreen[] {
  return [
    ...given.directories.map((directory) => ({ name: basename(directory), make: null, directory })),
    ...given.seeds.map((seed) => ({
      name: `seed ${seed}`,
      make: (directory: string) => makeLabelledSet(given.command ?? '', seed, directory),
      directory: null,
    })),
    ...given.builtinSeeds.map((seed) => ({
      name: `built-in ${seed}`,
      make: (directory: string) => writeSyntheticSet(directory, seed, given.perFamily),
      directory: null,
    })),
  ];
}

async function screenOne(set: SetToScreen, given: BenchArguments): Promise<ScreenedCapture[]> {
  const directory = set.directory ?? mkdtempSync(join(tmpdir(), 'overfold-bench-'));
  try {
    set.make?.(directory);
    const captures = readLabelledSet(directory, set.name);
    return await screenSet(captures, {
      ...(given.threads === null ? {} : { threads: given.threads }),
      withPairs: given.withPairs,
      onProgress: (done) => console.error(`${set.name}: ${done} of ${captures.length}`),
    });
  } finally {
    if (set.directory === null) rmSync(directory, { recursive: true, force: true });
  }
}

async function run(given: BenchArguments): Promise<void> {
  const all: ScreenedCapture[] = [];
  // One set after the other: only one needs room on the disk.
  for (const set of setsOf(given)) all.push(...(await screenOne(set, given)));
  const figures = all.length === 0 ? null : benchFigures(all);
  const monteCarlo =
    given.monteCarloRuns === null
      ? null
      : await runMonteCarlo(given.monteCarloRuns, {
          ...(given.threads === null ? {} : { threads: given.threads }),
          onProgress: (text) => console.error(text),
        });
  const tables = [...(figures ? reportTables(figures) : []), ...(monteCarlo ? monteCarloTables(monteCarlo) : [])];
  console.log(textReport(given.list && figures ? [...tables, ...missTables(all, figures)] : tables));
  if (given.markdownPath !== null) writeFileSync(given.markdownPath, markdownReport(tables));
  if (given.jsonPath !== null) writeFileSync(given.jsonPath, JSON.stringify({ figures, monteCarlo, captures: all }));
}

try {
  await run(benchArguments(process.argv.slice(2), process.env));
} catch (error) {
  console.error(`${error instanceof Error ? error.message : String(error)}\n\n${usage}`);
  process.exitCode = 2;
}
