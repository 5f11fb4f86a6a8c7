import type { SeededRandom } from './SeededRandom.js';

export function sum(...parts: Float64Array[]): Float64Array {
  return (parts[0] ?? new Float64Array()).map((_, n) => parts.reduce((total, part) => total + (part[n] ?? 0), 0));
}

export const scaled = (samples: Float64Array, factor: number): Float64Array => samples.map((value) => value * factor);

/** Keeps every n-th sample and filters nothing: what a careless reduction of the rate does. */
export const dropSamples = (samples: Float64Array, step: number): Float64Array =>
  samples.filter((_, n) => n % step === 0);

/** Drives the input over its range. */
export const overdriven = (samples: Float64Array, factor: number): Float64Array =>
  samples.map((value) => Math.max(-1, Math.min(1, value * factor)));

/** Stretches in which the link was lost and the recorder wrote zeros. */
export function withDropouts(samples: Float64Array, count: number, frames: number, random: SeededRandom): Float64Array {
  const damaged = samples.slice();
  for (let n = 0; n < count; n += 1) {
    const from = Math.floor(random.between(0.05, 0.9) * samples.length);
    damaged.fill(0, from, from + frames);
  }
  return damaged;
}
