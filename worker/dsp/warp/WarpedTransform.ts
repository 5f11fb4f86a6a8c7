import FFT from 'fft.js';
import { createRealFft, type RealFft } from '../createRealFft.js';

/** Grid points over which a sample is spread; with twofold oversampling the relative error is about 1e-5. */
const width = 6;
const half = width / 2;
const shape = 2.3 * width;
const tableSteps = 512;
const quadratureNodes = 64;

/** Kernel at a distance of −width/2 … width/2 grid points, as a table for straight lines between its entries. */
const table = Float64Array.from({ length: width * tableSteps + 2 }, (_, index) => {
  const z = (index / tableSteps - half) / half;
  return Math.abs(z) >= 1 ? 0 : Math.exp(shape * (Math.sqrt(1 - z * z) - 1));
});

/**
 * F[k] = Σ_n v[n]·exp(−2πi·k·p[n]), k = 0 … count−1, for real values at places p in turns (any real number), and its
 * counterpart v[n] = Re Σ_k c[k]·exp(+2πi·k·p[n]). Samples are spread over a twofold oversampled grid by the
 * "exponential of semicircle" kernel (Barnett, Magland & af Klinteberg 2019; gridding after Dutt & Rokhlin 1993).
 * Made for many transforms of one size: the grid and its gains are kept.
 */
export class WarpedTransform {
  readonly count: number;
  private readonly size: number;
  private readonly fft: RealFft;
  private readonly grid: Float64Array;
  private readonly gains: Float64Array;
  private inverse: FFT | null = null;

  constructor(count: number) {
    this.count = count;
    this.size = 2 ** Math.ceil(Math.log2(Math.max(32, 4 * count)));
    this.fft = createRealFft(this.size);
    this.grid = new Float64Array(this.size);
    this.gains = Float64Array.from({ length: count }, (_, k) => gainAt(k / this.size));
  }

  /** @returns interleaved real and imaginary parts, 2·count numbers, in a buffer of its own */
  forward(places: Float64Array, values: Float64Array): Float64Array {
    const { grid, size, count, gains } = this;
    grid.fill(0);
    const mask = size - 1;
    for (let n = 0; n < places.length; n++) {
      const place = places[n] as number;
      const at = (place - Math.floor(place)) * size;
      const first = Math.ceil(at - half);
      const exact = (first - at + half) * tableSteps;
      const entry = Math.floor(exact);
      const share = exact - entry;
      const value = values[n] as number;
      for (let l = 0, e = entry; l < width; l++, e += tableSteps) {
        const low = table[e] as number;
        const index = (first + l) & mask;
        grid[index] = (grid[index] as number) + value * (low + share * ((table[e + 1] as number) - low));
      }
    }
    const spectrum = this.fft.transform(grid);
    const result = new Float64Array(2 * count);
    for (let k = 0; k < count; k++) {
      const gain = gains[k] as number;
      result[2 * k] = (spectrum[2 * k] as number) * gain;
      result[2 * k + 1] = (spectrum[2 * k + 1] as number) * gain;
    }
    return result;
  }

  /** @param coefficients interleaved, as `forward` gives them; @returns one real value a place */
  backward(places: Float64Array, coefficients: Float64Array): Float64Array {
    const { size, count, gains } = this;
    this.inverse ??= new FFT(size);
    const input = new Float64Array(2 * size);
    for (let k = 0; k < count; k++) {
      const gain = gains[k] as number;
      input[2 * k] = (coefficients[2 * k] as number) * gain * size;
      input[2 * k + 1] = (coefficients[2 * k + 1] as number) * gain * size;
    }
    const output = new Float64Array(2 * size);
    this.inverse.inverseTransform(output, input);
    const mask = size - 1;
    return places.map((place) => {
      const at = (place - Math.floor(place)) * size;
      const first = Math.ceil(at - half);
      const exact = (first - at + half) * tableSteps;
      const entry = Math.floor(exact);
      const share = exact - entry;
      let sum = 0;
      for (let l = 0, e = entry; l < width; l++, e += tableSteps) {
        const low = table[e] as number;
        sum += (output[2 * ((first + l) & mask)] as number) * (low + share * ((table[e + 1] as number) - low));
      }
      return sum;
    });
  }
}

const gainSteps = 2048;
const highestUsed = 0.25;
/** One over the kernel's Fourier transform, at 0 … a quarter of a cycle a grid point, for straight lines between. */
const gainTable = Float64Array.from(
  { length: gainSteps + 2 },
  (_, index) => 1 / kernelTransform((2 * Math.PI * highestUsed * index) / gainSteps),
);

function gainAt(cycles: number): number {
  const exact = (cycles / highestUsed) * gainSteps;
  const entry = Math.floor(exact);
  const low = gainTable[entry] as number;
  return low + (exact - entry) * ((gainTable[entry + 1] as number) - low);
}

/** Fourier transform of the kernel over grid distance, by the midpoint rule (the kernel vanishes smoothly at its ends). */
function kernelTransform(omega: number): number {
  let sum = 0;
  for (let node = 0; node < quadratureNodes; node++) {
    const z = (2 * node + 1) / quadratureNodes - 1;
    sum += Math.exp(shape * (Math.sqrt(1 - z * z) - 1)) * Math.cos(omega * z * half);
  }
  return (sum * width) / quadratureNodes;
}
