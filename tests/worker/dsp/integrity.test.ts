import { describe, expect, it } from 'vitest';
import { IntegrityMeter } from '../../../worker/measure/IntegrityMeter.js';
import { detectQuantum } from '../../../worker/dsp/detectQuantum.js';
import { seededNoise } from '../../support/seededNoise.js';

function meter(samples: Float64Array): ReturnType<IntegrityMeter['result']> {
  const instance = new IntegrityMeter();
  instance.push(samples, samples.length, 0);
  return instance.result();
}

const quantise = (samples: Float64Array, step: number): Float64Array =>
  samples.map((value) => step * Math.round(value / step));
const wave = Float64Array.from({ length: 8000 }, (_, n) => 0.6 * Math.sin(n * 0.031) + 0.3 * Math.sin(n * 0.173));

describe('detectQuantum', () => {
  it('finds the step that is really used, 12 bits in 16', () => {
    expect(detectQuantum(quantise(wave, 2 ** -11))).toBeCloseTo(2 ** -11, 12);
  });

  it('finds a step after scaling by an odd factor', () => {
    expect(detectQuantum(quantise(wave, 2 ** -11).map((value) => 9.81 * value))).toBeCloseTo(9.81 * 2 ** -11, 9);
  });

  it('finds none in unquantised values or in a handful of them', () => {
    expect(detectQuantum(seededNoise(4000))).toBeNull();
    expect(detectQuantum([1, 2])).toBeNull();
  });
});

describe('IntegrityMeter', () => {
  it('counts clipped samples and says where', () => {
    const clipped = quantise(wave, 2 ** -15).map((value, n) =>
      n < 4000 ? Math.max(-0.7, Math.min(0.7, value)) : value,
    );
    const result = meter(clipped);
    expect(result.clippedCount).toBeGreaterThan(100);
    for (const { first, last } of result.clippedSpans) {
      expect(Math.abs(clipped[first] as number)).toBe(0.7);
      expect(last).toBeLessThan(4000);
    }
  });

  it('takes the rounded tops of a slow wave for no clipping', () => {
    const slow = quantise(
      Float64Array.from({ length: 20_000 }, (_, n) => 0.9 * Math.sin(n * 0.0011)),
      2 ** -11,
    );
    expect(meter(slow).clippedCount).toBe(0);
  });

  it('finds held and zeroed stretches as dropouts', () => {
    const damaged = Float64Array.from(seededNoise(8000, 4));
    damaged.fill(0, 1000, 1060);
    damaged.fill(damaged[4999] as number, 5000, 5100);
    const { dropouts } = meter(damaged);
    expect(dropouts).toEqual([
      { first: 1000, last: 1059 },
      { first: 4999, last: 5099 },
    ]);
  });

  it('takes the equal neighbours of a coarsely quantised signal for no dropout', () => {
    expect(meter(quantise(wave, 0.1)).dropouts).toEqual([]);
  });

  it('counts values that are no numbers and keeps them out of the level', () => {
    const samples = Float64Array.from(wave);
    samples.fill(Number.NaN, 100, 110);
    samples[7000] = Number.POSITIVE_INFINITY;
    const result = meter(samples);
    expect(result.notFiniteCount).toBe(11);
    expect(result.notFiniteSpans).toEqual([
      { first: 100, last: 109 },
      { first: 7000, last: 7000 },
    ]);
    expect(Number.isFinite(result.level?.rms)).toBe(true);
  });

  it('gives the same result for blocks of any length', () => {
    const whole = meter(wave);
    const cut = new IntegrityMeter();
    for (let first = 0; first < wave.length; first += 333) {
      const part = wave.subarray(first, Math.min(wave.length, first + 333));
      cut.push(part, part.length, first);
    }
    const result = cut.result();
    expect(result.quantum).toEqual(whole.quantum);
    expect(result.dropouts).toEqual(whole.dropouts);
    expect(result.level?.rms).toBeCloseTo(whole.level?.rms ?? 0, 12);
  });
});
