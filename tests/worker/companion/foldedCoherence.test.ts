import { describe, expect, it } from 'vitest';
import { coherenceChance } from '../../../shared/screening/coherenceChance.js';
import type { FoldedBand } from '../../../shared/screening/MeasurementRecord.js';
import { foldedCoherence } from '../../../worker/companion/foldedCoherence.js';
import { zoneCells } from '../../../worker/companion/ZoneCells.js';
import { lowPass, seededNoise } from '../../support/seededNoise.js';

const masterHz = 16_000;
const durationS = 8;
const master = seededNoise(masterHz * durationS, 5);
const upTo3500 = lowPass(master, 3500 / masterHz);
const upTo700 = lowPass(master, 700 / masterHz);
const every = (samples: Float64Array, step: number): Float64Array =>
  Float64Array.from({ length: Math.floor(samples.length / step) }, (_, n) => samples[n * step] as number);
const withNoise = (samples: Float64Array, deviation: number, seed: number): Float64Array => {
  const noise = seededNoise(samples.length, seed);
  return samples.map((value, n) => value + deviation * (noise[n] as number));
};

const atOnce = { lagS: 0, clockRatio: 1 };

function bandsOf(slow: Float64Array, fast: Float64Array, fastHz = 8000): FoldedBand[] {
  const cells = zoneCells({ samples: slow, rateHz: 2000 }, { samples: fast, rateHz: fastHz }, atOnce, fastHz / 2);
  if (cells === null) throw new Error('The captures are too short.');
  return foldedCoherence(cells);
}

const foldedPower = (bands: FoldedBand[]): number =>
  bands.reduce(
    (sum, { zones }) => sum + zones.slice(1).reduce((part, { powerDb }) => part + 10 ** (powerDb / 10), 0),
    0,
  );

describe('foldedCoherence', () => {
  it('accounts for all that an unfiltered capture folds, zone by zone', () => {
    const bands = bandsOf(every(upTo3500, 8), every(upTo3500, 2));
    // White up to 3500 Hz: 3/4 of the power beyond 1000 Hz less the filter's slope, 2500 of 3500 Hz.
    expect(foldedPower(bands)).toBeGreaterThan(0.66);
    expect(foldedPower(bands)).toBeLessThan(0.77);
    for (const { zones } of bands) {
      const left = zones.reduce((rest, { coherence }) => rest * (1 - coherence), 1);
      expect(left).toBeLessThan(0.01);
    }
  });

  it('does so for a rate that is no multiple of the other', () => {
    const own = every(upTo3500, 8);
    // 16000/3 Hz shows zones 1 to 2⅔.
    const bands = bandsOf(own, every(lowPass(master, 2400 / masterHz), 3), masterHz / 3);
    expect(bands[0]?.zones).toHaveLength(2);
    expect(
      bands.every(({ zones }) => coherenceChance(zones[1]?.coherence ?? 0, zones[1]?.independent ?? 0, 4) < 1e-6),
    ).toBe(true);
  });

  it('finds a folded share 30 dB under the noise of sensor and converter', () => {
    const clean = every(upTo700, 8);
    // Only what lies beyond 1000 Hz, at −60 dB; the noise of either capture is its own, at −30 dB.
    const inBand = every(lowPass(upTo3500, 1000 / masterHz), 8);
    const leak = every(upTo3500, 8).map((value, n) => value - (inBand[n] as number));
    const own = clean.map((value, n) => value + 2e-3 * (leak[n] as number));
    const bands = bandsOf(withNoise(own, 1e-3, 8), withNoise(every(upTo3500, 2), 1e-3, 9));
    const found = bands.slice(0, 9).flatMap(({ zones }) => zones.slice(1));
    const chances = found.map(({ coherence, independent, inputs }) => coherenceChance(coherence, independent, inputs));
    expect(Math.min(...chances)).toBeLessThan(1e-9);
  });

  it('finds no more than chance where nothing folds', () => {
    const bands = bandsOf(withNoise(every(upTo700, 8), 1e-3, 8), withNoise(every(upTo3500, 2), 1e-3, 9));
    // The 700 Hz filter leaves nothing beyond 1300 Hz, which lands below 700 Hz.
    const chances = bands
      .slice(0, 6)
      .flatMap(({ zones }) =>
        zones.slice(1).map(({ coherence, independent, inputs }) => coherenceChance(coherence, independent, inputs)),
      );
    expect(Math.min(...chances)).toBeGreaterThan(1e-4);
  });

  it('takes steady lines of unrelated captures for one statement, not for many', () => {
    const lines = (rateHz: number, frequencies: number[]): Float64Array =>
      Float64Array.from({ length: rateHz * durationS }, (_, n) =>
        frequencies.reduce((sum, hz, index) => sum + Math.sin((2 * Math.PI * hz * n) / rateHz + index), 0),
      );
    const own = withNoise(lines(2000, [123.4, 456.7, 789.1]), 1e-3, 3);
    const other = withNoise(lines(8000, [1544.1, 1211.2, 2791.9]), 1e-3, 4);
    const bands = bandsOf(own, other);
    for (const { zones } of bands) {
      for (const { coherence, independent, inputs } of zones) {
        expect(coherenceChance(coherence, independent, inputs)).toBeGreaterThan(1e-4);
      }
    }
  });

  it('needs a common stretch of some segments', () => {
    const short = { samples: seededNoise(500), rateHz: 2000 };
    expect(zoneCells(short, { samples: seededNoise(4000), rateHz: 8000 }, atOnce, 4000)).toBeNull();
  });
});
