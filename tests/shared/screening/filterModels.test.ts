import { describe, expect, it } from 'vitest';
import type { AntiAliasFilter } from '../../../shared/schemas/acquisitionSheet.js';
import {
  aliasProtectionDb,
  magnitudeSquared,
  stopbandEnvelope,
  stopbandStartHz,
} from '../../../shared/screening/filterModels.js';
import { readReference } from '../../support/readReference.js';

interface FilterReference {
  frequencyHz: number[];
  cases: (AntiAliasFilter & { magnitudeSquared: number[] })[];
}

describe('magnitudeSquared', () => {
  const reference = readReference<FilterReference>('filters.json');

  // Source: scipy.signal.butter, cheby1 and ellip, analog.
  it.each(reference.cases)(
    'agrees with SciPy for $type of order $order',
    ({ magnitudeSquared: expected, ...filter }) => {
      reference.frequencyHz.forEach((frequencyHz, index) => {
        const here = 10 * Math.log10(magnitudeSquared(filter, frequencyHz) ?? Number.NaN);
        expect(here).toBeCloseTo(10 * Math.log10(expected[index] as number), 2);
      });
    },
  );

  it('knows nothing without order or corner, and takes nothing off for none', () => {
    expect(magnitudeSquared({ type: 'butterworth', order: 4 }, 10)).toBeNull();
    expect(magnitudeSquared({ type: 'unknown', order: 4, cornerHz: 10 }, 10)).toBeNull();
    expect(magnitudeSquared({ type: 'none' }, 1e6)).toBe(1);
  });
});

describe('stopbandEnvelope', () => {
  it('counts on no zero between the ripples of an elliptic filter', () => {
    const filter: AntiAliasFilter = { type: 'elliptic', order: 5, cornerHz: 100, rippleDb: 0.5, stopbandDb: 60 };
    for (let f = 300; f < 3000; f += 7) expect(stopbandEnvelope(filter, f)).toBeGreaterThanOrEqual(0.99e-6);
  });
});

describe('aliasProtectionDb', () => {
  it('is the distance to the first image for a steep filter', () => {
    // By hand: order 8, fc 100: at 100 Hz −3.01 dB; image at 300 Hz −76.3 dB; image at 500 Hz below −111 dB.
    const protection = aliasProtectionDb({ type: 'butterworth', order: 8, cornerHz: 100 }, 100, 400);
    expect(protection).toBeCloseTo(-3.01 + 16 * 10 * Math.log10(3), 1);
  });

  it('is below 0 dB without a filter, as all images count', () => {
    expect(aliasProtectionDb({ type: 'none' }, 100, 400)).toBeLessThan(0);
  });
});

describe('stopbandStartHz', () => {
  it('finds where a Butterworth filter reaches the protection', () => {
    const start = stopbandStartHz({ type: 'butterworth', order: 8, cornerHz: 1000 }, 80);
    expect(start).toBeCloseTo(1000 * (10 ** 8 - 1) ** (1 / 16), 1);
  });

  it('is null when an elliptic stop band never gets there', () => {
    expect(stopbandStartHz({ type: 'elliptic', order: 5, cornerHz: 100, stopbandDb: 60 }, 80)).toBeNull();
  });
});
