import { describe, expect, it } from 'vitest';
import { bootstrapLimits } from './bootstrapLimits.js';
import { seededRandom } from '../../../worker/dsp/seededRandom.js';

const random = seededRandom(3);
const values = Float64Array.from({ length: 400 }, () => random());
const mean = (weights: Float64Array): number => {
  let [sum, count] = [0, 0];
  weights.forEach((weight, index) => {
    sum += weight * (values[index % values.length] as number);
    count += weight;
  });
  return sum / count;
};
const apart = Array.from(values, (_, index) => String(index));

describe('bootstrapLimits', () => {
  it('gives ±1.96 standard errors for the mean of independent values', () => {
    const { low, high } = bootstrapLimits(apart, mean, { resamples: 4000 });
    const centre = values.reduce((sum, value) => sum + value, 0) / values.length;
    const deviation = Math.sqrt(values.reduce((sum, value) => sum + (value - centre) ** 2, 0) / values.length);
    const expected = 2 * 1.96 * (deviation / Math.sqrt(values.length));
    expect((high - low) / expected).toBeGreaterThan(0.92);
    expect((high - low) / expected).toBeLessThan(1.08);
    expect(low).toBeLessThan(centre);
    expect(high).toBeGreaterThan(centre);
  });

  it('is not made surer by copies of the same recordings', () => {
    const twice = [...apart, ...apart];
    const once = bootstrapLimits(apart, mean);
    const copied = bootstrapLimits(twice, mean);
    expect(copied.low).toBeCloseTo(once.low, 12);
    expect(copied.high).toBeCloseTo(once.high, 12);
  });

  it('draws the same for the same seed and otherwise for another', () => {
    expect(bootstrapLimits(apart, mean, { seed: 5 })).toEqual(bootstrapLimits(apart, mean, { seed: 5 }));
    expect(bootstrapLimits(apart, mean, { seed: 5 })).not.toEqual(bootstrapLimits(apart, mean, { seed: 6 }));
  });

  it('leaves out draws without a figure', () => {
    const { low, high } = bootstrapLimits(['a', 'b'], (weights) => (weights[0] === 0 ? Number.NaN : 1));
    expect([low, high]).toEqual([1, 1]);
  });
});
