export interface SpectrumPeak {
  bin: number;
  /** Peak density over the local floor, linear. */
  ratio: number;
  floor: number;
}

/**
 * Local maxima of a density that stand over a local floor.
 * @param floor same length as the density; @param leastRatio linear; peaks come strongest ratio first, at least
 * `separationBins` apart (the weaker neighbour inside a window's main lobe is a part of the stronger one).
 */
export function findPeaks(
  density: ArrayLike<number>,
  floor: ArrayLike<number>,
  options: { leastRatio: number; separationBins: number; firstBin: number; limit: number },
): SpectrumPeak[] {
  const peaks: SpectrumPeak[] = [];
  for (let bin = Math.max(1, options.firstBin); bin < density.length - 1; bin++) {
    const value = density[bin] as number;
    const level = floor[bin] as number;
    if (value < options.leastRatio * level || value <= 0) continue;
    if (value < (density[bin - 1] as number) || value <= (density[bin + 1] as number)) continue;
    peaks.push({ bin, ratio: level > 0 ? value / level : Number.MAX_VALUE, floor: level });
  }
  peaks.sort((a, b) => (density[b.bin] as number) - (density[a.bin] as number) || a.bin - b.bin);
  const kept: SpectrumPeak[] = [];
  for (const peak of peaks) {
    if (kept.every((other) => Math.abs(other.bin - peak.bin) >= options.separationBins)) kept.push(peak);
  }
  return kept.sort((a, b) => b.ratio - a.ratio || a.bin - b.bin).slice(0, options.limit);
}
