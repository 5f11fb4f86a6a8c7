import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { medianBias } from '../../../worker/dsp/medianBias.js';
import { SegmentSpectra } from '../../../worker/dsp/SegmentSpectra.js';
import { welch } from '../../../worker/dsp/welch.js';
import { readReference } from '../../support/readReference.js';
import { seededNoise } from '../../support/seededNoise.js';

interface WelchReference {
  sampleRateHz: number;
  segmentLength: number;
  samples: number[];
  densityMean: number[];
  densityMedian: number[];
}

describe('welch', () => {
  const reference = readReference<WelchReference>('welch.json');
  const result = welch(Float64Array.from(reference.samples), reference.sampleRateHz, reference.segmentLength);

  // Source: scipy.signal.welch, average='mean'.
  it('agrees with SciPy in the mean density', () => {
    result.densityMean.forEach((value, bin) => {
      const expected = reference.densityMean[bin] as number;
      expect(Math.abs(value - expected)).toBeLessThanOrEqual(1e-9 * expected + 1e-18);
    });
  });

  // Source: scipy.signal.welch, average='median' (bias-corrected).
  it('agrees with SciPy in the median density', () => {
    result.densityMedian.forEach((value, bin) => {
      const expected = reference.densityMedian[bin] as number;
      // Kept segments are single precision.
      expect(Math.abs(value - expected)).toBeLessThanOrEqual(1e-6 * expected + 1e-12);
    });
  });

  it('gives the variance of white noise as the integral of the density', () => {
    const noise = seededNoise(65_536, 3);
    const { densityMean, resolutionHz } = welch(noise, 2000, 1024);
    const variance = noise.reduce((sum, value) => sum + value * value, 0) / noise.length;
    const integral = densityMean.reduce((sum, value) => sum + value, 0) * resolutionHz;
    expect(integral / variance).toBeCloseTo(1, 1);
  });

  it('refuses fewer samples than one segment', () => {
    expect(() => welch(new Float64Array(255), 1000, 256)).toThrow(RangeError);
    expect(welch(new Float64Array(256), 1000, 256).segments).toBe(1);
  });

  // Source: Bennett 1948, quantisation noise q²/12, here as a one-sided density q²/(6·fs).
  it("shows Bennett's floor under a quantised tone", () => {
    const [fs, q] = [1000, 2 ** -7];
    const tone = Float64Array.from(
      { length: 65_536 },
      (_, n) => q * Math.round((0.83 * Math.sin(2 * Math.PI * 0.07123 * n + 0.1 * Math.sin(n * 0.00037))) / q),
    );
    const { densityMedian } = welch(tone, fs, 4096);
    const sorted = densityMedian.slice(1, -1).sort();
    const medianDb = 10 * Math.log10(sorted[sorted.length >> 1] as number);
    expect(Math.abs(medianDb - 10 * Math.log10((q * q) / (6 * fs)))).toBeLessThan(1.5);
  });
});

describe('SegmentSpectra', () => {
  it('gives the same segments for blocks of any length', () => {
    const samples = seededNoise(1500, 5);
    const run = (cuts: number[]): number[] => {
      const sums: number[] = [];
      const spectra = new SegmentSpectra(256, 1000, (density) => sums.push(density.reduce((a, b) => a + b, 0)));
      let start = 0;
      for (const cut of [...cuts, samples.length]) {
        if (cut > start) spectra.push(samples.subarray(start, cut));
        start = Math.max(start, cut);
      }
      return sums;
    };
    const whole = run([]);
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 1, max: 1499 }), { maxLength: 12 }), (cuts) => {
        expect(run([...cuts].sort((a, b) => a - b))).toEqual(whole);
      }),
    );
  });

  it('leaves out segments that are not usable', () => {
    const firsts: number[] = [];
    const spectra = new SegmentSpectra(
      64,
      1000,
      (_, first) => firsts.push(first),
      32,
      (first, last) => last < 100 || first > 120,
    );
    spectra.push(new Float64Array(256));
    expect(firsts).toEqual([0, 32, 128, 160, 192]);
  });
});

describe('medianBias', () => {
  // By hand: K = 9 gives Σ (−1)^(l+1)/l = 0.7456…, −1.27 dB; the limit is ln 2, −1.59 dB.
  it('is −1.27 dB for nine segments and −1.59 dB in the limit', () => {
    expect(10 * Math.log10(medianBias(9))).toBeCloseTo(-1.27, 2);
    expect(10 * Math.log10(medianBias(100_000))).toBeCloseTo(-1.59, 2);
    expect(medianBias(1)).toBe(1);
  });
});
