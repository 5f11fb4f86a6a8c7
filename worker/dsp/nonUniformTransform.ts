import { createRealFft, type RealFft } from './createRealFft.js';

/** Grid points over which a sample is spread: relative error about 1e-11 at twofold oversampling. */
const taps = 12;
const half = taps / 2;
const tablePerTap = 512;

/**
 * Prepares F[k] = Σ_j v[j]·exp(−i·k·φ[j]), k = 0 … count−1, for samples at any angles φ (radians): each sample is spread
 * over a grid oversampled at least twofold by a Kaiser-Bessel kernel, transformed, and the kernel's transform divided out
 * (Dutt & Rokhlin 1993; Fessler & Sutton 2003). The kernel's weights are kept, so that many sets of values at the same
 * angles cost little: samples·12 + count·log(count) each, against samples·count for the direct sum.
 * @param shared a transform of transformSize(count) points to be used, so that several of one size cost one table
 * @returns values -> interleaved real and imaginary parts, in a buffer of its own
 */
export function createNonUniformTransform(
  angles: ArrayLike<number>,
  count: number,
  shared?: RealFft,
): (values: ArrayLike<number>) => Float64Array {
  const fft = shared ?? createRealFft(transformSize(count));
  const size = fft.size;
  const beta = Math.PI * taps * (1 - count / size);
  const { places, weights } = spread(angles, size, beta);
  const gains = inverseKernel(count, size, beta);
  const grid = new Float64Array(size);
  return (values) => {
    grid.fill(0);
    for (let j = 0, w = 0; j < places.length; j++) {
      const value = values[j] as number;
      let place = places[j] as number;
      for (let l = 0; l < taps; l++, w++) {
        grid[place] = (grid[place] as number) + value * (weights[w] as number);
        place = (place + 1) & (size - 1);
      }
    }
    const spectrum = fft.transform(grid);
    const result = new Float64Array(2 * count);
    for (let k = 0; k < count; k++) {
      result[2 * k] = (spectrum[2 * k] as number) * (gains[k] as number);
      result[2 * k + 1] = (spectrum[2 * k + 1] as number) * (gains[k] as number);
    }
    return result;
  };
}

/** Grid points behind a transform of this many frequencies. */
export function transformSize(count: number): number {
  return 2 ** Math.ceil(Math.log2(Math.max(4 * count, 4 * taps)));
}

/** The same for one set of values. */
export function nonUniformTransform(angles: ArrayLike<number>, values: ArrayLike<number>, count: number): Float64Array {
  return createNonUniformTransform(angles, count)(values);
}

function spread(angles: ArrayLike<number>, size: number, beta: number): { places: Int32Array; weights: Float64Array } {
  const places = new Int32Array(angles.length);
  const weights = new Float64Array(taps * angles.length);
  const table = kernelTable(beta);
  for (let j = 0; j < angles.length; j++) {
    const turns = (angles[j] as number) / (2 * Math.PI);
    const at = (turns - Math.floor(turns)) * size;
    const first = Math.floor(at) - half + 1;
    places[j] = (first + size) & (size - 1);
    for (let l = 0; l < taps; l++) weights[taps * j + l] = lookUp(table, Math.abs(first + l - at));
  }
  return { places, weights };
}

/** I0(β·sqrt(1 − (x/half)²)) at x = 0, 1/512 … half, one point before and two behind for the interpolation. */
function kernelTable(beta: number): Float64Array {
  return Float64Array.from({ length: half * tablePerTap + 4 }, (_, index) => {
    const share = (index - 1) / (half * tablePerTap);
    return besselI0OfSquare(beta * beta * (1 - share * share)) / besselI0OfSquare(beta * beta);
  });
}

/** Cubic through the four nearest entries. */
function lookUp(table: Float64Array, distance: number): number {
  const at = Math.min(distance, half) * tablePerTap;
  const index = Math.floor(at);
  const u = at - index;
  const before = table[index] as number;
  const low = table[index + 1] as number;
  const high = table[index + 2] as number;
  const behind = table[index + 3] as number;
  return (
    (u + 1) * (u - 2) * ((u - 1) * low - u * high) * 0.5 + (u * (u - 1) * ((u + 1) * behind - (u - 2) * before)) / 6
  );
}

/** The power series of I0 in x²/4, also for x² just below 0 behind the kernel's end. */
function besselI0OfSquare(square: number): number {
  let [term, sum] = [1, 1];
  for (let k = 1; k < 200 && Math.abs(term) > 1e-17 * sum; k++) {
    term *= square / (4 * k * k);
    sum += term;
  }
  return sum;
}

/** Transform of the kernel, 2·sinh(sqrt(β² − ξ²))/sqrt(β² − ξ²) up to scale, inverted. */
function inverseKernel(count: number, size: number, beta: number): Float64Array {
  const peak = besselI0OfSquare(beta * beta);
  return Float64Array.from({ length: count }, (_, k) => {
    const xi = (2 * Math.PI * k * half) / size;
    const root = Math.sqrt(beta * beta - xi * xi);
    return (peak * root) / (2 * half * Math.sinh(root));
  });
}
