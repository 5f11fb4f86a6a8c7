import { describe, expect, it } from 'vitest';
import { calibrationAtShare } from './calibrationAtShare.js';
import { calibrationError } from './calibrationError.js';
import { reliability } from './reliability.js';
import { seededRandom } from '../../../worker/dsp/seededRandom.js';

/** Captures whose ratio x is normal, N(±d/2·d, d²): for two normals d apart the log-likelihood ratio is exactly that. */
function exactRatios(count: number, foldedShare: number, seed: number): { logRatio: number; isFolded: boolean }[] {
  const random = seededRandom(seed);
  const d = 2;
  return Array.from({ length: count }, () => {
    const isFolded = random() < foldedShare;
    const normal = Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random());
    return { logRatio: d * (normal + (isFolded ? d / 2 : -d / 2)), isFolded };
  });
}

describe('calibrationError', () => {
  it('is the mean distance between stated and seen over equal bins', () => {
    // Two bins: stated 0.2 against seen 0.5; stated 0.9 against seen 1: (0.3 + 0.1)/2.
    expect(calibrationError([0.9, 0.2, 0.2, 0.9], [1, 1, 0, 1], 2)).toBeCloseTo(0.2, 12);
  });

  it('is 0 where stated and seen agree in every bin and NaN without captures', () => {
    expect(calibrationError([0.5, 0.5, 1, 1], [0, 1, 1, 1], 2)).toBe(0);
    expect(calibrationError([], [])).toBeNaN();
  });
});

describe('calibrationAtShare', () => {
  it.each([0.5, 0.2])('finds next to no error in exact likelihood ratios at a share of %f', (share) => {
    // Made with another share: the prior is put in afterwards.
    const found = calibrationAtShare(exactRatios(4000, 0.35, 1), share, { sets: 10, simulations: 10 });
    expect(Math.abs(found.correctedError)).toBeLessThan(0.008);
    expect(found.expectedError).toBeGreaterThan(0.003);
  });

  it('finds the error of overstated ratios', () => {
    const overstated = exactRatios(4000, 0.5, 2).map((one) => ({ ...one, logRatio: 3 * one.logRatio }));
    expect(calibrationAtShare(overstated, 0.5, { sets: 5, simulations: 5 }).correctedError).toBeGreaterThan(0.05);
  });

  it('takes as many captures as the share allows', () => {
    const captures = [
      ...Array.from({ length: 30 }, () => ({ logRatio: 1, isFolded: true })),
      ...Array.from({ length: 100 }, () => ({ logRatio: -1, isFolded: false })),
    ];
    expect(calibrationAtShare(captures, 0.5, { sets: 1, simulations: 1 }).captures).toBe(60);
    expect(calibrationAtShare(captures, 0.2, { sets: 1, simulations: 1 }).captures).toBe(125);
  });
});

describe('reliability', () => {
  it('shows stated beside seen, weighted to the share', () => {
    // Ratio 0 says nothing, so the prior is stated; one of four is folded, but weighted it is half of all.
    const captures = [true, false, false, false].map((isFolded) => ({ logRatio: 0, isFolded }));
    const [bin] = reliability(captures, 0.5, 1);
    expect(bin?.captures).toBe(4);
    expect(bin?.stated).toBeCloseTo(0.5, 12);
    expect(bin?.seen).toBeCloseTo(0.5, 12);
  });
});
