import { createRealFft } from './createRealFft.js';

/** Grid points on each side over which a sample is spread: relative error about 1e-9 at twofold oversampling. */
const spreadReach = 10;
const oversampling = 2;

/**
 * F[k] = Σ_j v[j]·exp(−i·k·φ[j]), k = 0 … count−1, for samples at any angles φ (radians): each sample is spread over a
 * twofold oversampled grid by a Gaussian, transformed, and the Gaussian divided out (Dutt & Rokhlin 1993; Greengard & Lee 2004).
 * Cost: samples·21 + count·log(count), against samples·count for the direct sum.
 * @returns interleaved real and imaginary parts
 */
export function nonUniformTransform(angles: ArrayLike<number>, values: ArrayLike<number>, count: number): Float64Array {
  const span = Math.max(2 * count, 4 * spreadReach);
  const size = 2 ** Math.ceil(Math.log2(oversampling * span));
  const ratio = size / span;
  const width = (Math.PI * spreadReach) / (span * span * ratio * (ratio - 0.5));
  const grid = new Float64Array(size);
  const step = (2 * Math.PI) / size;
  for (let j = 0; j < angles.length; j++) {
    const turns = (angles[j] as number) / (2 * Math.PI);
    const angle = (turns - Math.floor(turns)) * 2 * Math.PI;
    const nearest = Math.floor(angle / step);
    const offset = angle - nearest * step;
    // exp(−(offset − l·step)²/4w) = e1·e2^l·e3(l): two exponentials a sample would do; direct is clear and fast enough.
    for (let l = 1 - spreadReach; l <= spreadReach; l++) {
      const distance = offset - l * step;
      const place = (nearest + l) & (size - 1);
      grid[place] = (grid[place] as number) + (values[j] as number) * Math.exp((-distance * distance) / (4 * width));
    }
  }
  const spectrum = createRealFft(size).transform(grid);
  const result = new Float64Array(2 * count);
  const scale = Math.sqrt(Math.PI / width) / size;
  for (let k = 0; k < count; k++) {
    const gain = scale * Math.exp(k * k * width);
    result[2 * k] = (spectrum[2 * k] as number) * gain;
    result[2 * k + 1] = (spectrum[2 * k + 1] as number) * gain;
  }
  return result;
}
