import { seededRandom } from '../../worker/dsp/seededRandom.js';

/** Gaussian noise of unit variance, the same for the same seed (Box & Muller 1958). */
export function seededNoise(count: number, seed = 1): Float64Array {
  const random = seededRandom(seed);
  return Float64Array.from(
    { length: count },
    () => Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random()),
  );
}

/** Windowed-sinc low-pass (129 taps, four-term Blackman-Harris); `corner` as a share of the sampling rate. */
export function lowPass(samples: Float64Array, corner: number): Float64Array {
  const taps = Array.from({ length: 129 }, (_, index) => {
    const place = index - 64;
    const sinc = place === 0 ? 2 * corner : Math.sin(2 * Math.PI * corner * place) / (Math.PI * place);
    const angle = (2 * Math.PI * index) / 128;
    return sinc * (0.35875 - 0.48829 * Math.cos(angle) + 0.14128 * Math.cos(2 * angle) - 0.01168 * Math.cos(3 * angle));
  });
  return samples.map((_, n) => taps.reduce((sum, tap, index) => sum + tap * (samples[n - index] ?? 0), 0));
}
