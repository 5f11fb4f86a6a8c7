import { runningMedian } from './runningMedian.js';

/**
 * Density without its lines: bins more than `leastRatio` above a running median, and the flanks beside them, take the
 * median's value. Wide humps stay; so does everything in spectra of fewer than 16 bins.
 */
export function removeTones(density: Float64Array, leastRatio: number, reachBins = 20): Float64Array {
  if (density.length < 16) return Float64Array.from(density);
  const floor = runningMedian(density, Math.min(reachBins, Math.floor(density.length / 6)));
  const result = Float64Array.from(density);
  for (let bin = 0; bin < density.length; bin++) {
    if ((density[bin] as number) <= leastRatio * (floor[bin] as number)) continue;
    for (let near = Math.max(0, bin - 3); near <= Math.min(density.length - 1, bin + 3); near++) {
      result[near] = Math.min(result[near] as number, floor[near] as number);
    }
  }
  return result;
}
