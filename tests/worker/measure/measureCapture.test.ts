import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { channelJudgementSchema } from '../../../shared/schemas/screening.js';
import { defaultThresholds } from '../../../shared/schemas/thresholds.js';
import { judgeChannel } from '../../../shared/screening/judgeChannel.js';
import type { MeasurementRecord } from '../../../shared/screening/MeasurementRecord.js';
import { measureCapture } from '../../../worker/measure/measureCapture.js';
import { memorySource } from '../../support/memorySource.js';
import { lowPass, seededNoise } from '../../support/seededNoise.js';

const fs = 2000;

function measure(samples: Float64Array, overrides: Parameters<typeof memorySource>[2] = {}): MeasurementRecord {
  const [channel] = measureCapture(memorySource([samples], fs, overrides), {});
  if (channel === undefined) throw new Error('one channel expected');
  return channel.record;
}

const judge = (record: MeasurementRecord) => judgeChannel(record, defaultThresholds, {});

/** Bursts of noise, recorded four times as fast and decimated by dropping samples, or filtered first. */
const fast = seededNoise(65_536, 21).map((value, n) => 0.1 * value * (0.05 + Math.exp(-(n % 12_000) / 2500)));
const pick = (samples: Float64Array): Float64Array => samples.filter((_, n) => n % 4 === 0);
const dropped = pick(fast);
const filtered = pick(lowPass(fast, 0.085));

describe('measureCapture', () => {
  it('calls a capture decimated by dropping samples folded, and its filtered twin not', () => {
    const bad = judge(measure(dropped));
    expect(bad.verdict).toBe('folded');
    expect(bad.findings[0]?.kind).toBe('edgeFollowsSource');
    expect(bad.clearToHz).toBeNull();
    const good = judge(measure(filtered));
    expect(good.verdict).not.toBe('folded');
    expect(good.foldScore).toBeLessThan(0.1);
    expect(good.clearToHz).toBeGreaterThan(0.25 * fs);
  });

  it('measures the same whatever the block size', () => {
    const source = memorySource([dropped], fs);
    const whole = JSON.stringify(measure(dropped));
    fc.assert(
      fc.property(fc.integer({ min: 7, max: 20_000 }), (blockFrames) => {
        const [cut] = measureCapture(
          { ...source, readBlocks: (onBlock) => source.readBlocks(onBlock, { blockFrames }) },
          {},
        );
        const record = cut?.record as MeasurementRecord;
        expect(record.profile?.meanDb).toEqual((JSON.parse(whole) as MeasurementRecord).profile?.meanDb);
        expect(judge(record).verdict).toBe('folded');
      }),
      { numRuns: 12 },
    );
  });

  it('gives the same verdict, score and clear-to frequency at any scale', () => {
    const reference = judge(measure(filtered));
    fc.assert(
      fc.property(fc.double({ min: -6, max: 6, noNaN: true }), (exponent) => {
        const scaled = judge(measure(filtered.map((value) => value * 10 ** exponent)));
        expect(scaled.verdict).toBe(reference.verdict);
        expect(scaled.foldScore).toBeCloseTo(reference.foldScore ?? 0, 3);
        expect(scaled.clearToHz).toBe(reference.clearToHz);
      }),
      { numRuns: 10 },
    );
  });

  it('shares one read between channels and keeps them apart', () => {
    const measured = measureCapture(memorySource([dropped, filtered], fs), {});
    expect(measured.map(({ record }) => judge(record).verdict)[0]).toBe('folded');
    expect(measured.map(({ record }) => record.channel)).toEqual([0, 1]);
    expect(measured[1]?.record.profile).toEqual(measure(filtered).profile);
  });

  it('finds a tone with its level and place', () => {
    const tone = Float64Array.from(
      seededNoise(20_000, 3),
      (value, n) => 0.01 * value + 0.2 * Math.sin((2 * Math.PI * 312.34 * n) / fs),
    );
    const [first] = measure(tone).tones;
    expect(first?.frequencyHz).toBeCloseTo(312.34, 3);
    expect(first?.levelDb).toBeCloseTo(10 * Math.log10(0.02), 1);
    expect(first?.boundHz).toBeLessThan(1e-3);
  });

  it('leaves dropouts out of the spectra', () => {
    const damaged = Float64Array.from(filtered);
    for (const at of [3000, 9000]) damaged.fill(0, at, at + 40);
    const clean = measure(filtered).edge?.densityDb ?? 0;
    const record = measure(damaged);
    expect(record.integrity.dropoutCount).toBe(2);
    expect(Math.abs((record.edge?.densityDb ?? 0) - clean)).toBeLessThan(3);
  });

  it('still makes spectra where damage is sprinkled over the whole capture', () => {
    const sprinkled = filtered.map((value, n) => (n % 97 === 0 ? Number.NaN : value));
    const record = measure(sprinkled);
    expect(record.profile).not.toBeNull();
    expect(judge(record).verdict).toBe('unproven');
  });

  const nothing: [string, Float64Array, number | null, string][] = [
    ['a constant', new Float64Array(4000).fill(0.25), fs, 'silent'],
    ['silence', new Float64Array(4000), fs, 'silent'],
    ['twelve samples', seededNoise(12), fs, 'tooShort'],
    ['no samples', new Float64Array(0), fs, 'tooShort'],
    ['nothing but not-a-number', new Float64Array(4000).fill(Number.NaN), fs, 'notFinite'],
    ['an unknown rate', seededNoise(4000), null, 'rateUnknown'],
  ];
  it.each(nothing)('calls %s unproven, with a reason and no NaN', (_, samples, rateHz, kind) => {
    const [channel] = measureCapture(memorySource([samples], rateHz), {});
    const record = channel?.record as MeasurementRecord;
    const judgement = judge(record);
    expect(judgement.verdict).toBe('unproven');
    expect(judgement.findings.map((finding) => finding.kind)).toContain(kind);
    expect(JSON.parse(JSON.stringify(record))).toEqual(record);
    expect(channelJudgementSchema.parse(JSON.parse(JSON.stringify(judgement)))).toEqual(judgement);
  });

  it('recovers tones beyond half the mean rate from irregular stamps', () => {
    const jitter = seededNoise(3000, 9);
    const timesS = Float64Array.from(
      jitter,
      (value, n) => (n + Math.max(-0.45, Math.min(0.45, 0.25 * value))) / 100,
    ).map((time, _, all) => time - (all[0] as number));
    const values = Float64Array.from(
      seededNoise(3000, 10),
      (value, n) =>
        0.1 * value +
        Math.sin(2 * Math.PI * 71.7 * (timesS[n] as number)) +
        0.5 * Math.sin(2 * Math.PI * 12.3 * (timesS[n] as number)),
    );
    const timeStamps = {
      irregular: true,
      jitterShare: 0.2,
      missingShare: 0,
      gaps: [],
      repeatedCount: 0,
      roundingStepS: 1e-6,
      timesS,
    };
    const [channel] = measureCapture(memorySource([values], 100, { format: 'csv', timeStamps }), {});
    const judgement = judge(channel?.record as MeasurementRecord);
    expect(judgement.tones.map(({ frequencyHz }) => Number(frequencyHz.toFixed(1)))).toEqual([12.3, 71.7]);
    expect(judgement.verdict).toBe('folded');
    expect(judgement.clearToHz).toBeNull();
  });

  it('stops when asked to', () => {
    expect(() =>
      measureCapture(memorySource([dropped], fs), {}, { signal: AbortSignal.abort(new Error('stopped')) }),
    ).toThrow('stopped');
    expect(measureCapture(memorySource([dropped], fs), {}, { signal: new AbortController().signal })).toHaveLength(1);
  });

  it('reports progress that only grows and ends at 1', () => {
    const shares: number[] = [];
    measureCapture(memorySource([dropped], fs), {}, { onProgress: (share) => shares.push(share) });
    expect(shares.every((share, index) => index === 0 || share >= (shares[index - 1] as number))).toBe(true);
    expect(shares[shares.length - 1]).toBe(1);
  });
});
