import { describe, expect, it } from 'vitest';
import { resampleUniform } from '../../../worker/dsp/resampleUniform.js';

const tone = (frequencyHz: number, rateHz: number, startS: number, count: number): Float64Array =>
  Float64Array.from({ length: count }, (_, n) => Math.sin(2 * Math.PI * frequencyHz * (startS + n / rateHz)));

describe('resampleUniform', () => {
  it('gives a tone in the pass band at the new times within 1e-4', () => {
    const found = resampleUniform(tone(310, 5000, 0, 10_000), 5000, 0.01234, 1111, 1800, 400);
    const expected = tone(310, 1111, 0.01234, 1800);
    // The ends lack samples on one side.
    for (let m = 100; m < 1700; m++)
      expect(Math.abs((found[m] as number) - (expected[m] as number))).toBeLessThan(1e-4);
  });

  it('takes out what lies above the corner', () => {
    const found = resampleUniform(tone(700, 5000, 0, 10_000), 5000, 0, 1111, 2000, 500);
    expect(Math.max(...found.subarray(100, 1900).map(Math.abs))).toBeLessThan(2e-3);
  });

  it('refuses a corner beyond half the rate', () => {
    expect(() => resampleUniform(tone(1, 100, 0, 10), 100, 0, 100, 5, 51)).toThrow(RangeError);
    expect(resampleUniform(tone(1, 100, 0, 10), 100, 0, 100, 5, 50)).toHaveLength(5);
  });
});
