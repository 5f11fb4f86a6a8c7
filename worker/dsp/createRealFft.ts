import FFT from 'fft.js';

export interface RealFft {
  readonly size: number;
  /**
   * Discrete Fourier transform of `size` real samples, X[k] = Σ x[n]·exp(−2πikn/N), without scaling. Returns interleaved
   * real and imaginary parts of bins 0 … N/2 in the first N+2 places of a buffer that the next call overwrites.
   */
  transform(samples: ArrayLike<number>): Float64Array;
}

/**
 * A transform of one size with buffers of its own, so that several sizes can be used side by side.
 * @throws RangeError unless the size is a power of two and at least 4
 */
export function createRealFft(size: number): RealFft {
  if (!Number.isInteger(size) || size < 4 || (size & (size - 1)) !== 0) {
    throw new RangeError(`The transform length must be a power of two and at least 4, got ${size}.`);
  }
  const fft = new FFT(size);
  const spectrum = new Float64Array(2 * size);
  return {
    size,
    transform(samples) {
      fft.realTransform(spectrum, samples);
      return spectrum;
    },
  };
}
