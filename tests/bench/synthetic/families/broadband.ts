import { between, gaussian, pick } from '../drawing.js';
import { type FilterGain, strongFilter, weakFilter } from '../filterGains.js';
import type { MadeTone, MakeFamily } from '../MadeCapture.js';
import { foldedDensity, overSampling, sampleFast } from '../sampleFast.js';

const frames = 16_384;
const rates = [1600, 6400, 12_800, 20_000] as const;

function drawFilter(random: () => number, isBad: boolean, sampleRateHz: number): FilterGain {
  return isBad ? weakFilter(random, sampleRateHz) : strongFilter(random, sampleRateHz);
}

/** Gaussian noise, white or falling with frequency, behind filters of many kinds. */
export const makeFilteredNoise: MakeFamily = (random, isBad, index) => {
  const sampleRateHz = pick(random, rates);
  const filter = drawFilter(random, isBad, sampleRateHz);
  const cornerHz = sampleRateHz / 20;
  const shape = index % 4 > 1 ? (hz: number): number => 1 / Math.hypot(1, hz / cornerHz) : (): number => 1;
  const noise = gaussian(random, frames * overSampling);
  return [
    {
      family: 'filtered_noise',
      filter: filter.name,
      sampleRateHz,
      ...sampleFast(noise, sampleRateHz, filter, shape),
      tones: [],
      signalToNoiseDb: null,
      edge: 'ofSignal',
      density: foldedDensity(sampleRateHz, filter, shape),
    },
  ];
};

/** Skewed noise: a squared or an exponential of smooth noise, its sharp tops reaching far up. */
export const makeSkewedNoise: MakeFamily = (random, isBad, index) => {
  const sampleRateHz = pick(random, rates);
  const filter = drawFilter(random, isBad, sampleRateHz);
  const keep = Math.exp((-2 * Math.PI * between(random, 0.3, 1)) / overSampling);
  let state = 0;
  const noise = gaussian(random, frames * overSampling).map((value) => {
    state = keep * state + Math.sqrt(1 - keep * keep) * value;
    return index % 4 > 1 ? Math.exp(0.8 * state) : state * state;
  });
  return [
    {
      family: 'skewed_noise',
      filter: filter.name,
      sampleRateHz,
      ...sampleFast(noise, sampleRateHz, filter),
      tones: [],
      edge: 'ofSignal',
    },
  ];
};

/** Blows at random times, each ringing in three resonances, one of them beyond fs/2. */
export const makeImpacts: MakeFamily = (random, isBad) => {
  const sampleRateHz = pick(random, rates);
  const fastHz = overSampling * sampleRateHz;
  const filter = drawFilter(random, isBad, sampleRateHz);
  const half = sampleRateHz / 2;
  const resonances = [between(random, 0.1, 0.3), between(random, 0.4, 0.8), between(random, 1.1, 1.9)].map((place) => ({
    hz: place * half,
    decayS: between(random, 40, 150) / sampleRateHz,
    amplitude: between(random, 0.3, 1),
  }));
  const signal = new Float64Array(frames * overSampling);
  for (let start = 0; start < signal.length; start += Math.ceil(-Math.log(1 - random()) * signal.length * 0.08)) {
    const blow = between(random, 0.3, 1);
    for (const { hz, decayS, amplitude } of resonances) {
      const length = Math.min(signal.length - start, Math.ceil(12 * decayS * fastHz));
      for (let n = 0; n < length; n++) {
        const value = blow * amplitude * Math.exp(-n / fastHz / decayS) * Math.sin((2 * Math.PI * hz * n) / fastHz);
        signal[start + n] = (signal[start + n] as number) + value;
      }
    }
  }
  const beyondHz = (resonances[2]?.hz ?? 0) as number;
  const tones: MadeTone[] = isBad ? [{ trueHz: beyondHz, foldedHz: sampleRateHz - beyondHz, levelDb: -20 }] : [];
  return [
    {
      family: 'impacts',
      filter: filter.name,
      sampleRateHz,
      ...sampleFast(signal, sampleRateHz, filter),
      tones,
      edge: 'ofSignal',
    },
  ];
};

/** Bursts of noise over a quiet ground: the level at the edge rises with the signal where it is folded. */
export const makeBursts: MakeFamily = (random, isBad) => {
  const sampleRateHz = pick(random, rates);
  const filter = drawFilter(random, isBad, sampleRateHz);
  const period = Math.floor(frames * overSampling * between(random, 0.1, 0.3));
  const decay = period * between(random, 0.1, 0.3);
  const noise = gaussian(random, frames * overSampling).map((value, n) => value * Math.exp(-(n % period) / decay));
  return [
    {
      family: 'bursts',
      filter: filter.name,
      sampleRateHz,
      ...sampleFast(noise, sampleRateHz, filter),
      tones: [],
      edge: 'ofSignal',
    },
  ];
};
