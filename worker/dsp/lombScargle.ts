import { createRealFft } from './createRealFft.js';
import { createNonUniformTransform, transformSize } from './nonUniformTransform.js';

export interface LombScargleResult {
  /** Frequencies are k·stepHz, k = 1 … power.length; entry 0 belongs to stepHz. */
  stepHz: number;
  /** Share of the variance that a sinusoid plus a constant explains, 0 … 1. */
  power: Float64Array;
}

/**
 * Prepares the generalised Lomb-Scargle periodogram with a floating mean and equal weights, standard normalisation
 * (Lomb 1976; Scargle 1982; Zechmeister & Kürster 2009, eqs. 4–5), at frequencies stepHz, 2·stepHz, … What depends on the
 * times alone is worked out once.
 * @param timesS in any order, any spacing; @param count number of frequencies
 * @returns values -> share of the variance that a sinusoid plus a constant explains, 0 … 1, per frequency
 * @throws RangeError with fewer than four samples or unequal lengths
 */
export function createLombScargle(
  timesS: Float64Array,
  stepHz: number,
  count: number,
): (values: Float64Array) => Float64Array {
  const samples = timesS.length;
  if (samples < 4) throw new RangeError('At least four samples with a time each are needed.');
  const angles = timesS.map((time) => 2 * Math.PI * stepHz * (time - (timesS[0] as number)));
  const fft = createRealFft(transformSize(count + 1));
  const transform = createNonUniformTransform(angles, count + 1, fft);
  const weights = new Float64Array(samples).fill(1 / samples);
  const window = transform(weights);
  // At doubled angles the same transform gives the window at twice the frequencies.
  const doubled = angles.map((angle) => 2 * angle);
  const windowAtDouble = createNonUniformTransform(doubled, count + 1, fft)(weights);
  // Inverse of the 2×2 covariance of cosine and sine, per frequency; zeros where the times can't tell them apart.
  const inverse = new Float64Array(3 * count);
  for (let k = 1; k <= count; k++) {
    const c = window[2 * k] as number;
    const s = -(window[2 * k + 1] as number);
    const c2 = windowAtDouble[2 * k] as number;
    const s2 = -(windowAtDouble[2 * k + 1] as number);
    const cc = (1 + c2) / 2 - c * c;
    const ss = (1 - c2) / 2 - s * s;
    const cs = s2 / 2 - c * s;
    const determinant = cc * ss - cs * cs;
    if (!(determinant > 1e-12)) continue;
    inverse[3 * k - 3] = ss / determinant;
    inverse[3 * k - 2] = cc / determinant;
    inverse[3 * k - 1] = cs / determinant;
  }
  return (values) => {
    if (values.length !== samples) throw new RangeError('There must be as many values as times.');
    const mean = values.reduce((sum, value) => sum + value, 0) / samples;
    const centred = values.map((value) => value - mean);
    const variance = centred.reduce((sum, value) => sum + value * value, 0) / samples;
    const power = new Float64Array(count);
    if (!(variance > 0)) return power;
    const signal = transform(centred);
    const scale = 1 / (variance * samples * samples);
    for (let k = 0; k < count; k++) {
      const yc = signal[2 * k + 2] as number;
      const ys = -(signal[2 * k + 3] as number);
      const share =
        (inverse[3 * k] as number) * yc * yc +
        (inverse[3 * k + 1] as number) * ys * ys -
        2 * (inverse[3 * k + 2] as number) * yc * ys;
      power[k] = Math.min(1, Math.max(0, share * scale));
    }
    return power;
  };
}

/** The same for one set of values. @throws RangeError with fewer than four samples or unequal lengths */
export function lombScargle(
  timesS: Float64Array,
  values: Float64Array,
  stepHz: number,
  count: number,
): LombScargleResult {
  if (values.length !== timesS.length) throw new RangeError('At least four samples with a time each are needed.');
  return { stepHz, power: createLombScargle(timesS, stepHz, count)(values) };
}
