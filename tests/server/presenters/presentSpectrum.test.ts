import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Spectrum } from '../../../server/entities/index.js';
import { presentSpectrum, type SpectrumWindow } from '../../../server/presenters/presentSpectrum.js';

const toBytes = (values: number[]): Buffer => Buffer.from(new Float32Array(values).buffer);
const of = { channel: 0, kind: 'survey' as const, unit: 'g', sampleRateHz: 8 };

function present(mean: number[], window: Partial<SpectrumWindow> = {}, median: number[] | null = null) {
  const spectrum = { kind: 'survey', resolutionHz: 0.5, segments: 4 } as Spectrum;
  spectrum.densityMean = toBytes(mean);
  spectrum.densityMedian = median && toBytes(median);
  return presentSpectrum(spectrum, of, { points: 2048, ...window });
}

describe('presentSpectrum', () => {
  it('gives densities in decibel at the bins of the spectrum', () => {
    expect(present([1, 0.1, 0.01])).toMatchObject({
      frequencyHz: [0, 0.5, 1],
      densityDb: [0, -10, -20],
      medianDb: null,
      foldingFrequencyHz: 4,
      unit: 'g',
    });
  });

  it('shows nothing at all as -300 dB instead of minus infinity', () => {
    expect(present([0]).densityDb).toEqual([-300]);
  });

  it('shows each pool by its largest bin, and averages the median', () => {
    const answer = present([1, 10, 1, 100, 1], { points: 2 }, [1, 3, 2, 4, 5]);
    expect(answer.frequencyHz).toEqual([0.5, 1.5]);
    expect(answer.densityDb).toEqual([10, 20]);
    // 10·log10((1+3+2)/3) and 10·log10((4+5)/2)
    expect(answer.medianDb?.map((value) => value.toFixed(2))).toEqual(['3.01', '6.53']);
  });

  it('takes the bins at both ends of the stretch with it', () => {
    expect(present([1, 1, 1, 1, 1, 1], { fromHz: 0.5, toHz: 1.5 }).frequencyHz).toEqual([0.5, 1, 1.5]);
    expect(present([1, 1, 1], { fromHz: 0.6, toHz: 0.9 }).frequencyHz).toEqual([]);
    expect(present([1, 1, 1], { fromHz: 99 }).frequencyHz).toEqual([]);
  });

  it('reads bytes that do not begin at a multiple of four', () => {
    const shifted = Buffer.concat([Buffer.alloc(1), toBytes([1, 0.1])]).subarray(1);
    const spectrum = { kind: 'survey', resolutionHz: 1, segments: 1, densityMean: shifted } as Spectrum;
    spectrum.densityMedian = null;
    expect(presentSpectrum(spectrum, of, { points: 16 }).densityDb).toEqual([0, -10]);
  });

  it('never loses the highest density, nor gives more points than asked for', () => {
    fc.assert(
      fc.property(
        fc.array(fc.float({ min: Math.fround(1e-6), max: 1e6, noNaN: true }), { minLength: 1, maxLength: 300 }),
        fc.integer({ min: 16, max: 64 }),
        (mean, points) => {
          const { densityDb, frequencyHz } = present(mean, { points });
          expect(densityDb.length).toBeLessThanOrEqual(points);
          expect(Math.max(...densityDb)).toBeCloseTo(10 * Math.log10(Math.max(...mean)), 2);
          expect([...frequencyHz].sort((a, b) => a - b)).toEqual(frequencyHz);
        },
      ),
    );
  });
});
