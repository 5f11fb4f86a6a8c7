import { inner, powerOf } from './complexSums.js';

export interface BesideOwn {
  /** Amplitude of the template in what stands there, this capture's own content at the place left to itself. */
  amplitude: number;
  /** Squared partial correlation of the template, 0 … 1. */
  coherence: number;
}

/** Template and own content this alike over the frames can't be told apart. */
const largestLikeness = 0.9;

/**
 * A folded tone may land beside one that stands there in both captures: least squares of what the companion shows at the place
 * on the template and on what this capture shows at that place itself.
 * @param there, template, here interleaved complex frames of the same moments
 * @returns null where template and own content are too much alike
 */
export function besideOwn(there: Float64Array, template: Float64Array, here: Float64Array): BesideOwn | null {
  const own = powerOf(here);
  if (own === 0) return null;
  const rest = without(template, here, own);
  const restPower = powerOf(rest);
  if (restPower < (1 - largestLikeness) * powerOf(template)) return null;
  const left = without(there, here, own);
  const [real, imaginary] = inner(rest, left);
  const explained = (real * real + imaginary * imaginary) / restPower;
  return {
    amplitude: Math.hypot(real, imaginary) / restPower,
    coherence: Math.min(1, explained / Math.max(powerOf(left), 1e-300)),
  };
}

/** What is left of `values` beside their part along `direction`. */
function without(values: Float64Array, direction: Float64Array, power: number): Float64Array {
  const [real, imaginary] = inner(direction, values);
  const [c, s] = [real / power, imaginary / power];
  const result = Float64Array.from(values);
  for (let n = 0; n < values.length; n += 2) {
    const [x, y] = [direction[n] as number, direction[n + 1] as number];
    result[n] = (values[n] as number) - (x * c - y * s);
    result[n + 1] = (values[n + 1] as number) - (x * s + y * c);
  }
  return result;
}
