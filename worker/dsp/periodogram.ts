import { createRealFft } from './createRealFft.js';

/**
 * One-sided periodogram without a window, mean removed, zero-padded to the transform length: density in
 * (sample unit)²/Hz at k·fs/fftLength, |X|²/(fs·N), doubled except at 0 and fs/2.
 * @throws RangeError when the samples do not fit the transform
 */
export function periodogram(samples: Float64Array, sampleRateHz: number, fftLength: number): Float64Array {
  const count = samples.length;
  if (count < 1 || count > fftLength) throw new RangeError(`${count} samples do not fit a transform of ${fftLength}.`);
  let sum = 0;
  for (const value of samples) sum += value;
  const padded = new Float64Array(fftLength);
  for (let n = 0; n < count; n++) padded[n] = (samples[n] as number) - sum / count;
  const spectrum = createRealFft(fftLength).transform(padded);
  const density = new Float64Array(fftLength / 2 + 1);
  for (let bin = 0; bin < density.length; bin++) {
    const power = (spectrum[2 * bin] as number) ** 2 + (spectrum[2 * bin + 1] as number) ** 2;
    density[bin] = ((bin === 0 || bin === fftLength / 2 ? 1 : 2) * power) / (sampleRateHz * count);
  }
  return density;
}
