import { describe, expect, it } from 'vitest';
import { fisherBoundHz } from './fisherBoundHz.js';
import { monteCarloThread } from './monteCarloThread.js';
import { aboveBound } from './runMonteCarlo.js';

const steady = { frequencyHz: 123.4, amplitude: 1, phase: 0.7, decayS: null };

describe('fisherBoundHz', () => {
  // Kay 1993, section 3.11: var(f) ≥ 12·fs²/(4π²·η·N·(N²−1)), η = A²/(2σ²), for a frequency away from 0 and fs/2.
  it('gives the closed form for one tone', () => {
    const [frames, rateHz, deviation] = [1000, 1000, 0.1];
    const snr = 1 / (2 * deviation ** 2);
    const closed = Math.sqrt((12 * rateHz ** 2) / (4 * Math.PI ** 2 * snr * frames * (frames ** 2 - 1)));
    const [bound] = fisherBoundHz([steady], frames, rateHz, deviation);
    expect((bound as number) / closed).toBeCloseTo(1, 2);
  });

  it('is the same for a far second tone and larger for a close one or a decay', () => {
    const at = (...tones: (typeof steady | (Omit<typeof steady, 'decayS'> & { decayS: number }))[]): number =>
      fisherBoundHz(tones, 1000, 1000, 0.1)[0] as number;
    const alone = at(steady);
    expect(at(steady, { ...steady, frequencyHz: 323.4 }) / alone).toBeCloseTo(1, 2);
    expect(at(steady, { ...steady, frequencyHz: 124.4 })).toBeGreaterThan(1.5 * alone);
    expect(at({ ...steady, decayS: 0.3 })).toBeGreaterThan(1.5 * alone);
  });
});

describe('aboveBound', () => {
  it('is 0 dB where the mean square error is the bound, within ±0.27 dB for 2000 runs', () => {
    const { aboveBoundDb, lowDb, highDb } = aboveBound(2000, 2000);
    expect(aboveBoundDb).toBe(0);
    expect(highDb).toBeCloseTo(0.27, 2);
    expect(lowDb).toBeCloseTo(-0.27, 2);
  });
});

describe('monteCarloThread', () => {
  it('runs the same for the same seed', () => {
    const task = { what: 'tones', index: 0, runs: 3, seed: 9 } as const;
    const result = monteCarloThread(task);
    expect(result).toEqual(monteCarloThread(task));
    expect(result).toMatchObject({ tones: 3, missed: 0 });
  });

  it('calls no clean noise folded', () => {
    expect(monteCarloThread({ what: 'noise', index: 1, runs: 2, seed: 9 }).calledFolded).toBe(0);
  });
});
