/** Moving average of a linear density over 2·reach+1 bins, fewer at the ends; reach need not be whole (rounded). */
export function smoothDensity(density: ArrayLike<number>, reachBins: number): Float64Array {
  const reach = Math.max(0, Math.round(reachBins));
  const sums = new Float64Array(density.length + 1);
  for (let bin = 0; bin < density.length; bin++) sums[bin + 1] = (sums[bin] as number) + (density[bin] as number);
  return Float64Array.from({ length: density.length }, (_, bin) => {
    const from = Math.max(0, bin - reach);
    const to = Math.min(density.length, bin + reach + 1);
    return Math.max(0, (sums[to] as number) - (sums[from] as number)) / (to - from);
  });
}
