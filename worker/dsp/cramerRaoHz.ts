/**
 * Cramér-Rao bound on the standard deviation of a real tone's frequency in white noise, unknown amplitude and phase:
 * var(f) ≥ 12·fs² / (4π²·η·N·(N²−1)), η = A²/(2σ²) (Rife & Boorstyn 1974; Kay 1993). Exact from some 20 bins off 0 and fs/2.
 * @param powerOverDensityHz tone power over the one-sided noise density at the tone; σ² = density·fs/2
 */
export function cramerRaoHz(powerOverDensityHz: number, samples: number, sampleRateHz: number): number {
  const signalToNoise = powerOverDensityHz / (sampleRateHz / 2);
  return Math.sqrt(
    (12 * sampleRateHz * sampleRateHz) / (4 * Math.PI * Math.PI * signalToNoise * samples * (samples * samples - 1)),
  );
}
