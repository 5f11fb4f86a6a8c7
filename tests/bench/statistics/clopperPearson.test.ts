import { describe, expect, it } from 'vitest';
import reference from '../reference/shares.json' with { type: 'json' };
import { clopperPearson } from './clopperPearson.js';
import { incompleteBeta } from './incompleteBeta.js';
import { logGamma } from './logGamma.js';

describe('clopperPearson', () => {
  // NIST/SEMATECH e-Handbook of Statistical Methods, 7.2.4.1: 4 defectives in 20, 90 % two-sided: 0.071354 to 0.401029.
  it('gives the limits of the NIST handbook', () => {
    const { low, high } = clopperPearson(4, 20, 0.05);
    expect(low).toBeCloseTo(0.071354, 6);
    // The handbook's last digit differs from SciPy's 0.4010281 in the sixth place.
    expect(high).toBeCloseTo(0.401029, 5);
  });

  // scipy.stats.beta.ppf; see reference/makeReference.py.
  it.each(reference.limits)('agrees with SciPy for $count of $total at $tail', ({ count, total, tail, low, high }) => {
    const limits = clopperPearson(count, total, tail);
    expect(limits.low).toBeCloseTo(low, 10);
    expect(limits.high).toBeCloseTo(high, 10);
  });

  it('is 1 − tail^(1/n) when nothing was seen', () => {
    expect(clopperPearson(0, 300, 0.05).high).toBeCloseTo(1 - 0.05 ** (1 / 300), 12);
    expect(clopperPearson(0, 300, 0.05).low).toBe(0);
  });

  it('knows nothing from nothing', () => {
    expect(clopperPearson(0, 0)).toEqual({ low: 0, high: 1 });
  });
});

describe('incompleteBeta', () => {
  // scipy.special.betainc; see reference/makeReference.py.
  it.each(reference.incompleteBeta)('agrees with SciPy at $x, $a, $b', ({ x, a, b, value }) => {
    expect(incompleteBeta(x, a, b)).toBeCloseTo(value, 12);
  });

  it('is 1 − (1 − x)^b for a = 1 (DLMF 8.17.8) and 0 and 1 at the ends', () => {
    expect(incompleteBeta(0.3, 1, 4)).toBeCloseTo(1 - 0.7 ** 4, 14);
    expect(incompleteBeta(0, 2, 3)).toBe(0);
    expect(incompleteBeta(1, 2, 3)).toBe(1);
  });
});

describe('logGamma', () => {
  // scipy.special.gammaln; see reference/makeReference.py.
  it.each(reference.logGamma)('agrees with SciPy at $x', ({ x, value }) => {
    expect(logGamma(x)).toBeCloseTo(value, 10);
  });
});
