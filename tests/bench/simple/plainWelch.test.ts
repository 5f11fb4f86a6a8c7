import { describe, expect, it } from 'vitest';
import { readReference } from '../../support/readReference.js';
import { seededNoise } from '../../support/seededNoise.js';
import { plainWelch } from './plainWelch.js';
import { simpleLevels } from './simpleMethods.js';

interface WelchReference {
  sampleRateHz: number;
  segmentLength: number;
  samples: number[];
  densityMean: number[];
}

describe('plainWelch', () => {
  // scipy.signal.welch, Hann periodic, half overlap, constant detrend; see fixtures/reference/makeReference.py.
  it('agrees with SciPy', () => {
    const { sampleRateHz, segmentLength, samples, densityMean } = readReference<WelchReference>('welch.json');
    const density = plainWelch(Float64Array.from(samples), sampleRateHz, segmentLength);
    density.forEach((value, bin) => expect(value / (densityMean[bin] as number)).toBeCloseTo(1, 9));
  });

  it('is not a number for less than one segment', () => {
    expect(plainWelch(new Float64Array(10), 100, 64)[3]).toBeNaN();
  });
});

describe('simpleLevels', () => {
  it('sees white noise as level at both', () => {
    const levels = simpleLevels(seededNoise(65_536), 1000);
    expect(levels?.edgeAgainstMidDb).toBeCloseTo(0, 0);
    // Spread over the whole band, the edge of white noise is all there is.
    expect(levels?.edgeAgainstTotalDb).toBeCloseTo(0, 0);
  });

  it('is the same for another scale and another rate', () => {
    const noise = seededNoise(8192, 2);
    const [one, other] = [
      simpleLevels(noise, 1000),
      simpleLevels(
        noise.map((value) => 7 * value),
        8000,
      ),
    ];
    expect(other?.edgeAgainstMidDb).toBeCloseTo(one?.edgeAgainstMidDb ?? 0, 9);
    expect(other?.edgeAgainstTotalDb).toBeCloseTo(one?.edgeAgainstTotalDb ?? 0, 9);
  });

  it('says nothing of silence and of a handful of samples', () => {
    expect(simpleLevels(new Float64Array(4096), 1000)).toBeNull();
    expect(simpleLevels(seededNoise(100), 1000)).toBeNull();
  });
});
