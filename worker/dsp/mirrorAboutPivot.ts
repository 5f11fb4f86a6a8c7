import type { MirrorMeasurement } from '../../shared/screening/MeasurementRecord.js';
import { runningMedian } from './runningMedian.js';

const factors = [2, 3, 4, 5, 6, 7, 8] as const;

/**
 * Looks for the images that raising a rate L-fold by repetition or straight lines leaves: the spectrum, noise and all, is
 * mirrored about every multiple of (fs/2)/L. The log density less its running median is correlated with its mirror about
 * each pivot; a factor counts with the least of its pivots, and is compared with all pivots that do not belong to it
 * (a comb of harmonics, or a flat sweep, is mirrored about many).
 * @returns the factor with the highest correlation, null with fewer than 128 bins
 */
export function mirrorAboutPivot(density: Float64Array, resolutionHz: number): MirrorMeasurement | null {
  const last = density.length - 1;
  if (last < 127) return null;
  const log = density.map((value) => 10 * Math.log10(Math.max(value, 1e-40)));
  const trend = runningMedian(log, Math.max(8, Math.floor(last / 64)));
  const detail = log.map((value, bin) => Math.max(-12, Math.min(12, value - (trend[bin] as number))));
  const least = Math.max(16, Math.floor(last / 16));
  const correlations = Float64Array.from({ length: last + 1 }, (_, pivot) =>
    pivot < least || pivot > last - least ? 0 : mirrorCorrelation(detail, pivot),
  );
  let best: { factor: number; correlation: number } | null = null;
  for (const factor of factors) {
    let correlation = 1;
    for (let k = 1; k < factor; k++) {
      const pivot = Math.round((k * last) / factor);
      correlation = Math.min(correlation, Math.max(...correlations.slice(pivot - 1, pivot + 2)));
    }
    if (best === null || correlation > best.correlation + 0.005) best = { factor, correlation };
  }
  if (best === null) return null;
  const { factor, correlation } = best;
  const spacing = last / factor;
  let runnerUp = 0;
  correlations.forEach((value, bin) => {
    const distance = Math.abs(bin - spacing * Math.round(bin / spacing));
    if (distance > 4) runnerUp = Math.max(runnerUp, value);
  });
  return {
    pivotHz: spacing * resolutionHz,
    factor,
    correlation,
    runnerUp,
    imageDb: imageLevelDb(density, Math.round(spacing)),
  };
}

function mirrorCorrelation(detail: Float64Array, pivot: number): number {
  const last = detail.length - 1;
  const width = Math.min(pivot - 2, last - 1 - pivot, Math.floor(last / 4));
  let [xy, xx, yy] = [0, 0, 0];
  for (let offset = 3; offset <= width; offset++) {
    const [a, b] = [detail[pivot - offset] as number, detail[pivot + offset] as number];
    xy += a * b;
    xx += a * a;
    yy += b * b;
  }
  return xx > 0 && yy > 0 ? xy / Math.sqrt(xx * yy) : 0;
}

function imageLevelDb(density: Float64Array, pivot: number): number {
  let [image, original] = [0, 0];
  for (let offset = 3; offset < pivot - 1 && pivot + offset < density.length; offset++) {
    original += density[pivot - offset] as number;
    image += density[pivot + offset] as number;
  }
  return 10 * Math.log10(Math.max(image, 1e-40) / Math.max(original, 1e-40));
}
