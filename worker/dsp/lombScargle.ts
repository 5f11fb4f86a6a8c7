import { nonUniformTransform } from './nonUniformTransform.js';

export interface LombScargleResult {
  /** Frequencies are k·stepHz, k = 1 … power.length; entry 0 belongs to stepHz. */
  stepHz: number;
  /** Share of the variance that a sinusoid plus a constant explains, 0 … 1. */
  power: Float64Array;
}

/**
 * Generalised Lomb-Scargle periodogram with a floating mean and equal weights, standard normalisation
 * (Lomb 1976; Scargle 1982; Zechmeister & Kürster 2009, eqs. 4–5).
 * @param timesS in any order, any spacing; @param count number of frequencies stepHz, 2·stepHz, …
 * @throws RangeError with fewer than four samples or unequal lengths
 */
export function lombScargle(
  timesS: Float64Array,
  values: Float64Array,
  stepHz: number,
  count: number,
): LombScargleResult {
  const samples = timesS.length;
  if (samples < 4 || values.length !== samples)
    throw new RangeError('At least four samples with a time each are needed.');
  const mean = values.reduce((sum, value) => sum + value, 0) / samples;
  const centred = values.map((value) => value - mean);
  const angles = timesS.map((time) => 2 * Math.PI * stepHz * (time - (timesS[0] as number)));
  const weights = new Float64Array(samples).fill(1 / samples);
  const signal = nonUniformTransform(angles, centred, count + 1);
  const window = nonUniformTransform(angles, weights, 2 * count + 1);
  const variance = centred.reduce((sum, value) => sum + value * value, 0) / samples;
  const power = new Float64Array(count);
  if (!(variance > 0)) return { stepHz, power };
  for (let k = 1; k <= count; k++) {
    const yc = (signal[2 * k] as number) / samples;
    const ys = -(signal[2 * k + 1] as number) / samples;
    const c = window[2 * k] as number;
    const s = -(window[2 * k + 1] as number);
    const c2 = window[4 * k] as number;
    const s2 = -(window[4 * k + 1] as number);
    const cc = (1 + c2) / 2 - c * c;
    const ss = (1 - c2) / 2 - s * s;
    const cs = s2 / 2 - c * s;
    const determinant = cc * ss - cs * cs;
    power[k - 1] =
      determinant > 1e-12
        ? Math.min(1, Math.max(0, (ss * yc * yc + cc * ys * ys - 2 * cs * yc * ys) / (determinant * variance)))
        : 0;
  }
  return { stepHz, power };
}
