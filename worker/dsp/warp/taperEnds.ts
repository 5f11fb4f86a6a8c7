const share = 0.05;

/** A copy whose first and last twentieth rise and fall as half a cosine (Tukey 1967), so that strong lines leak little. */
export function taperEnds(samples: Float64Array): Float64Array {
  const edge = Math.max(1, share * samples.length);
  return samples.map((value, n) => {
    const distance = Math.min(n, samples.length - 1 - n) + 0.5;
    return distance >= edge ? value : value * (0.5 - 0.5 * Math.cos((Math.PI * distance) / edge));
  });
}
