import { quantile } from '../quantile.js';

/** A narrow line in a spectrum over warped time. */
export interface WarpedLine {
  bin: number;
  power: number;
  /** Mean power of the bins around it, lines left out. */
  floor: number;
  /** Power over floor, linear. */
  ratio: number;
}

const nearest = 4;
const farthest = 36;
const quickBins = 10;
/** Median of an exponential distribution over its mean. */
const medianShare = Math.LN2;

export function binPowers(spectrum: Float64Array): Float64Array {
  return Float64Array.from(
    { length: spectrum.length / 2 },
    (_, k) => (spectrum[2 * k] as number) ** 2 + (spectrum[2 * k + 1] as number) ** 2,
  );
}

/**
 * Local maxima that stand above the bins on both sides: the floor is the higher of the two sides' medians, so that the
 * shoulder of a smeared line is none. Bins `from` … `to` − 1; strongest ratio first.
 */
export function warpedLines(powers: Float64Array, from: number, to: number, leastRatio: number): WarpedLine[] {
  const lines: WarpedLine[] = [];
  for (let bin = Math.max(2, from); bin < Math.min(to, powers.length - 1); bin++) {
    const power = powers[bin] as number;
    if (power < (powers[bin - 1] as number) || power <= (powers[bin + 1] as number)) continue;
    if (isDrowned(powers, bin, (power / leastRatio) * medianShare)) continue;
    const floor = floorAround(powers, bin);
    if (power > leastRatio * floor) lines.push({ bin, power, floor, ratio: power / Math.max(floor, 1e-300) });
  }
  return lines.sort((a, b) => b.ratio - a.ratio);
}

/** Whether so many of the bins around are so high that the floor can't be low enough: spares most local maxima the medians. */
function isDrowned(powers: Float64Array, bin: number, most: number): boolean {
  let higher = 0;
  for (let k = nearest; k < nearest + quickBins; k++) {
    if ((powers[Math.max(1, bin - k)] as number) > most) higher++;
    if ((powers[Math.min(powers.length - 1, bin + k)] as number) > most) higher++;
  }
  return higher > 1.5 * quickBins;
}

function floorAround(powers: Float64Array, bin: number): number {
  const left = powers.subarray(Math.max(1, bin - farthest), Math.max(2, bin - nearest));
  const right = powers.subarray(
    Math.min(powers.length - 2, bin + nearest + 1),
    Math.min(powers.length, bin + farthest + 1),
  );
  return Math.max(quantile(left, 0.5), quantile(right, 0.5)) / medianShare;
}
