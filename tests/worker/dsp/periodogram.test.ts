import { describe, expect, it } from 'vitest';
import { periodogram } from '../../../worker/dsp/periodogram.js';
import { readReference } from '../../support/readReference.js';

interface PeriodogramReference {
  sampleRateHz: number;
  fftLength: number;
  samples: number[];
  densityMean: number[];
}

describe('periodogram', () => {
  // Source: scipy.signal.periodogram, boxcar, padded.
  it('agrees with SciPy', () => {
    const reference = readReference<PeriodogramReference>('periodogram.json');
    const density = periodogram(Float64Array.from(reference.samples), reference.sampleRateHz, reference.fftLength);
    const top = Math.max(...reference.densityMean);
    density.forEach((value, bin) => {
      expect(Math.abs(value - (reference.densityMean[bin] as number))).toBeLessThanOrEqual(1e-11 * top);
    });
  });

  it('refuses samples that do not fit', () => {
    expect(() => periodogram(new Float64Array(9), 1, 8)).toThrow(RangeError);
    expect(() => periodogram(new Float64Array(0), 1, 8)).toThrow(RangeError);
    expect(periodogram(Float64Array.of(1, -1, 1, -1), 1, 4)[2]).toBeCloseTo(4, 12);
  });
});
