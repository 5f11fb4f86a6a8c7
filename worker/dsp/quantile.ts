/** The p-quantile of the values by linear interpolation between order statistics; NaN for an empty list. */
export function quantile(values: ArrayLike<number>, p: number): number {
  return quantileOfSorted(Float64Array.from(values).sort(), p);
}

export function quantileOfSorted(sorted: ArrayLike<number>, p: number): number {
  if (sorted.length === 0) return Number.NaN;
  const place = Math.min(Math.max(p, 0), 1) * (sorted.length - 1);
  const below = Math.floor(place);
  const low = sorted[below] as number;
  const high = sorted[Math.min(below + 1, sorted.length - 1)] as number;
  return low + (high - low) * (place - below);
}
