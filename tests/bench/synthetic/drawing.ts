export function between(random: () => number, low: number, high: number): number {
  return low + (high - low) * random();
}

export function pick<T>(random: () => number, choices: readonly [T, ...T[]]): T {
  return choices[Math.floor(random() * choices.length)] ?? choices[0];
}

/** Gaussian noise of unit variance (Box-Muller). */
export function gaussian(random: () => number, count: number): Float64Array {
  return Float64Array.from(
    { length: count },
    () => Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random()),
  );
}

export function meanPower(samples: Float64Array): number {
  const mean = samples.reduce((sum, value) => sum + value, 0) / samples.length;
  return samples.reduce((sum, value) => sum + (value - mean) ** 2, 0) / samples.length;
}
