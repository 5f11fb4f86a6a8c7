import { highestAboveFloor } from './localFloor.js';

export interface ExtremeValueLaw {
  shuffles: number;
  location: number;
  scale: number;
}

const eulerGamma = 0.5772156649015329;
const seed = 0x9e3779b9;

/**
 * What noise alone gives: the values are dealt out to the times anew (permutation bootstrap), each time the highest peak
 * over its surroundings is kept, and the law of largest values (Gumbel 1958) is fitted by moments. Its scale is 1 for exponentially
 * distributed powers and never taken smaller. Seeded: the same values always give the same law.
 */
export function shuffledMaxima(
  values: Float64Array,
  periodogram: (values: Float64Array) => Float64Array,
  shuffles: number,
): ExtremeValueLaw {
  const random = createRandom(seed);
  const shuffled = values.slice();
  const maxima = Array.from({ length: shuffles }, () => {
    for (let n = shuffled.length - 1; n > 0; n--) {
      const other = Math.floor(random() * (n + 1));
      const kept = shuffled[n] as number;
      shuffled[n] = shuffled[other] as number;
      shuffled[other] = kept;
    }
    return highestAboveFloor(periodogram(shuffled)).ratio;
  });
  const mean = maxima.reduce((sum, value) => sum + value, 0) / shuffles;
  const variance = maxima.reduce((sum, value) => sum + (value - mean) ** 2, 0) / Math.max(1, shuffles - 1);
  const scale = Math.max(1, Math.sqrt(6 * variance) / Math.PI);
  return { shuffles, scale, location: mean - eulerGamma * scale };
}

/** Natural logarithm of the chance of a peak this high or higher anywhere. */
export function logChanceOfPeak(ratio: number, { location, scale }: ExtremeValueLaw): number {
  const excess = (ratio - location) / scale;
  return excess > 20 ? -excess : Math.log(-Math.expm1(-Math.exp(-excess)));
}

/** Xorshift (Marsaglia 2003): numbers in [0, 1). */
function createRandom(start: number): () => number {
  let state = start | 0;
  return () => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return (state >>> 0) / 2 ** 32;
  };
}
