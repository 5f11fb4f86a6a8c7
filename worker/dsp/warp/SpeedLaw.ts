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

/** The same speeds in reversed order: as varied as the law, and followed by nothing that follows the law. */
export function reversedLaw(law: SpeedLaw): SpeedLaw {
  const { length, warped } = law;
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
  return low / length;
}
