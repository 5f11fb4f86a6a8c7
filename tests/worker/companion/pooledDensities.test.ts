import { describe, expect, it } from 'vitest';
import { judgeDensities } from '../../../shared/screening/judgeDensities.js';
import type { CompanionMeasurement, DensityPair } from '../../../shared/screening/MeasurementRecord.js';
import { pooledDensities } from '../../../worker/companion/pooledDensities.js';
import { welch } from '../../../worker/dsp/welch.js';
import type { MeasuredSpectrum } from '../../../worker/measure/ChannelMeasurement.js';
import { lowPass, seededNoise } from '../../support/seededNoise.js';

const masterHz = 16_000;
const every = (samples: Float64Array, step: number): Float64Array =>
  Float64Array.from({ length: Math.floor(samples.length / step) }, (_, n) => samples[n * step] as number);

/** Rumble below 300 Hz and a resonance about 1400 Hz: another course of noise for each seed. */
function event(seed: number): Float64Array {
  const low = lowPass(seededNoise(masterHz * 10, seed), 300 / masterHz);
  const grain = seededNoise(masterHz * 10, seed + 50);
  let [before, last] = [0, 0];
  const r = 0.985;
  return low.map((value, n) => {
    const now = (grain[n] as number) * 0.02 + 2 * r * Math.cos((2 * Math.PI * 1400) / masterHz) * last - r * r * before;
    [before, last] = [last, now];
    return value + now + 0.002 * (grain[(n + 7) % grain.length] as number);
  });
}

function spectrumOf(samples: Float64Array, rateHz: number): MeasuredSpectrum {
  const { resolutionHz, segments, densityMean } = welch(samples, rateHz, 512);
  return { kind: 'survey', resolutionHz, segments, densityMean: Float32Array.from(densityMean), densityMedian: null };
}

const companion: CompanionMeasurement = { name: 'fast.wav', sampleRateHz: 8000, durationS: 10, tones: [] };

function pairOf(slow: Float64Array, gain: number): DensityPair {
  const fast = every(event(2), 2).map((value) => gain * value);
  const pair = pooledDensities(spectrumOf(slow, 2000), 2000, spectrumOf(fast, 8000), 8000);
  if (pair === null) throw new Error('The spectra are too coarse.');
  return pair;
}

describe('pooledDensities', () => {
  it('predicts where a repeated event folds, whatever the sensitivity', () => {
    for (const gain of [1, 0.05]) {
      const judged = judgeDensities(companion, pairOf(every(event(1), 8), gain));
      // The resonance holds most of the power beyond 1000 Hz and lands about 600 Hz.
      expect(judged?.shareDb).toBeGreaterThan(-12);
      expect(judged?.confidence).toBeGreaterThan(0.95);
      expect(judged?.finding.evidence['band6FoldedDb'] ?? judged?.finding.evidence['band7FoldedDb']).toBeGreaterThan(
        -1,
      );
    }
  });

  it('shows no share where a filter kept it out', () => {
    const filtered = every(lowPass(event(1), 900 / masterHz), 8);
    const judged = judgeDensities(companion, pairOf(filtered, 1));
    expect(judged?.shareDb).toBeNull();
    expect(judged?.finding.severity).toBe('note');
  });

  it('says nothing where nothing would fold visibly', () => {
    const quiet = pooledDensities(
      spectrumOf(every(lowPass(event(1), 900 / masterHz), 8), 2000),
      2000,
      spectrumOf(every(lowPass(event(2), 900 / masterHz), 2), 8000),
      8000,
    );
    expect(
      quiet === null ? null : judgeDensities(companion, { ...quiet, foldedDb: quiet.sameDb.map((db) => db - 30) }),
    ).toBeNull();
  });

  it('needs both spectra, fine enough', () => {
    const fine = spectrumOf(every(event(1), 8), 2000);
    expect(pooledDensities(undefined, 2000, fine, 8000)).toBeNull();
    expect(pooledDensities(fine, 2000, { ...fine, resolutionHz: 100 }, 8000)).toBeNull();
  });
});
