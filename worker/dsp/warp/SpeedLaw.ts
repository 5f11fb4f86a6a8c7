/**
 * A relative speed s(t) of mean 1 over a stretch of `length` samples, and its integral, the warped time u(t) in samples:
 * whatever turns with the speed is a steady line in warped time, at its frequency times 1/s(t).
 */
export interface SpeedLaw {
  length: number;
  /** Warped time of every sample as a share of the stretch, 0 … 1. */
  warped: Float64Array;
  /** Speed at warped share w, 0 … 1. */
  speedAt: (share: number) => number;
}

/** s(τ) = 1 + ρ·τ, τ = −1 … 1. */
export function linearLaw(rho: number, length: number): SpeedLaw {
  const warped = new Float64Array(length);
  for (let n = 0; n < length; n++) {
    const tau = (2 * n) / length - 1;
    warped[n] = 0.5 * (tau + 1) + 0.25 * rho * (tau * tau - 1);
  }
  // s² is linear in warped time: s(w)² = (1 − ρ)² + 4·ρ·w.
  return { length, warped, speedAt: (share) => Math.sqrt(Math.max(1e-9, (1 - rho) ** 2 + 4 * rho * share)) };
}

/** Speeds above this can't be mirrored about the mean. */
const largestMirrored = 1.95;

/**
 * The law with its speed mirrored about the mean: as varied as the law, and followed by nothing that follows the law. Where
 * that would turn time back, the same speeds in reversed order.
 */
export function oppositeLaw(law: SpeedLaw): SpeedLaw {
  const { length, warped } = law;
  let fastest = 0;
  for (let n = 1; n < length; n++)
    fastest = Math.max(fastest, ((warped[n] as number) - (warped[n - 1] as number)) * length);
  if (fastest < largestMirrored) return lawFromWarped(warped.map((share, n) => (2 * n) / length - share));
  return {
    length,
    warped: warped.map((_, n) => 1 - (warped[length - 1 - n] as number)),
    speedAt: (share) => law.speedAt(1 - share),
  };
}

/** Warped share at a share of the time. */
export function warpedShareAt({ warped, length }: SpeedLaw, time: number): number {
  return warped[Math.min(length - 1, Math.max(0, Math.round(time * length)))] as number;
}

/** Share of the time at which a share of the warped time is reached. */
export function timeShareAt({ warped, length }: SpeedLaw, share: number): number {
  let low = 0;
  let high = length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((warped[middle] as number) < share) low = middle + 1;
    else high = middle;
  }
  if (low === 0) return 0;
  const before = warped[low - 1] as number;
  const after = warped[low] ?? 1;
  return (low - 1 + (after > before ? (share - before) / (after - before) : 0)) / length;
}

const speedPoints = 256;

/** A law given by its warped time alone, stretched to 0 … 1 and with the speed of mean 1 read off it. */
export function lawFromWarped(raw: Float64Array): SpeedLaw {
  const { length } = raw;
  const first = raw[0] as number;
  const span = ((raw[length - 1] as number) - first) * (length / (length - 1));
  const warped = raw.map((value) => (value - first) / span);
  const law = { length, warped, speedAt: () => 1 };
  const speeds = Float64Array.from({ length: speedPoints }, (_, i) => {
    const from = timeShareAt(law, i / speedPoints);
    const to = timeShareAt(law, (i + 1) / speedPoints);
    return 1 / Math.max(to - from, 1e-9) / speedPoints;
  });
  return {
    ...law,
    speedAt: (share) => {
      const exact = Math.min(speedPoints - 1, Math.max(0, share * speedPoints - 0.5));
      const low = Math.floor(exact);
      const from = speeds[low] as number;
      return from + (exact - low) * ((speeds[Math.min(speedPoints - 1, low + 1)] as number) - from);
    },
  };
}
