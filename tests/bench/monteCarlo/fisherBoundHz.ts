import { inverse, Matrix } from 'ml-matrix';
import { type ModelTone, toneValue } from './ToneModel.js';

/**
 * Cramér-Rao bound on the standard deviation of each tone's frequency in white Gaussian noise, all tones' amplitudes, phases,
 * frequencies and decays unknown: the inverse of the Fisher matrix Σ ∂s/∂θᵢ·∂s/∂θⱼ/σ² (Kay 1993, section 3.9).
 * @returns Hz, one a tone
 */
export function fisherBoundHz(
  tones: readonly ModelTone[],
  frames: number,
  sampleRateHz: number,
  noiseDeviation: number,
): number[] {
  // In bins, so that the matrix is well conditioned.
  const binHz = sampleRateHz / frames;
  const derivatives = tones.flatMap((tone) => {
    const quadrature = { ...tone, phase: tone.phase + Math.PI / 2 };
    const all = [
      (t: number): number => 2 * Math.PI * t * binHz * toneValue(quadrature, t),
      (t: number): number => toneValue(tone, t),
      (t: number): number => toneValue(quadrature, t),
    ];
    return tone.decayS === null ? all : [...all, (t: number): number => t * binHz * toneValue(tone, t)];
  });
  const fisher = Matrix.zeros(derivatives.length, derivatives.length);
  for (let n = 0; n < frames; n++) {
    const values = derivatives.map((derivative) => derivative(n / sampleRateHz));
    values.forEach((a, i) =>
      values.forEach((b, j) => fisher.set(i, j, fisher.get(i, j) + (a * b) / noiseDeviation ** 2)),
    );
  }
  const covariance = inverse(fisher);
  let place = 0;
  return tones.map(({ decayS }) => {
    const bound = binHz * Math.sqrt(covariance.get(place, place));
    place += decayS === null ? 3 : 4;
    return bound;
  });
}
