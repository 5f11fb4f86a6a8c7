import type { FoldFeatures } from './foldFeatures.js';

/** Share of folded captures assumed; a project may know better and can recompute from the stored likelihood ratio. */
export const foldPrior = 0.5;

/**
 * Weights of the log-likelihood ratio, per dB: logistic regression on labelled captures, cross-validated over sources and
 * families; the signs are set by physics. What the edge says counts as far as it is no flat, steady floor; the cliff always.
 */
const weights = { offset: 6.0, edgeShareDb: 0.103, cliffDb: -0.086, followingDb: 0.019, floor: -0.5 } as const;
const limits = { low: -7, high: 6 } as const;
const imagesRatio = -5;

export interface FoldScore {
  /** Natural logarithm of p(seen | folded)/p(seen | not folded). */
  logLikelihoodRatio: number;
  /** Calibrated probability that the folded energy below 0.9·fs/2 is above −40 dB of the total, at the stated prior. */
  score: number;
}

/**
 * @param toneRatio log-likelihood ratio of the evidence in tones, tracks and moved tones; 0 for none
 */
export function foldScore(features: FoldFeatures | null, toneRatio: number): FoldScore | null {
  if (features === null && toneRatio === 0) return null;
  const logLikelihoodRatio = (features === null ? 0 : edgeRatio(features)) + toneRatio;
  const logOdds = logLikelihoodRatio + Math.log(foldPrior / (1 - foldPrior));
  return { logLikelihoodRatio, score: 1 / (1 + Math.exp(-logOdds)) };
}

export function edgeRatio(features: FoldFeatures): number {
  if (features.hasImages) return imagesRatio;
  const edge = weights.offset + weights.edgeShareDb * features.edgeShareDb + weights.followingDb * features.followingDb;
  const floor = features.floorLikeness;
  const sum = (1 - floor) * edge + floor * weights.floor + weights.cliffDb * features.cliffDb;
  return Math.min(limits.high, Math.max(limits.low, sum));
}
