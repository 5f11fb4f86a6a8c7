import { describe, expect, it } from 'vitest';
import { WarpedTransform } from '../../../../worker/dsp/warp/WarpedTransform.js';
import { seededNoise } from '../../../support/seededNoise.js';

const length = 400;
const values = seededNoise(length, 3);
/** Uneven, unordered places, some beyond one turn. */
const places = seededNoise(length, 4).map((value, n) => n / length + 0.3 * value);

describe('WarpedTransform', () => {
  // The direct sum is the definition; the error bound is in the manner of Dutt & Rokhlin (1993), relative to the norm of the values.
  it('equals the direct sum to 1e-5 of the norm of its values', () => {
    const count = 600;
    const fast = new WarpedTransform(count).forward(places, values);
    const norm = Math.sqrt(values.reduce((sum, value) => sum + value * value, 0));
    for (let k = 0; k < count; k++) {
      let [re, im] = [0, 0];
      places.forEach((place, n) => {
        re += (values[n] as number) * Math.cos(2 * Math.PI * k * place);
        im -= (values[n] as number) * Math.sin(2 * Math.PI * k * place);
      });
      expect(Math.hypot(re - (fast[2 * k] as number), im - (fast[2 * k + 1] as number))).toBeLessThan(3e-5 * norm);
    }
  });

  it('goes back by the direct sum of its coefficients', () => {
    const count = 64;
    const coefficients = seededNoise(2 * count, 5);
    const fast = new WarpedTransform(count).backward(places, coefficients);
    places.forEach((place, n) => {
      let sum = 0;
      for (let k = 0; k < count; k++) {
        const angle = 2 * Math.PI * k * place;
        sum +=
          (coefficients[2 * k] as number) * Math.cos(angle) - (coefficients[2 * k + 1] as number) * Math.sin(angle);
      }
      expect(fast[n]).toBeCloseTo(sum, 3);
    });
  });

  it('gives the same again from the same object', () => {
    const transform = new WarpedTransform(100);
    expect(transform.forward(places, values)).toEqual(transform.forward(places, values));
  });
});
