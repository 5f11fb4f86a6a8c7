import FFT from 'fft.js';
import type { FilterGain } from './filterGains.js';

/** How much faster than the capture the original is made. */
export const overSampling = 8;

/**
 * Filters an original made at eight times the rate and picks every eighth sample: what lay below fs/2 and what was folded,
 * apart. The filter acts on the spectrum of the whole (circular), without phase.
 * @param original 8·n samples, a power of two
 * @param shape further weight on the magnitude, such as a source's own colour
 */
export function sampleFast(
  original: Float64Array,
  sampleRateHz: number,
  { gain }: FilterGain,
  shape: (frequencyHz: number) => number = () => 1,
): { rightful: Float64Array; folded: Float64Array } {
  const size = original.length;
  const fft = new FFT(size);
  const spectrum = fft.createComplexArray() as number[];
  fft.realTransform(spectrum, original);
  const below = fft.createComplexArray() as number[];
  const beyond = fft.createComplexArray() as number[];
  for (let bin = 1; bin < size / 2; bin++) {
    const hz = (bin * overSampling * sampleRateHz) / size;
    const weight = gain(hz) * shape(hz);
    const target = hz < sampleRateHz / 2 ? below : beyond;
    const [re, im] = [weight * (spectrum[2 * bin] as number), weight * (spectrum[2 * bin + 1] as number)];
    target[2 * bin] = re;
    target[2 * bin + 1] = im;
    target[2 * (size - bin)] = re;
    target[2 * (size - bin) + 1] = -im;
  }
  const back = (part: number[]): Float64Array => {
    const samples = fft.createComplexArray() as number[];
    fft.inverseTransform(samples, part);
    return Float64Array.from({ length: size / overSampling }, (_, n) => samples[2 * overSampling * n] as number);
  };
  return { rightful: back(below), folded: back(beyond) };
}

/** One-sided density at the slow rate of white noise of unit density at the fast one: all zones that land on f. */
export function foldedDensity(
  sampleRateHz: number,
  { gain }: FilterGain,
  shape: (frequencyHz: number) => number = () => 1,
): (frequencyHz: number) => number {
  const power = (hz: number): number => (hz < (overSampling / 2) * sampleRateHz ? (gain(hz) * shape(hz)) ** 2 : 0);
  return (hz) => {
    let sum = power(hz);
    for (let k = 1; k <= overSampling / 2; k++) sum += power(k * sampleRateHz - hz) + power(k * sampleRateHz + hz);
    return sum;
  };
}
