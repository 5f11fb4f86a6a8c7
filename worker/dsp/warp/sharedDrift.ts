import { envelopePoints, lineEnvelope } from './lineEnvelope.js';
import type { WarpedLine } from './warpedLines.js';

export interface SharedDrift {
  /** Relative speed error between neighbouring envelope points, 0 on the mean. */
  rates: Float64Array;
  /** Certainty of each. */
  weights: Float64Array;
}

const rounds = 3;

/**
 * The time shift that lines in warped time have in common: each line's phase from one envelope point to the next, over its
 * frequency, weighted by power and frequency squared, so that the higher lines, whose phase tells time more finely, count
 * most (phase-gradient autofocus, Wahl et al. 1994, over many lines at once). A line's own frequency error is let go.
 */
export function sharedDrift(spectrum: Float64Array, lines: WarpedLine[], reach: number): SharedDrift {
  const steps = envelopePoints - 1;
  const products = lines.map((line) => stepProducts(lineEnvelope(spectrum, line.bin, reach)));
  const rates = new Float64Array(steps);
  const weights = new Float64Array(steps);
  for (let round = 0; round < rounds; round++) {
    const sums = new Float64Array(steps);
    weights.fill(0);
    lines.forEach((line, l) => {
      const product = products[l] as Float64Array;
      const turn = (2 * Math.PI * line.bin) / envelopePoints;
      let [re, im] = [0, 0];
      for (let j = 0; j < steps; j++) {
        const angle = turn * (rates[j] as number);
        const [x, y] = [product[2 * j] as number, product[2 * j + 1] as number];
        re += x * Math.cos(angle) + y * Math.sin(angle);
        im += y * Math.cos(angle) - x * Math.sin(angle);
      }
      const own = Math.atan2(im, re);
      for (let j = 0; j < steps; j++) {
        const [x, y] = [product[2 * j] as number, product[2 * j + 1] as number];
        const expected = own + turn * (rates[j] as number);
        const rest = Math.atan2(
          y * Math.cos(expected) - x * Math.sin(expected),
          x * Math.cos(expected) + y * Math.sin(expected),
        );
        const weight = (Math.hypot(x, y) / line.floor) * turn * turn;
        sums[j] = (sums[j] as number) + weight * ((rates[j] as number) + rest / turn);
        weights[j] = (weights[j] as number) + weight;
      }
    });
    for (let j = 0; j < steps; j++)
      rates[j] = (weights[j] as number) > 0 ? (sums[j] as number) / (weights[j] as number) : 0;
    const total = weights.reduce((sum, weight) => sum + weight, 0);
    const mean = rates.reduce((sum, rate, j) => sum + rate * (weights[j] as number), 0) / Math.max(total, 1e-300);
    for (let j = 0; j < steps; j++) rates[j] = (rates[j] as number) - mean;
  }
  return { rates, weights };
}

/** z[j+1]·conj(z[j]), interleaved. */
function stepProducts(z: Float64Array): Float64Array {
  const result = new Float64Array(z.length - 2);
  for (let j = 0; 2 * j < result.length; j++) {
    const [a, b] = [z[2 * j] as number, z[2 * j + 1] as number];
    const [c, d] = [z[2 * j + 2] as number, z[2 * j + 3] as number];
    result[2 * j] = c * a + d * b;
    result[2 * j + 1] = d * a - c * b;
  }
  return result;
}
