import { describe, expect, it } from 'vitest';
import { isPause } from '../../../worker/dsp/isPause.js';

const level = { mean: 0, rms: 1 };
const run = { value: 0, firstFrame: 1000, length: 500, stepIn: 0.01, stepOut: -0.02 };

describe('isPause', () => {
  it('takes a fade into the mean and out of it for a pause', () => {
    expect(isPause(run, level)).toBe(true);
  });
  it('takes a break from full swing to 0 for a dropout', () => {
    expect(isPause({ ...run, stepIn: 0.9 }, level)).toBe(false);
    expect(isPause({ ...run, stepOut: -0.8 }, level)).toBe(false);
  });
  it('takes a value held away from the mean for a dropout', () => {
    expect(isPause({ ...run, value: 0.7 }, level)).toBe(false);
  });
  it('takes silence of exactly 0 at the start or the end of the file for a pause, even where the signal sets in at once', () => {
    expect(isPause({ ...run, stepIn: Number.NaN, stepOut: 0.9 }, level)).toBe(true);
    expect(isPause({ ...run, stepIn: 0.9, stepOut: Number.NaN }, level)).toBe(true);
  });
  it('takes another value held to the end of the file after full swing for a dropout', () => {
    expect(isPause({ ...run, value: 0.01, stepIn: 0.9, stepOut: Number.NaN }, level)).toBe(false);
  });
});
