import { seededRandom } from '../../../worker/dsp/seededRandom.js';

export interface Limits {
  low: number;
  high: number;
}

/**
 * Percentile limits by the cluster bootstrap (Efron & Tibshirani 1993, chapters 8 and 13): whole recordings are drawn with
 * replacement, with all captures made from them, because captures of one recording are no independent trials.
 * @param clusters which recording each item belongs to
 * @param statistic figure of the resample; `weights[i]` says how often item i was drawn. NaN draws are left out.
 */
export function bootstrapLimits(
  clusters: readonly string[],
  statistic: (weights: Float64Array) => number,
  options: { resamples?: number; seed?: number; coverage?: number } = {},
): Limits {
  const { resamples = 1000, seed = 1, coverage = 0.95 } = options;
  const names = [...new Set(clusters)];
  const numberOf = new Map(names.map((name, index) => [name, index]));
  const clusterOf = clusters.map((name) => numberOf.get(name) ?? 0);
  const random = seededRandom(seed);
  const drawn = new Float64Array(names.length);
  const weights = new Float64Array(clusters.length);
  const values: number[] = [];
  for (let n = 0; n < resamples; n++) {
    drawn.fill(0);
    for (let draw = 0; draw < names.length; draw++) {
      const one = Math.floor(random() * names.length);
      drawn[one] = (drawn[one] ?? 0) + 1;
    }
    clusterOf.forEach((cluster, index) => (weights[index] = drawn[cluster] ?? 0));
    const value = statistic(weights);
    if (!Number.isNaN(value)) values.push(value);
  }
  values.sort((a, b) => a - b);
  const at = (share: number): number =>
    values[Math.min(values.length - 1, Math.max(0, Math.round(share * (values.length - 1))))] ?? Number.NaN;
  return { low: at((1 - coverage) / 2), high: at((1 + coverage) / 2) };
}
