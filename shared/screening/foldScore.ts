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

const priorLogOdds = Math.log(foldPrior / (1 - foldPrior));
/** No evidence here is worth more certainty than this. */
const largestScore = 1 - 1e-9;

/**
 * A quiet band edge speaks against broadband folding, not against a tone that stands above it: a tone shown to be folded,
 * strong enough to matter, is a second, separate way to be folded, and the two are joined as such
 * (1 − product of the probabilities of "not folded", Pearl 1988, "noisy or").
 * @param toneRatio log-likelihood ratio of the evidence in tones, tracks and moved tones; 0 for none
 * @param shownConfidence confidence that a tone above −40 dB of the total and below 0.9·fs/2 is folded; 0 for none
 */
export function foldScore(features: FoldFeatures | null, toneRatio: number, shownConfidence: number): FoldScore | null {
  if (features === null && toneRatio === 0) return null;
  const ratio = (features === null ? 0 : edgeRatio(features)) + toneRatio;
  if (shownConfidence === 0) return { logLikelihoodRatio: ratio, score: 1 / (1 + Math.exp(-ratio - priorLogOdds)) };
  const notFolded = (1 - shownConfidence) / (1 + Math.exp(ratio + priorLogOdds));
  const score = Math.min(largestScore, 1 - notFolded);
  return { logLikelihoodRatio: Math.log(score / (1 - score)) - priorLogOdds, score };
}

export function edgeRatio(features: FoldFeatures): number {
  if (features.hasImages) return imagesRatio;
  const edge = weights.offset + weights.edgeShareDb * features.edgeShareDb + weights.followingDb * features.followingDb;
  const floor = features.floorLikeness;
  const sum = (1 - floor) * edge + floor * weights.floor + weights.cliffDb * features.cliffDb;
  return Math.min(limits.high, Math.max(limits.low, sum));
}
