import { describe, expect, it } from 'vitest';
import { commonTimeStep } from '../../../worker/dsp/commonTimeStep.js';
import { unevenStamps } from '../../support/unevenStamps.js';
import { seededUniform } from '../../support/seededUniform.js';

const cumulate = (steps: number[]): Float64Array => {
  let now = 0;
  return Float64Array.from([0, ...steps], (step) => (now += step));
};
const rounded = (timesS: Float64Array, stepS: number): Float64Array =>
  timesS.map((time) => Number((Math.round(time / stepS) * stepS).toFixed(12)));

describe('commonTimeStep', () => {
  // Source: Eyer & Bartholdi 1999: all intervals are multiples of p, so that the spectrum repeats with 1/p and the
  // effective folding frequency is 1/(2p), whatever the least or the mean interval.
  it.each([
    ['an even grid', [1, 1, 1, 1, 1], 1],
    ['intervals 2 and 3', [2, 3, 3, 2, 3, 2, 2], 1],
    ['intervals 4, 6 and 10', [4, 6, 10, 4, 6, 10, 6], 2],
    ['intervals 6, 10 and 15', [6, 10, 15, 6, 15, 10, 10], 1],
  ])('finds the step behind %s', (_, steps, step) => {
    const many = Array.from({ length: 60 }, () => steps).flat();
    expect(commonTimeStep(cumulate(many), 0)).toBeCloseTo(step, 9);
    expect(commonTimeStep(cumulate(many.map((value) => 0.00271828 * value)), 0)).toBeCloseTo(0.00271828 * step, 9);
  });

  it('finds it through rounding of the stamps, however long the capture', () => {
    const random = seededUniform(4);
    const times = cumulate(Array.from({ length: 8000 }, () => 0.0061803 * (1 + Math.floor(4 * random()))));
    for (const roundingStepS of [1e-7, 1e-5, 1e-4, 1e-3]) {
      expect(commonTimeStep(rounded(times, roundingStepS), roundingStepS)).toBeCloseTo(0.0061803, 6);
    }
  });

  it('finds the grid under bursts and missing rows', () => {
    for (const kind of ['evenBursts', 'missing'] as const) {
      const times = unevenStamps(kind, 2000, 100);
      const step = commonTimeStep(times, 1e-7) ?? Number.NaN;
      const worst = times.reduce((most, time) => Math.max(most, Math.abs(time / step - Math.round(time / step))), 0);
      expect(worst).toBeLessThan(0.01);
      expect(step).toBeGreaterThan(1e-3);
    }
  });

  it('is the rounding step itself where nothing coarser fits, and null for exact stamps without any', () => {
    expect(commonTimeStep(unevenStamps('poisson', 500, 100), 1e-7)).toBeCloseTo(1e-7, 12);
    const random = seededUniform(9);
    expect(commonTimeStep(cumulate(Array.from({ length: 300 }, () => 0.5 + random())), 0)).toBeNull();
  });
});
