import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { ChannelJudgement } from '../../shared/schemas/screening.js';
import { defaultThresholds } from '../../shared/schemas/thresholds.js';
import { aliasHz, candidatesHz } from '../../shared/screening/foldArithmetic.js';
import { judgeChannel } from '../../shared/screening/judgeChannel.js';
import type { MeasurementRecord } from '../../shared/screening/MeasurementRecord.js';
import { createRealFft } from '../../worker/dsp/createRealFft.js';
import { measureCapture } from '../../worker/measure/measureCapture.js';
import type { SampleSource } from '../../worker/readers/SampleSource.js';
import { memorySource } from '../support/memorySource.js';
import { seededNoise } from '../support/seededNoise.js';

const rateHz = 1000;
const count = 3000;
/** Each run measures a capture: few of them, always the same ones. */
const few = { numRuns: 4, seed: 11 };

const captureOf = ({ toneHz, noise, seed }: { toneHz: number; noise: number; seed: number }): Float64Array =>
  seededNoise(count, seed).map((value, n) => 0.3 * Math.sin((2 * Math.PI * toneHz * n) / rateHz) + noise * value);

const captures = fc.record({
  toneHz: fc.double({ min: 40, max: 460, noNaN: true }),
  noise: fc.double({ min: 1e-3, max: 0.1, noNaN: true }),
  seed: fc.integer({ min: 1, max: 1000 }),
});

function recordsOf(channels: Float64Array[], overrides: Partial<SampleSource> = {}): MeasurementRecord[] {
  return measureCapture(memorySource(channels, rateHz, overrides), {}).map(({ record }) => record);
}

const judged = (record: MeasurementRecord | undefined): ChannelJudgement => {
  if (record === undefined) throw new Error('nothing measured');
  return judgeChannel(record, defaultThresholds, {});
};

/** What must not change with the unit: verdict, tones and their explanations, kinds of findings. */
function gist({ verdict, clearToHz, tones, findings }: ChannelJudgement): unknown {
  return {
    verdict,
    clearToHz: clearToHz === null ? null : Math.round(clearToHz),
    tones: tones.map(({ frequencyHz, explanation }) => [Math.round(1e4 * frequencyHz), explanation]),
    kinds: findings.map(({ kind, severity }) => `${kind} ${severity}`).sort(),
  };
}

/** The tones' and the profile's numbers to six decimals: sums over blocks of other sizes round otherwise in the last ones. */
const rounded = (record: MeasurementRecord | undefined): unknown =>
  JSON.parse(
    JSON.stringify({ tones: record?.tones, profile: record?.profile, level: record?.level }, (_, value: unknown) =>
      typeof value === 'number' ? Number(value.toFixed(6)) + 0 : value,
    ),
  );

describe('fold arithmetic', () => {
  const frequency = fc.double({ min: 0, max: 1e5, noNaN: true });
  const rate = fc.double({ min: 1, max: 1e5, noNaN: true });

  it('leaves what is folded once where it is', () => {
    fc.assert(
      fc.property(frequency, rate, (hz, fs) => {
        const once = aliasHz(hz, fs);
        expect(once).toBeGreaterThanOrEqual(0);
        expect(once).toBeLessThanOrEqual(fs / 2 + 1e-9 * hz);
        expect(Math.abs(aliasHz(once, fs) - once)).toBeLessThanOrEqual(1e-9 * Math.max(1, hz));
      }),
    );
  });

  it('lands every candidate on the tone that it is a candidate for', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.01, max: 0.49, noNaN: true }), rate, (share, fs) => {
        const hz = share * fs;
        for (const candidate of candidatesHz(hz, fs, 5 * fs)) {
          expect(Math.abs(aliasHz(candidate, fs) - hz)).toBeLessThanOrEqual(1e-6 * fs);
        }
      }),
    );
  });
});

describe('createRealFft', () => {
  // Parseval's theorem: Σ x² = (1/N)·Σ |X|² over all bins; those between 0 and N/2 stand for two.
  it('keeps the energy of any samples', () => {
    fc.assert(
      fc.property(fc.integer({ min: 3, max: 11 }), fc.integer({ min: 1, max: 1e6 }), (exponent, seed) => {
        const size = 2 ** exponent;
        const samples = seededNoise(size, seed);
        const spectrum = createRealFft(size).transform(samples);
        let energy = 0;
        for (let bin = 0; bin <= size / 2; bin++) {
          const power = (spectrum[2 * bin] as number) ** 2 + (spectrum[2 * bin + 1] as number) ** 2;
          energy += (bin === 0 || bin === size / 2 ? 1 : 2) * power;
        }
        const expected = samples.reduce((sum, value) => sum + value * value, 0);
        expect(energy / size / expected).toBeCloseTo(1, 9);
      }),
      { numRuns: 40 },
    );
  });
});

describe('measuring and judging', () => {
  it('says the same at any scale and in any unit', () => {
    fc.assert(
      fc.property(captures, fc.constantFrom(1000, 1 / 1024, 9.80665), (made, scale) => {
        const samples = captureOf(made);
        const [plain] = recordsOf([samples], { format: 'csv' });
        const [scaled] = recordsOf([samples.map((value) => value * scale)], { format: 'csv', units: ['mm/s²'] });
        expect(gist(judged(scaled))).toEqual(gist(judged(plain)));
      }),
      few,
    );
  });

  it('gives the same judgement whatever the size of the blocks read, and the same numbers but for rounding', () => {
    fc.assert(
      fc.property(captures, fc.integer({ min: 100, max: 2999 }), (made, blockFrames) => {
        const samples = captureOf(made);
        const whole = memorySource([samples], rateHz);
        const cut: SampleSource = {
          ...whole,
          readBlocks: (onBlock, options = {}) => whole.readBlocks(onBlock, { ...options, blockFrames }),
        };
        const [inBlocks, atOnce] = [measureCapture(cut, {})[0]?.record, measureCapture(whole, {})[0]?.record];
        expect(gist(judged(inBlocks))).toEqual(gist(judged(atOnce)));
        expect(rounded(inBlocks)).toEqual(rounded(atOnce));
      }),
      few,
    );
  });

  it('gives each channel the same figures wherever it stands', () => {
    fc.assert(
      fc.property(captures, captures, (one, other) => {
        const [a, b] = [captureOf(one), captureOf(other)];
        const straight = recordsOf([a, b]);
        const swapped = recordsOf([b, a]);
        expect(gist(judged(swapped[1]))).toEqual(gist(judged(straight[0])));
        expect(gist(judged(swapped[0]))).toEqual(gist(judged(straight[1])));
      }),
      few,
    );
  });

  it('gives the same verdict and tone for a capture that starts later', () => {
    fc.assert(
      fc.property(captures, fc.integer({ min: 1, max: 400 }), ({ toneHz, noise, seed }, shift) => {
        const samples = captureOf({ toneHz, noise, seed });
        const later = Float64Array.from({ length: count }, (_, n) => samples[(n + shift) % count] as number).subarray(
          0,
          count - shift,
        );
        const [before] = recordsOf([samples.subarray(0, count - shift)]);
        const [after] = recordsOf([later]);
        expect(judged(after).verdict).toBe(judged(before).verdict);
        const nearest = (record: MeasurementRecord | undefined): number =>
          Math.min(...(record?.tones ?? []).map(({ frequencyHz }) => Math.abs(frequencyHz - toneHz)));
        expect(nearest(before)).toBeLessThan(0.05);
        expect(nearest(after)).toBeLessThan(0.05);
      }),
      few,
    );
  });

  it('judges one record the same each time, also once it was stored as text', () => {
    fc.assert(
      fc.property(captures, (made) => {
        const [record] = recordsOf([captureOf(made)]);
        const stored = JSON.parse(JSON.stringify(record)) as MeasurementRecord;
        expect(judged(record)).toEqual(judged(record));
        expect(judged(stored)).toEqual(judged(record));
      }),
      few,
    );
  });
});
