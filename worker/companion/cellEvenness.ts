import { powerOf } from './complexSums.js';

/**
 * Share of the cells that speak for themselves: `variance` for what chance explains on average, `tail` for how surely.
 * Where strong cells of the input meet strong cells of the residual, few products carry the sum; lines, finally, repeat from
 * segment to segment and speak once (Bartlett 1935: (1 − ρ₁ρ₂)/(1 + ρ₁ρ₂)).
 */
export function cellEvenness(
  input: Float64Array,
  residual: Float64Array,
  width: number,
  segments: number,
): { variance: number; tail: number } {
  let [sum, squares] = [0, 0];
  for (let n = 0; n < input.length; n += 2) {
    const product =
      ((input[n] as number) ** 2 + (input[n + 1] as number) ** 2) *
      ((residual[n] as number) ** 2 + (residual[n + 1] as number) ** 2);
    sum += product;
    squares += product * product;
  }
  if (sum === 0) return { variance: 0, tail: 0 };
  const cells = width * segments;
  const even = Math.min(1, (powerOf(input) * powerOf(residual)) / (cells * sum));
  // Independent Gaussian cells have Σp²/(Σp)² = 4 over their number.
  const spread = Math.min(1, (4 * sum * sum) / (cells * squares));
  const repeats = repetition(input, width, segments) * repetition(residual, width, segments);
  const variance = (even * (1 - repeats)) / (1 + repeats);
  return { variance, tail: variance * spread };
}

/** Segments two apart share no samples: 0 … 1, how far one foretells the other, each bin with a phase step of its own. */
function repetition(values: Float64Array, width: number, segments: number): number {
  const power = powerOf(values);
  if (power === 0) return 0;
  let sum = 0;
  for (let b = 0; b < width; b++) {
    let [real, imaginary] = [0, 0];
    for (let k = 0; k + 2 < segments; k++) {
      const at = 2 * (k * width + b);
      const later = at + 4 * width;
      const [x, y, u, v] = [values[at], values[at + 1], values[later], values[later + 1]] as [
        number,
        number,
        number,
        number,
      ];
      real += x * u + y * v;
      imaginary += x * v - y * u;
    }
    sum += Math.hypot(real, imaginary);
  }
  return Math.min(1, sum / power);
}
