import type { FoldFeatures } from './foldFeatures.js';

/** Share of folded captures assumed; a project may know better and can recompute from the stored likelihood ratio. */
export const foldPrior = 0.4;

/** Weights of the log-likelihood ratio, per dB; fitted once to labelled captures, with the signs set by physics. */
const weights = { offset: 7.6, edgeShareDb: 0.19, cliffDb: -0.08, followingDb: 0.08 } as const;
const limits = { low: -7, high: 6 } as const;
/** A flat steady floor leaves this much of the edge's statement. */
const floorRemainder = 0.1;
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
  const sum =
    weights.offset +
    weights.edgeShareDb * features.edgeShareDb +
    weights.cliffDb * features.cliffDb +
    weights.followingDb * features.followingDb;
  const limited = Math.min(limits.high, Math.max(limits.low, sum));
  return limited > 0 ? limited * (1 - features.floorLikeness * (1 - floorRemainder)) : limited;
}
