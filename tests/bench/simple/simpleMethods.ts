import { plainWelch } from './plainWelch.js';

/** What a script says that looks at the averaged spectrum and nothing else; levels in dB, higher speaks for folded. */
export interface SimpleLevels {
  /** Median density of 95 … 99.5 % of fs/2 against that of 30 … 80 %. */
  edgeAgainstMidDb: number;
  /** Mean density of the last 2 % below fs/2, spread over 0 … fs/2, against the total power. */
  edgeAgainstTotalDb: number;
}

/** A skirt less deep than this is "folded" to the first script, an edge this far under the total to the second. */
export const simpleThresholdsDb = { edgeAgainstMid: -20, edgeAgainstTotal: -40 } as const;

const [shortest, longest] = [64, 2048];

/** @returns null where the capture is too short for one averaged spectrum */
export function simpleLevels(samples: Float64Array, sampleRateHz: number): SimpleLevels | null {
  const length = Math.min(longest, 2 ** Math.floor(Math.log2(Math.max(1, samples.length / 4))));
  if (length < shortest) return null;
  const density = plainWelch(samples, sampleRateHz, length);
  const top = length / 2;
  const stretch = (from: number, to: number): Float64Array =>
    density.slice(Math.min(Math.ceil(from * top), top - 1), Math.max(Math.ceil(to * top), Math.ceil(from * top) + 1));
  const mean = samples.reduce((sum, value) => sum + value, 0) / samples.length;
  const power = samples.reduce((sum, value) => sum + (value - mean) ** 2, 0) / samples.length;
  if (!(power > 0)) return null;
  const edge = stretch(0.98, 1);
  const edgeDensity = edge.reduce((sum, value) => sum + value, 0) / edge.length;
  return {
    edgeAgainstMidDb: decibels(median(stretch(0.95, 0.995)) / median(stretch(0.3, 0.8))),
    edgeAgainstTotalDb: decibels((edgeDensity * sampleRateHz) / 2 / power),
  };
}

function decibels(ratio: number): number {
  return 10 * Math.log10(Math.max(ratio, 1e-30));
}

function median(values: Float64Array): number {
  const sorted = Float64Array.from(values).sort();
  return Math.max(sorted[sorted.length >> 1] ?? 0, 1e-30);
}
