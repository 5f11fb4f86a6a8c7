import type { Limits } from './bootstrapLimits.js';
import { incompleteBeta } from './incompleteBeta.js';

/**
 * Exact confidence limits of a share seen `count` times in `total` (Clopper & Pearson 1934, Biometrika 26, 404-413):
 * quantiles of beta distributions. `tail` is the error left on each side: 0.025 for two-sided 95 % limits, 0.05 for an
 * upper limit of 95 %.
 */
export function clopperPearson(count: number, total: number, tail = 0.025): Limits {
  if (total === 0) return { low: 0, high: 1 };
  return {
    low: count === 0 ? 0 : betaQuantile(tail, count, total - count + 1),
    high: count === total ? 1 : betaQuantile(1 - tail, count + 1, total - count),
  };
}

function betaQuantile(probability: number, a: number, b: number): number {
  let [low, high] = [0, 1];
  // 60 halvings end below the spacing of doubles near any share that matters.
  for (let n = 0; n < 60; n++) {
    const middle = (low + high) / 2;
    if (incompleteBeta(middle, a, b) < probability) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}
