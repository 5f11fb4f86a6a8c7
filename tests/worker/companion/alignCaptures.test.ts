import { describe, expect, it } from 'vitest';
import { alignCaptures } from '../../../worker/companion/alignCaptures.js';
import { seededNoise } from '../../support/seededNoise.js';
import { sampled, struck } from '../../support/struckPair.js';

const event = struck(
  [
    { frequencyHz: 211, amplitude: 1, decayS: 0.6 },
    { frequencyHz: 487, amplitude: 0.7, decayS: 1.1, phase: 1 },
    { frequencyHz: 903, amplitude: 0.5, decayS: 0.4, phase: 2 },
    { frequencyHz: 5755.8, amplitude: 0.4, decayS: 0.8 },
  ],
  0.9,
);

describe('alignCaptures', () => {
  it('finds the lag of a later start between two rates, lengths and gains within a hundredth of a sample', () => {
    const own = sampled(event, 5000, 4, { noise: 0.01, seed: 1 });
    const other = sampled(event, 4096, 3, { startS: 0.3217, gain: -0.02, noise: 0.0002, seed: 2 });
    const found = alignCaptures(own, 5000, other, 4096);
    // What happens here at t happens there at t − 0.3217 s.
    expect(found?.lagS).toBeCloseTo(-0.3217, 5);
    expect(found?.isInverted).toBe(true);
    expect(found?.chanceProbability).toBeLessThan(1e-9);
    expect(found?.overlapS).toBeCloseTo(3, 1);
  });

  it('is symmetric: swapped captures lag by the opposite', () => {
    const own = sampled(event, 5000, 4, { noise: 0.01, seed: 1 });
    const other = sampled(event, 12_800, 4, { startS: -0.25, noise: 0.01, seed: 2 });
    const there = alignCaptures(own, 5000, other, 12_800);
    const back = alignCaptures(other, 12_800, own, 5000);
    expect(there?.lagS).toBeCloseTo(0.25, 5);
    expect((there?.lagS ?? 0) + (back?.lagS ?? 1)).toBeCloseTo(0, 6);
  });

  it('measures a clock that runs 80 ppm slow', () => {
    const own = sampled(event, 5000, 6, { noise: 0.001, seed: 1 });
    const other = sampled(event, 4096 / 1.00008, 6, { startS: -0.4, noise: 0.001, seed: 2 });
    const found = alignCaptures(own, 5000, other, 4096);
    expect((found?.clockRatio ?? 1) - 1).toBeCloseTo(-0.00008, 5);
  });

  it('sees no lag between unrelated noise', () => {
    const found = Array.from({ length: 20 }, (_, seed) =>
      alignCaptures(seededNoise(4000, 2 * seed + 1), 2000, seededNoise(5000, 2 * seed + 2), 2500),
    );
    expect(found.filter((one) => (one?.chanceProbability ?? 1) < 0.05).length).toBeLessThanOrEqual(3);
    expect(found.every((one) => (one?.chanceProbability ?? 0) > 1e-4)).toBe(true);
  });

  it('says nothing of captures that are too short', () => {
    expect(alignCaptures(seededNoise(40), 2000, seededNoise(4000), 2500)).toBeNull();
  });
});
