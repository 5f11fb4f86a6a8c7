/**
 * Expected ratio of the median to the mean of K independent exponentially distributed densities:
 * Σ_{l=1..K} (−1)^(l+1)/l for odd K (1 for K = 1, limit ln 2). Dividing a median by it makes it comparable with a mean of
 * stationary noise. Even K take the value of K−1, as the mean of the two middle values has nearly that expectation.
 * @see Allen et al. 2012, "FINDCHIRP", appendix B
 */
export function medianBias(segments: number): number {
  if (!(segments >= 1)) throw new RangeError(`A median needs at least one segment, got ${segments}.`);
  if (segments > 2000) return Math.LN2;
  const odd = segments % 2 === 1 ? segments : segments - 1;
  let sum = 0;
  for (let l = 1; l <= odd; l++) sum += (l % 2 === 1 ? 1 : -1) / l;
  return sum;
}
