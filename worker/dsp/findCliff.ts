import { smoothDensity } from './smoothDensity.js';

export interface Cliff {
  /** Where the density has fallen to half of what it was before: the true bandwidth. */
  edgeHz: number;
  depthDb: number;
}

export interface CliffSearch {
  /** Fall within a twelfth of the frequency. */
  leastDepthDb: number;
  /** Search up to this share of the spectrum's end. */
  highestShare: number;
}

/**
 * 30 dB within a twelfth of the frequency, 240 dB an octave: no analogue filter is as steep. In the upper fifth of the
 * band a converter's own decimating filter is.
 */
export const digitalCliff: CliffSearch = { leastDepthDb: 30, highestShare: 0.8 };
/** Below the old folding frequency of a capture whose rate was raised, any steep fall is the end of its content. */
export const oldBandEnd: CliffSearch = { leastDepthDb: 20, highestShare: 1 };
const widthShare = 1 / 12;
/** Above the cliff no more than this share of the power is left (images of a short interpolating filter included). */
const largestRestShare = 1e-2;
const halfPower = 0.5;

/**
 * The lowest frequency at which the density breaks off like a digital low-pass: by at least 30 dB within a twelfth of its
 * frequency, with next to nothing above. Filters in front of a converter fall more gently (common practice: up to 8 poles,
 * some 100 dB an octave), so such a cliff well below fs/2 was made after sampling: the rate was raised, or the capture filtered.
 * @param density one-sided, linear, without tones, bin k at k·resolutionHz; @returns null without a cliff there
 */
export function findCliff(
  density: Float64Array,
  resolutionHz: number,
  { leastDepthDb, highestShare }: CliffSearch = digitalCliff,
): Cliff | null {
  const last = density.length - 1;
  const smooth = smoothDensity(density, last / 1024);
  const restOf = new Float64Array(last + 2);
  for (let bin = last; bin >= 0; bin--) restOf[bin] = (restOf[bin + 1] as number) + (density[bin] as number);
  const total = restOf[1] as number;
  for (let bin = 16; bin <= highestShare * last; bin++) {
    const below = Math.round(bin * (1 - widthShare));
    const before = smooth[below] as number;
    const fallDb = 10 * Math.log10(before / Math.max(smooth[bin] as number, 1e-40));
    if (fallDb < leastDepthDb || (restOf[bin] as number) > largestRestShare * total) continue;
    // A dip inside the band is no end of it: nothing above may come near what was before.
    const above = smooth.subarray(Math.min(last, Math.round(1.5 * bin))).reduce((a, b) => Math.max(a, b), 0);
    if (above > 0.01 * before) continue;
    return { edgeHz: halfPowerBin(smooth, below, bin) * resolutionHz, depthDb: fallDb };
  }
  return null;
}

/** Last bin before the fall at which the density still is half the median of the stretch before it. */
function halfPowerBin(smooth: Float64Array, below: number, bin: number): number {
  const from = Math.max(1, Math.round(below * 0.85));
  const plateau = [...smooth.subarray(from, below + 1)].sort((a, b) => a - b)[(below + 1 - from) >> 1] as number;
  let edge = bin;
  while (edge > below && (smooth[edge] as number) < halfPower * plateau) edge--;
  return edge;
}
