import { describe, expect, it } from 'vitest';
import { createChirpTransform } from '../../../worker/dsp/createChirpTransform.js';
import { createRealFft } from '../../../worker/dsp/createRealFft.js';
import { seededNoise } from '../../support/seededNoise.js';

describe('createChirpTransform', () => {
  it('agrees with the direct sum on a grid of any step, beyond half the rate too', () => {
    const samples = seededNoise(53, 3);
    const step = 0.0191;
    const found = createChirpTransform(60, 80, step).transform(samples);
    for (const k of [0, 1, 17, 40, 79]) {
      let [real, imaginary] = [0, 0];
      samples.forEach((value, n) => {
        real += value * Math.cos(2 * Math.PI * k * step * n);
        imaginary -= value * Math.sin(2 * Math.PI * k * step * n);
      });
      expect(found[2 * k]).toBeCloseTo(real, 9);
      expect(found[2 * k + 1]).toBeCloseTo(imaginary, 9);
    }
  });

  it('is the discrete Fourier transform for a step of 1/N', () => {
    const samples = seededNoise(64, 4);
    const expected = createRealFft(64).transform(samples);
    const found = createChirpTransform(64, 33, 1 / 64).transform(samples);
    for (let k = 0; k < 66; k++) expect(found[k]).toBeCloseTo(expected[k] as number, 9);
  });
});
