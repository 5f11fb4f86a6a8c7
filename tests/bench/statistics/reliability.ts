export interface ReliabilityBin {
  captures: number;
  /** Mean stated probability, and the share that was folded; both at the stated share of folded captures. */
  stated: number;
  seen: number;
}

/**
 * Stated against seen, in bins of equal count by rising score, each capture weighted so that the share of folded ones is
 * `share`; the scores are recomputed from the log-likelihood ratios for that share. Shows where a calibration error comes from.
 */
export function reliability(
  captures: readonly { logRatio: number; isFolded: boolean }[],
  share: number,
  bins = 10,
): ReliabilityBin[] {
  const folded = captures.filter(({ isFolded }) => isFolded).length;
  const weightOf = (isFolded: boolean): number =>
    isFolded ? share / folded : (1 - share) / (captures.length - folded);
  const prior = Math.log(share / (1 - share));
  const ranked = [...captures].sort((a, b) => a.logRatio - b.logRatio);
  return Array.from({ length: bins }, (_, bin) => {
    const own = ranked.slice(Math.round((bin * ranked.length) / bins), Math.round(((bin + 1) * ranked.length) / bins));
    let [weight, stated, seen] = [0, 0, 0];
    for (const { logRatio, isFolded } of own) {
      const one = weightOf(isFolded);
      weight += one;
      stated += one / (1 + Math.exp(-logRatio - prior));
      seen += isFolded ? one : 0;
    }
    return { captures: own.length, stated: stated / weight, seen: seen / weight };
  }).filter(({ captures: count }) => count > 0);
}
