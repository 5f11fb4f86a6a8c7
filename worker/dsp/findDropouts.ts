import type { EqualRun, RunAccumulator } from './RunAccumulator.js';

/**
 * Runs of one value far longer than the signal explains. With p the share of equal neighbours outside the longest runs, a
 * run of length L comes about by chance N·p^(L−1) times; a dropout is longer than three times the length at which this
 * falls below 1/1000, and at least 8 samples. Clipped tops are left out.
 * @param samples number of samples looked at
 */
export function findDropouts(runs: RunAccumulator, samples: number, clippedValues: ReadonlySet<number>): EqualRun[] {
  runs.trimLongest();
  if (samples < 16) return [];
  const inLongest = runs.longest.reduce((sum, run) => sum + run.length - 1, 0);
  const share = Math.min(0.98, Math.max(1e-6, (runs.equalNeighbours - inLongest) / samples));
  const natural = 1 + Math.log(1000 * samples) / -Math.log(share);
  const least = Math.max(8, 3 * natural);
  return runs.longest
    .filter((run) => run.length >= least && run.length < 0.98 * samples && !clippedValues.has(run.value))
    .sort((a, b) => a.firstFrame - b.firstFrame);
}
