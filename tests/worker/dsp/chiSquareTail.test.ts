import { describe, expect, it } from 'vitest';
import { chiSquareTail } from '../../../worker/dsp/chiSquareTail.js';

/** scipy.stats.chi2.sf of SciPy 1.17.1. */
const published = [
  [3, 4, 0.5578254004],
  [12, 5, 0.03478778051],
  [30, 20, 0.0698536607],
  [55, 20, 4.106143275e-5],
  [120, 100, 0.08440668109],
  [160, 80, 2.808721626e-7],
] as const;

describe('chiSquareTail', () => {
  it.each(published)('P(X ≥ %d) with %d degrees agrees with SciPy', (value, degrees, expected) => {
    // Wilson & Hilferty's cube root is an approximation: some 12 % off far out.
    expect(chiSquareTail(value, degrees) / expected).toBeGreaterThan(0.85);
    expect(chiSquareTail(value, degrees) / expected).toBeLessThan(1.15);
  });

  it('is 1 at and below 0 and falls steadily', () => {
    expect(chiSquareTail(0, 3)).toBe(1);
    const values = Array.from({ length: 60 }, (_, n) => chiSquareTail(n + 0.5, 6));
    expect(values.every((value, n) => n === 0 || value < (values[n - 1] as number))).toBe(true);
  });
});
