import { describe, expect, it } from 'vitest';
import { chirpVotes } from '../../../../worker/dsp/warp/chirpVotes.js';
import { lawFromVotes } from '../../../../worker/dsp/warp/lawFromVotes.js';
import { evenChange, proportionalChange } from '../../../../worker/dsp/warp/RateFamily.js';
import { warpedShareAt } from '../../../../worker/dsp/warp/SpeedLaw.js';
import { voteForRates } from '../../../../worker/dsp/warp/voteForRates.js';
import { seededNoise } from '../../../support/seededNoise.js';
import { shaftOrders, turningLines } from '../../../support/turningMachine.js';

const frames = [256, 512, 1024, 2048];

describe('chirpVotes', () => {
  // Oberlin, Meignen & Perrier (2015): the second-order estimate is exact for a linear chirp.
  it('reads frequency and slope of a linear chirp off its peaks', () => {
    const slope = 1e-5;
    const chirp = Float64Array.from({ length: 8192 }, (_, n) =>
      Math.cos(2 * Math.PI * (0.1 * n + (slope * n * n) / 2)),
    );
    const strongest = chirpVotes(chirp, 1024).filter(({ slopeError }) => slopeError < 1.2e-7);
    expect(strongest.length).toBeGreaterThan(8);
    for (const vote of strongest) {
      expect(vote.frequency).toBeCloseTo(0.1 + slope * vote.at, 4);
      expect(Math.abs(vote.slope - slope)).toBeLessThan(0.02 * slope);
    }
  });

  it('gives noise slopes of about one resolution a frame, no more', () => {
    const votes = chirpVotes(seededNoise(16_384, 8), 512);
    const relative = votes.map(({ slope, noiseSpread }) => Math.abs(slope / noiseSpread)).sort((a, b) => a - b);
    expect(votes.length).toBeGreaterThan(20);
    expect(relative[relative.length >> 1]).toBeLessThan(2);
  });
});

describe('voteForRates', () => {
  it('finds the even change of a machine although its high orders are folded and bend the other way', () => {
    const samples = turningLines(
      16_384,
      shaftOrders(0.012, (tau) => 1 + 0.02 * tau, 70),
      20,
    );
    const [best] = voteForRates(
      evenChange,
      frames.flatMap((frame) => chirpVotes(samples, frame)),
      samples.length,
      1,
    );
    expect(best?.rate).toBeCloseTo(0.02, 2);
    expect(Math.abs((best?.rate ?? 0) - 0.02)).toBeLessThan(0.002);
  });

  it('finds the rate of a sweep that changes in proportion', () => {
    const samples = turningLines(16_384, [{ frequency: (tau) => 0.1 * Math.exp(0.9 * tau) }], 30);
    const [best] = voteForRates(
      proportionalChange,
      frames.flatMap((frame) => chirpVotes(samples, frame)),
      samples.length,
      1,
    );
    expect(best?.rate).toBeCloseTo(0.9, 1);
  });
});

describe('lawFromVotes', () => {
  it('follows a speed of free shape to a few per cent', () => {
    const speed = (tau: number): number => 1 + 0.1 * Math.sin(5 * tau);
    const samples = turningLines(16_384, shaftOrders(0.012, speed, 38), 25);
    const { law, gain } = lawFromVotes(
      frames.flatMap((frame) => chirpVotes(samples, frame)),
      samples.length,
    );
    expect(gain).toBeGreaterThan(100);
    for (const time of [0.1, 0.3, 0.5, 0.7, 0.9]) {
      expect(law.speedAt(warpedShareAt(law, time)) / speed(2 * time - 1)).toBeCloseTo(1, 1);
    }
  });

  it('gains nothing at steady speed', () => {
    const samples = turningLines(
      16_384,
      shaftOrders(0.012, () => 1, 38),
      25,
    );
    expect(
      lawFromVotes(
        frames.flatMap((frame) => chirpVotes(samples, frame)),
        samples.length,
      ).gain,
    ).toBeLessThan(20);
  });
});
