import { magnitudeSquared } from '../../../shared/screening/filterModels.js';
import { between, pick } from './drawing.js';

export interface FilterGain {
  name: string;
  /** Magnitude at a frequency in Hz. */
  gain: (frequencyHz: number) => number;
}

export const noFilter: FilterGain = { name: 'none', gain: () => 1 };

/** A filter that protects: steep and cornered well below fs/2. */
export function strongFilter(random: () => number, sampleRateHz: number): FilterGain {
  const half = sampleRateHz / 2;
  return pick(random, [
    () => elliptic(7, half * between(random, 0.45, 0.7), 90, sampleRateHz),
    () => firDecimator(half * between(random, 0.6, 0.85), half * 0.99, sampleRateHz),
    () => butterworth(10, half * between(random, 0.3, 0.42)),
    () => bessel(8, half * between(random, 0.08, 0.12)),
  ])();
}

/** A filter that does not: low order, or cornered too high. */
export function weakFilter(random: () => number, sampleRateHz: number): FilterGain {
  const half = sampleRateHz / 2;
  return pick(random, [
    () => butterworth(1, half * between(random, 0.3, 0.9)),
    () => butterworth(3, half * between(random, 0.7, 1)),
    () => bessel(4, half * between(random, 0.5, 0.9)),
    () => elliptic(5, half * between(random, 1.1, 1.5), 60, sampleRateHz),
    () => noFilter,
  ])();
}

export function butterworth(order: number, cornerHz: number): FilterGain {
  return {
    name: `butterworth ${order}, ${cornerHz.toFixed(0)} Hz`,
    gain: (hz) => 1 / Math.sqrt(1 + (hz / cornerHz) ** (2 * order)),
  };
}

/** Ripple 0.2 dB; from a table, because the rational function is slow to evaluate. */
export function elliptic(order: number, cornerHz: number, stopbandDb: number, sampleRateHz: number): FilterGain {
  const filter = { type: 'elliptic', order, cornerHz, stopbandDb, rippleDb: 0.2 } as const;
  return {
    name: `elliptic ${order}, ${cornerHz.toFixed(0)} Hz`,
    gain: tabulated((hz) => Math.sqrt(magnitudeSquared(filter, hz) ?? 1), sampleRateHz),
  };
}

/** |H| of a Bessel low-pass, −3 dB at the corner: reverse Bessel polynomial θ_N(s), H = θ_N(0)/θ_N(s) (Thomson 1949). */
export function bessel(order: number, cornerHz: number): FilterGain {
  let coefficient = 1;
  const coefficients = Array.from({ length: order + 1 }, () => 0);
  // a_k = (2N−k)! / (2^(N−k) k! (N−k)!), from a_N = 1 downwards.
  for (let k = order; k >= 0; k--) {
    coefficients[k] = coefficient;
    coefficient *= ((2 * order - k + 1) * k) / (2 * (order - k + 1));
  }
  const magnitude = (w: number): number => {
    let [re, im] = [0, 0];
    coefficients.forEach((a, k) => {
      const value = a * w ** k * (k % 4 < 2 ? 1 : -1);
      if (k % 2 === 0) re += value;
      else im += value;
    });
    return (coefficients[0] as number) / Math.hypot(re, im);
  };
  let [low, high] = [0, 10 * order];
  for (let n = 0; n < 60; n++) {
    if (magnitude((low + high) / 2) > Math.SQRT1_2) low = (low + high) / 2;
    else high = (low + high) / 2;
  }
  return { name: `bessel ${order}, ${cornerHz.toFixed(0)} Hz`, gain: (hz) => magnitude((low * hz) / cornerHz) };
}

/** |H| of a windowed-sinc low-pass run at eight times the rate, as in a converter's decimator (four-term Blackman-Harris). */
export function firDecimator(passHz: number, stopHz: number, sampleRateHz: number): FilterGain {
  const fastHz = 8 * sampleRateHz;
  // The main lobe of this window is 8 bins wide: that sets the length for the transition asked for.
  const half = Math.ceil((4 * fastHz) / (stopHz - passHz));
  const corner = (passHz + stopHz) / 2 / fastHz;
  const taps = Float64Array.from({ length: half + 1 }, (_, n) => {
    const angle = (Math.PI * (n + half)) / half;
    const window = 0.35875 - 0.48829 * Math.cos(angle) + 0.14128 * Math.cos(2 * angle) - 0.01168 * Math.cos(3 * angle);
    return window * (n === 0 ? 2 * corner : Math.sin(2 * Math.PI * corner * n) / (Math.PI * n));
  });
  const response = (hz: number): number => {
    let sum = taps[0] as number;
    for (let n = 1; n <= half; n++) sum += 2 * (taps[n] as number) * Math.cos((2 * Math.PI * hz * n) / fastHz);
    return Math.abs(sum);
  };
  return {
    name: `FIR, ${passHz.toFixed(0)} to ${stopHz.toFixed(0)} Hz`,
    gain: tabulated(response, sampleRateHz),
  };
}

const tablePlaces = 4096;

/** The gain at equal steps up to the highest frequency that is made, straight lines between them: fs/1024 apart. */
function tabulated(gain: (hz: number) => number, sampleRateHz: number): (hz: number) => number {
  const topHz = 4 * sampleRateHz;
  const table = Float64Array.from({ length: tablePlaces + 2 }, (_, place) => gain((place * topHz) / tablePlaces));
  return (hz) => {
    const place = Math.min(tablePlaces, (tablePlaces * hz) / topHz);
    const low = Math.floor(place);
    return (table[low] as number) * (low + 1 - place) + (table[low + 1] as number) * (place - low);
  };
}
