import FFT from 'fft.js';

const cells = 768;
/** The level is averaged over this many cells on each side, twice: an eighth of the band in all. */
const reach = 16;
/** Nothing is raised above the mean level by more than this (power). */
const largestRise = 1e7;

export interface FlatSignal {
  samples: Float64Array;
  /** Amplitude by which a frequency (cycles a sample) was multiplied. */
  gainAt: (frequency: number) => number;
}

/**
 * The signal with its spectrum levelled: each frequency divided by the root of the power around it, so that the strong low
 * orders of a machine don't hide the weak high ones. Linear and the same at all times: every component keeps its phase law.
 * @param samples real samples of zero mean, at least 8
 */
export function flattenSpectrum(samples: Float64Array): FlatSignal {
  const { length } = samples;
  const size = 2 ** Math.ceil(Math.log2(Math.max(8, length)));
  const half = size / 2;
  const fft = new FFT(size);
  const padded = new Float64Array(size);
  padded.set(samples);
  const spectrum = new Float64Array(2 * size);
  fft.realTransform(spectrum, padded);
  const count = Math.min(half, cells);
  const perCell = half / count;
  const levels = new Float64Array(count);
  for (let k = 0; k < half; k++) {
    const cell = Math.min(count - 1, Math.floor(k / perCell));
    const power = (spectrum[2 * k] as number) ** 2 + (spectrum[2 * k + 1] as number) ** 2;
    levels[cell] = (levels[cell] as number) + power / (perCell * length);
  }
  const mean = levels.reduce((sum, level) => sum + level, 0) / count;
  const gains = smooth(smooth(levels)).map((level) => 1 / Math.sqrt(level + mean / largestRise + 1e-300));
  const gainAt = (frequency: number): number => {
    const exact = Math.min(count - 1, Math.max(0, 2 * frequency * count - 0.5));
    const low = Math.floor(exact);
    const from = gains[low] as number;
    return from + (exact - low) * ((gains[Math.min(count - 1, low + 1)] as number) - from);
  };
  for (let k = 0; k <= half; k++) {
    const gain = k === 0 ? 0 : gainAt(k / size);
    spectrum[2 * k] = (spectrum[2 * k] as number) * gain;
    spectrum[2 * k + 1] = (spectrum[2 * k + 1] as number) * gain;
  }
  for (let k = 1; k < half; k++) {
    spectrum[2 * (size - k)] = spectrum[2 * k] as number;
    spectrum[2 * (size - k) + 1] = -(spectrum[2 * k + 1] as number);
  }
  const output = new Float64Array(2 * size);
  fft.inverseTransform(output, spectrum);
  return { samples: Float64Array.from({ length }, (_, n) => output[2 * n] as number), gainAt };
}

/** Running mean, narrower at the ends. */
function smooth(levels: Float64Array): Float64Array {
  const sums = new Float64Array(levels.length + 1);
  levels.forEach((level, k) => (sums[k + 1] = (sums[k] as number) + level));
  return levels.map((_, k) => {
    const from = Math.max(0, k - reach);
    const to = Math.min(levels.length, k + reach + 1);
    return ((sums[to] as number) - (sums[from] as number)) / (to - from);
  });
}
