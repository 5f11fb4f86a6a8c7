import { describe, expect, it } from 'vitest';
import type { Tone } from '../../../shared/schemas/screening.js';
import { explainRest } from '../../../shared/screening/explainRest.js';
import { buildTone } from '../../support/buildRecord.js';

function explain(places: [number, number][], standsOutDb = 30): Tone[] {
  const measured = places.map(([frequencyHz, levelDb]) =>
    buildTone(frequencyHz, { levelDb, standsOutDb, boundHz: 1e-4, peaksPerHz: 0.005 }),
  );
  const tones = measured.map(({ frequencyHz, levelDb }): Tone => ({
    frequencyHz,
    levelDb,
    standsOutDb,
    uncertaintyHz: 1e-4,
    explanation: 'unexplained',
    confidence: 0,
  }));
  explainRest(tones, measured, 0.1, 10_000);
  return tones;
}

describe('explainRest', () => {
  it('explains the difference of the two strongest tones', () => {
    const tones = explain([
      [431.17, -10],
      [318.44, -12],
      [112.73, -50],
    ]);
    expect(tones[2]).toMatchObject({ explanation: 'harmonic', explainedBy: expect.stringMatching(/^intermodulation/) });
    expect(tones[2]?.chanceProbability).toBeLessThan(0.05);
  });

  it('explains nothing that stands elsewhere, or that is too strong for a product', () => {
    const elsewhere = explain([
      [431.17, -10],
      [318.44, -12],
      [115.2, -50],
    ]);
    const strong = explain([
      [431.17, -10],
      [318.44, -12],
      [112.73, -14],
    ]);
    expect(elsewhere[2]?.explanation).toBe('unexplained');
    expect(strong[2]?.explanation).toBe('unexplained');
  });

  // By hand: 10,000 bins, 10 dB over the floor: 10^4·exp(−10) = 0.454.
  it('states the chance that noise alone gives such a peak', () => {
    expect(explain([[200, -40]], 10)[0]?.chanceProbability).toBeCloseTo(0.454, 3);
    expect(explain([[200, -40]], 30)[0]?.chanceProbability).toBe(0);
  });
});
