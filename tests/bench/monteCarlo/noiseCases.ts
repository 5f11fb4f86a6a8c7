import { gaussian } from '../synthetic/drawing.js';
import { firDecimator } from '../synthetic/filterGains.js';
import { overSampling, sampleFast } from '../synthetic/sampleFast.js';

export interface NoiseCase {
  name: string;
  draw: (random: () => number) => Float64Array;
}

export const noiseFrames = 16_384;
export const noiseRateHz = 2048;

const filter = firDecimator(0.3 * noiseRateHz, 0.49 * noiseRateHz, noiseRateHz);
const filtered = (fast: Float64Array): Float64Array => sampleFast(fast, noiseRateHz, filter).rightful;
const floor = (random: () => number): Float64Array => gaussian(random, noiseFrames).map((value) => 1e-3 * value);
const sum = (a: Float64Array, b: Float64Array): Float64Array => a.map((value, n) => value + (b[n] as number));

/** Clean stationary noise: nothing was folded, whatever a method says. */
export const noiseCases: readonly NoiseCase[] = [
  { name: 'Gaussian, white to fs/2', draw: (random) => gaussian(random, noiseFrames) },
  {
    name: 'Gaussian, filtered',
    draw: (random) => sum(filtered(gaussian(random, noiseFrames * overSampling)), floor(random)),
  },
  {
    name: 'skewed, filtered',
    draw: (random) => {
      let state = 0;
      const keep = 0.7;
      const skewed = gaussian(random, noiseFrames * overSampling).map((value) => {
        state = keep * state + Math.sqrt(1 - keep * keep) * value;
        return state * state;
      });
      return sum(filtered(skewed), floor(random));
    },
  },
];
