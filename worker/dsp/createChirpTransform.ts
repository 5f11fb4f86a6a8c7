import FFT from 'fft.js';

export interface ChirpTransform {
  /** Σ x[n]·exp(−2πi·k·stepTurns·n) for k = 0 … count−1, interleaved; the next call overwrites the result. */
  transform(samples: ArrayLike<number>): Float64Array;
}

/**
 * Fourier sums of real samples on a frequency grid of any step (chirp-z transform; Bluestein 1970; Rabiner, Schafer & Rader
 * 1969): two captures at different rates are put on one grid, and frequencies beyond half the rate cost nothing extra.
 * @param length most samples a call brings
 * @param count frequencies wanted
 * @param stepTurns step of the grid over the sampling rate
 */
export function createChirpTransform(length: number, count: number, stepTurns: number): ChirpTransform {
  const size = 2 ** Math.ceil(Math.log2(length + count));
  const fft = new FFT(size);
  const most = Math.max(length, count);
  const cosines = new Float64Array(most);
  const sines = new Float64Array(most);
  for (let n = 0; n < most; n++) {
    // Whole turns are taken off before the angle is formed: n² grows beyond what a cosine keeps.
    const turns = (stepTurns * n * n) / 2;
    const angle = 2 * Math.PI * (turns - Math.round(turns));
    cosines[n] = Math.cos(angle);
    sines[n] = Math.sin(angle);
  }
  const chirp = new Float64Array(2 * size);
  for (let n = 0; n < most; n++) {
    if (n < count) chirp.set([cosines[n] as number, sines[n] as number], 2 * n);
    if (n > 0 && n < length) chirp.set([cosines[n] as number, sines[n] as number], 2 * (size - n));
  }
  const kernel = new Float64Array(2 * size);
  fft.transform(kernel, chirp);
  const input = new Float64Array(2 * size);
  const spectrum = new Float64Array(2 * size);
  const output = new Float64Array(2 * size);
  const result = new Float64Array(2 * count);
  return {
    transform(samples) {
      input.fill(0);
      for (let n = 0; n < samples.length; n++) {
        input[2 * n] = (samples[n] as number) * (cosines[n] as number);
        input[2 * n + 1] = -(samples[n] as number) * (sines[n] as number);
      }
      fft.transform(spectrum, input);
      for (let k = 0; k < size; k++) {
        const [a, b] = [spectrum[2 * k] as number, spectrum[2 * k + 1] as number];
        const [c, d] = [kernel[2 * k] as number, kernel[2 * k + 1] as number];
        spectrum[2 * k] = a * c - b * d;
        spectrum[2 * k + 1] = a * d + b * c;
      }
      fft.inverseTransform(output, spectrum);
      for (let k = 0; k < count; k++) {
        const [a, b] = [output[2 * k] as number, output[2 * k + 1] as number];
        const [c, s] = [cosines[k] as number, sines[k] as number];
        result[2 * k] = a * c + b * s;
        result[2 * k + 1] = b * c - a * s;
      }
      return result;
    },
  };
}
