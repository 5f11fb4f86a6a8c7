import FFT from 'fft.js';

/**
 * Inverse of `createRealFft(size).transform`: x[n] = (1/N)·Σ X[k]·exp(2πikn/N) of a real signal.
 * @param half interleaved real and imaginary parts of bins 0 … N/2
 */
export function inverseRealFft(half: Float64Array, size: number): Float64Array {
  const fft = new FFT(size);
  const full = new Float64Array(2 * size);
  full.set(half.subarray(0, size + 2));
  for (let bin = 1; bin < size / 2; bin++) {
    full[2 * (size - bin)] = half[2 * bin] as number;
    full[2 * (size - bin) + 1] = -(half[2 * bin + 1] as number);
  }
  const result = new Float64Array(2 * size);
  fft.inverseTransform(result, full);
  return Float64Array.from({ length: size }, (_, n) => result[2 * n] as number);
}
