import { describe, expect, it } from 'vitest';
import { edgeFollowsSource } from '../../../worker/dsp/edgeFollowsSource.js';
import { seededNoise } from '../../support/seededNoise.js';

const frames = 200;
const inband = Float64Array.from({ length: frames }, (_, n) => 1 + 20 * Math.exp(-(n % 40) / 8));
const scatter = seededNoise(frames, 8).map((value) => 1 + 0.15 * value);

describe('edgeFollowsSource', () => {
  it('finds an edge that follows the signal', () => {
    const edge = inband.map((value, n) => (0.02 * value + 0.001) * (scatter[n] as number));
    const result = edgeFollowsSource(edge, inband);
    expect(result?.slope).toBeCloseTo(0.02, 2);
    expect((result?.slope ?? 0) / (result?.slopeError ?? 1)).toBeGreaterThan(10);
    expect(result?.followingShareDb).toBeGreaterThan(-1);
  });

  it('finds no slope under a steady floor', () => {
    const result = edgeFollowsSource(scatter, inband);
    expect((result?.slope ?? 0) / (result?.slopeError ?? 1)).toBeLessThan(2.5);
  });

  it('says nothing with few frames or without a signal', () => {
    expect(edgeFollowsSource([1, 2, 3], [1, 2, 3])).toBeNull();
    expect(edgeFollowsSource(new Float64Array(20), new Float64Array(20))).toBeNull();
  });
});
