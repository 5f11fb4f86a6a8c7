import { describe, expect, it } from 'vitest';
import { coherenceChance } from '../../../shared/screening/coherenceChance.js';
import { seededNoise } from '../../support/seededNoise.js';

describe('coherenceChance', () => {
  it('has its 5 % level at 1 − 0.05^(1/(n−1)) for one input (Carter, Knapp & Nuttall 1973; Halliday et al. 1995)', () => {
    for (const n of [8, 32, 100]) {
      expect(coherenceChance(1 - 0.05 ** (1 / (n - 1)), n)).toBeCloseTo(0.05, 12);
    }
    // Halliday et al. 1995: 95 % limit of 100 segments, 1 − 0.05^(1/99) = 0.0298.
    expect(coherenceChance(0.0298, 100)).toBeCloseTo(0.05, 3);
  });

  it('is the share of unrelated Gaussian series that come out as high', () => {
    const n = 24;
    const runs = 4000;
    const noise = seededNoise(4 * n * runs, 11);
    let above = 0;
    for (let run = 0; run < runs; run++) {
      let [real, imaginary, first, second] = [0, 0, 0, 0];
      for (let k = 0; k < n; k++) {
        const at = 4 * (run * n + k);
        const [a, b, c, d] = [noise[at], noise[at + 1], noise[at + 2], noise[at + 3]] as [
          number,
          number,
          number,
          number,
        ];
        real += a * c + b * d;
        imaginary += a * d - b * c;
        first += a * a + b * b;
        second += c * c + d * d;
      }
      if ((real * real + imaginary * imaginary) / (first * second) > 0.12) above++;
    }
    const expected = coherenceChance(0.12, n);
    expect(Math.abs(above / runs - expected)).toBeLessThan(3.5 * Math.sqrt((expected * (1 - expected)) / runs));
  });

  it('grows with the number of inputs and falls with coherence', () => {
    expect(coherenceChance(0.2, 40, 3)).toBeGreaterThan(coherenceChance(0.2, 40, 1));
    expect(coherenceChance(0.3, 40, 3)).toBeLessThan(coherenceChance(0.2, 40, 3));
    expect(coherenceChance(1, 40)).toBe(0);
    expect(coherenceChance(0.9, 1)).toBe(1);
  });
});
