import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  aliasHz,
  bandpassRates,
  candidatesHz,
  lowestProtectedRateHz,
  lowestRateHz,
  zoneOf,
} from '../../../shared/screening/foldArithmetic.js';

describe('aliasHz', () => {
  // Worked by hand: |f − fs·round(f/fs)|.
  it.each([
    [300, 1000, 300],
    [700, 1000, 300],
    [1300, 1000, 300],
    [1068.5, 2048, 979.5],
    [3027.5, 2048, 979.5],
    [4548, 5000, 452],
    [4548, 4096, 452],
    [500, 1000, 500],
    [1000, 1000, 0],
    [1500, 1000, 500],
  ])('folds %d Hz at %d Hz to %d Hz', (frequencyHz, rateHz, expected) => {
    expect(aliasHz(frequencyHz, rateHz)).toBeCloseTo(expected, 9);
  });

  it('gives the same frequency when applied twice, between 0 and fs/2', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 1e6, noNaN: true }),
        fc.double({ min: 1, max: 1e5, noNaN: true }),
        (f, fs) => {
          const once = aliasHz(f, fs);
          expect(once).toBeGreaterThanOrEqual(0);
          expect(once).toBeLessThanOrEqual(fs / 2 + 1e-9 * f);
          expect(aliasHz(once, fs)).toBeCloseTo(once, 6);
        },
      ),
    );
  });

  it('refuses a rate of 0', () => {
    expect(() => aliasHz(10, 0)).toThrow(RangeError);
    expect(aliasHz(10, 100)).toBe(10);
  });
});

describe('zoneOf', () => {
  it.each([
    [0, 1, 'none'],
    [100, 1, 'kept'],
    [500, 2, 'none'],
    [700, 2, 'mirrored'],
    [1000, 3, 'none'],
    [1300, 3, 'kept'],
    [1700, 4, 'mirrored'],
  ])('puts %d Hz at 1000 Hz into zone %d, direction %s', (frequencyHz, number, direction) => {
    expect(zoneOf(frequencyHz, 1000)).toEqual({ number, direction });
  });

  it('decides a boundary with a tolerance, not by bare floating point', () => {
    expect(zoneOf(3 * 0.1 * 1000, 600)).toEqual({ number: 2, direction: 'none' });
  });
});

describe('candidatesHz', () => {
  it('lists k·fs − f and k·fs + f in order', () => {
    expect(candidatesHz(300, 1000, 2800)).toEqual([300, 700, 1300, 1700, 2300, 2700]);
  });

  it('has no duplicates at 0 and at fs/2', () => {
    expect(candidatesHz(0, 1000, 2500)).toEqual([0, 1000, 2000]);
    expect(candidatesHz(500, 1000, 2600)).toEqual([500, 1500, 2500]);
  });

  it('lists only frequencies that alias to the one asked about', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 500, noNaN: true }), (f) => {
        for (const candidate of candidatesHz(f, 1000, 5000)) expect(aliasHz(candidate, 1000)).toBeCloseTo(f, 6);
      }),
    );
  });
});

describe('rates', () => {
  it('asks for more than twice the highest frequency, or F + Fs with a real filter', () => {
    expect(lowestRateHz(1000)).toBe(2000);
    expect(lowestProtectedRateHz(1000, 1600)).toBe(2600);
    expect(lowestProtectedRateHz(1000, 800)).toBe(2000);
  });

  // Vaughan, Scott & White 1991: a band of 20 to 25 Hz can be sampled from 10 Hz·(1 + …) on; ranges worked by hand.
  it('gives the bandpass ranges of a band from 20 to 25 Hz', () => {
    const ranges = bandpassRates(20, 25);
    expect(ranges[0]).toEqual({ n: 1, aboveHz: 50, belowHz: null, mirrored: false });
    expect(ranges[1]).toEqual({ n: 2, aboveHz: 25, belowHz: 40, mirrored: true });
    expect(ranges[2]).toMatchObject({ n: 3, belowHz: 20, mirrored: false });
    expect(ranges[3]).toMatchObject({ n: 4, aboveHz: 12.5, mirrored: true });
    // n = 5 leaves only the single rate 10 Hz, whose end points are excluded.
    expect(ranges).toHaveLength(4);
  });

  it('refuses an empty band', () => {
    expect(() => bandpassRates(25, 25)).toThrow(RangeError);
  });
});
