import { describe, expect, it } from 'vitest';
import { createLombScargle } from '../../../worker/dsp/lombScargle.js';
import { highestAboveFloor } from '../../../worker/dsp/localFloor.js';
import { logChanceOfPeak, shuffledMaxima } from '../../../worker/dsp/shuffledMaxima.js';
import { seededNoise } from '../../support/seededNoise.js';
import { unevenStamps } from '../../support/unevenStamps.js';

describe('shuffledMaxima', () => {
  const times = unevenStamps('poisson', 600, 100);
  const periodogram = createLombScargle(times, 1 / 24, 2400);
  const law = shuffledMaxima(seededNoise(600, 1), periodogram, 24);

  // Source: largest of M exponentially distributed powers: location ln M, scale 1 (Gumbel 1958; Scargle 1982). 2400
  // frequencies, four per independent one: ln 600 = 6.4 to ln 2400 = 7.8.
  it('gives the law of largest values of white noise', () => {
    expect(law.location).toBeGreaterThan(6);
    expect(law.location).toBeLessThan(8.2);
    expect(law.scale).toBeGreaterThanOrEqual(1);
    expect(law.scale).toBeLessThan(1.8);
  });

  it('gives the same law for the same values', () => {
    expect(shuffledMaxima(seededNoise(600, 1), periodogram, 24)).toEqual(law);
  });

  it('calls peaks of other noise as rare as they are', () => {
    const chances = Array.from({ length: 40 }, (_, run) =>
      Math.exp(logChanceOfPeak(highestAboveFloor(periodogram(seededNoise(600, 50 + run))).ratio, law)),
    );
    expect(Math.min(...chances)).toBeGreaterThan(1e-3);
    const below = chances.filter((chance) => chance < 0.5).length;
    expect(below).toBeGreaterThan(6);
    expect(below).toBeLessThan(34);
  });

  it('falls without end for higher peaks', () => {
    expect(logChanceOfPeak(law.location + 500 * law.scale, law)).toBeCloseTo(-500, 6);
    expect(logChanceOfPeak(0, law)).toBeCloseTo(0, 3);
  });
});
