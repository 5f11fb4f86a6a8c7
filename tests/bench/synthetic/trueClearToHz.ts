/**
 * What the rule for the clear-to frequency gives on true densities: the top of the unbroken stretch from 0 Hz in which the
 * density, smoothed over fs/40, stays above the density next to fs/2 by the protection.
 * @param density true one-sided density on equal steps from 0 to fs/2, the constant part left out
 * @param edgeDensity true density next to fs/2, lines of constant frequency left out
 * @returns 0 where not even the lowest stretch is protected
 */
export function trueClearToHz(
  density: Float64Array,
  edgeDensity: number,
  sampleRateHz: number,
  protectionDb: number,
): number {
  const stepHz = sampleRateHz / 2 / (density.length - 1);
  const reach = Math.floor(sampleRateHz / 80 / stepHz);
  const needed = edgeDensity * 10 ** (protectionDb / 10);
  // The first steps hold what a window makes of 0 Hz.
  const first = 2;
  let clearToHz = 0;
  for (let step = first; step < density.length; step++) {
    const near = density.subarray(Math.max(first, step - reach), Math.min(density.length, step + reach + 1));
    if (near.reduce((sum, value) => sum + value, 0) / near.length < needed) break;
    clearToHz = step * stepHz;
  }
  return clearToHz;
}
