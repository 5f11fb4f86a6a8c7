import { describe, expect, it } from 'vitest';
import type { FoldFeatures } from '../../../shared/screening/foldFeatures.js';
import { foldPrior, foldScore } from '../../../shared/screening/foldScore.js';

const quietEdge: FoldFeatures = {
  edgeShareDb: -90,
  cliffDb: 60,
  followingDb: -20,
  floorLikeness: 0,
  hasImages: false,
};
const loudEdge: FoldFeatures = { ...quietEdge, edgeShareDb: -5, cliffDb: 2 };
const scoreOf = (...args: Parameters<typeof foldScore>): number => foldScore(...args)?.score ?? Number.NaN;

describe('foldScore', () => {
  it('is null without any evidence', () => {
    expect(foldScore(null, 0, 0)).toBeNull();
  });
  it('is low for a quiet edge behind a cliff and high for a loud one', () => {
    expect(scoreOf(quietEdge, 0, 0)).toBeLessThan(0.05);
    expect(scoreOf(loudEdge, 0, 0)).toBeGreaterThan(0.9);
  });
  it('follows a tone shown to be folded above a quiet edge', () => {
    expect(scoreOf(quietEdge, 0, 0.97)).toBeGreaterThanOrEqual(0.97);
  });
  it('never falls when a shown tone is added', () => {
    for (const ratio of [0, 2, 6]) {
      expect(scoreOf(loudEdge, ratio, 0.96)).toBeGreaterThanOrEqual(scoreOf(loudEdge, ratio, 0));
    }
  });
  it('stores the likelihood ratio from which the score comes back at the stated prior', () => {
    const score = foldScore(quietEdge, 1, 0.97);
    const odds = Math.exp(score?.logLikelihoodRatio ?? Number.NaN) * (foldPrior / (1 - foldPrior));
    expect(odds / (1 + odds)).toBeCloseTo(score?.score ?? Number.NaN, 10);
  });
});
