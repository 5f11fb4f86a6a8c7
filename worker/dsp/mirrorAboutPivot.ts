import type { MirrorMeasurement } from '../../shared/screening/MeasurementRecord.js';
import { runningMedian } from './runningMedian.js';

/**
 * Looks for a spectrum mirrored about a pivot below fs/2: raising a rate by repeating samples or by straight lines leaves
 * images of the old spectrum, noise and all, mirrored about the old folding frequency. The log density less its running
 * median is correlated with its mirror over up to a quarter of the band on both sides.
 * @returns the pivot with the highest correlation, null with fewer than 128 bins
 */
export function mirrorAboutPivot(density: Float64Array, resolutionHz: number): MirrorMeasurement | null {
  const bins = density.length;
  if (bins < 128) return null;
  const log = density.map((value) => 10 * Math.log10(Math.max(value, 1e-40)));
  const trend = runningMedian(log, Math.max(8, Math.floor(bins / 64)));
  const detail = log.map((value, bin) => Math.max(-12, Math.min(12, value - (trend[bin] as number))));
  let best: { pivot: number; correlation: number; imageDb: number } | null = null;
  const correlations = new Float64Array(bins);
  const least = Math.max(24, Math.floor(bins / 16));
  for (let pivot = least; pivot < bins - least; pivot++) {
    const width = Math.min(pivot - 2, bins - 2 - pivot, Math.floor(bins / 4));
    let [xy, xx, yy] = [0, 0, 0];
    for (let offset = 3; offset <= width; offset++) {
      const [a, b] = [detail[pivot - offset] as number, detail[pivot + offset] as number];
      xy += a * b;
      xx += a * a;
      yy += b * b;
    }
    const correlation = xx > 0 && yy > 0 ? xy / Math.sqrt(xx * yy) : 0;
    correlations[pivot] = correlation;
    if (best !== null && correlation <= best.correlation) continue;
    let [image, original] = [0, 0];
    for (let offset = 3; offset <= width; offset++) {
      original += density[pivot - offset] as number;
      image += density[pivot + offset] as number;
    }
    const imageDb = 10 * Math.log10(Math.max(image, 1e-40) / Math.max(original, 1e-40));
    best = { pivot, correlation, imageDb };
  }
  if (best === null) return null;
  const { pivot, correlation, imageDb } = best;
  const runnerUp = correlations.reduce(
    (top, value, bin) => (Math.abs(bin - pivot) > 4 ? Math.max(top, value) : top),
    0,
  );
  return { pivotHz: pivot * resolutionHz, correlation, runnerUp, imageDb };
}
