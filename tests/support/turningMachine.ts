import { seededNoise } from './seededNoise.js';

export interface TurningLine {
  /** Cycles a sample at τ = −1 … 1 over the capture; may lie beyond 0.5. */
  frequency: (tau: number) => number;
  amplitude?: (tau: number) => number;
}

/** Lines sampled without any filter, with white noise: what lies beyond half the rate folds by itself. */
export function turningLines(length: number, lines: TurningLine[], snrDb: number, seed = 1): Float64Array {
  const samples = new Float64Array(length);
  lines.forEach(({ frequency, amplitude }, index) => {
    let turns = 0.37 * index * index + 0.11 * seed;
    for (let n = 0; n < length; n++) {
      const tau = (2 * n) / length - 1;
      turns += frequency(tau);
      samples[n] = (samples[n] as number) + (amplitude?.(tau) ?? 1) * Math.cos(2 * Math.PI * turns);
    }
  });
  const power = samples.reduce((sum, value) => sum + value * value, 0) / length;
  const noise = seededNoise(length, seed);
  return samples.map((value, n) => value + Math.sqrt(power * 10 ** (-snrDb / 10)) * (noise[n] as number));
}

/** Orders 1 … count of a shaft, weaker towards the high ones, every seventh strong; silent where beyond `limit`. */
export function shaftOrders(
  fundamental: number,
  speed: (tau: number) => number,
  count: number,
  limit = Infinity,
): TurningLine[] {
  return Array.from({ length: count }, (_, index) => {
    const order = index + 1;
    const strength = order ** -0.7 * (order % 7 === 0 ? 3 : 1);
    return {
      frequency: (tau) => order * fundamental * speed(tau),
      amplitude: (tau) => (order * fundamental * speed(tau) < limit ? strength : 0),
    };
  });
}
