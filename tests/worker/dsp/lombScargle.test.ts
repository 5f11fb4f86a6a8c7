import { describe, expect, it } from 'vitest';
import { lombScargle } from '../../../worker/dsp/lombScargle.js';
import { createNonUniformTransform, nonUniformTransform } from '../../../worker/dsp/nonUniformTransform.js';
import { readReference } from '../../support/readReference.js';
import { seededNoise } from '../../support/seededNoise.js';

interface LombScargleReference {
  timesS: number[];
  values: number[];
  stepHz: number;
  leastSquaresPower: number[];
  scipyPower: number[];
}

describe('lombScargle', () => {
  const reference = readReference<LombScargleReference>('lombScargle.json');
  const times = Float64Array.from(reference.timesS);
  const values = Float64Array.from(reference.values);
  const { power } = lombScargle(times, values, reference.stepHz, reference.leastSquaresPower.length);

  // Source: numpy.linalg.lstsq of sinusoid and constant, which the generalised periodogram is by definition.
  it('is the share of variance that a least-squares sinusoid with a constant explains', () => {
    power.forEach((value, k) => expect(value).toBeCloseTo(reference.leastSquaresPower[k] as number, 9));
  });

  // Source: scipy.signal.lombscargle (no floating mean): close, not equal.
  it("agrees with SciPy's classic periodogram at the highest peak", () => {
    const top = reference.scipyPower.indexOf(Math.max(...reference.scipyPower));
    expect(power.indexOf(Math.max(...power))).toBe(top);
    expect(power[top]).toBeCloseTo(reference.scipyPower[top] as number, 2);
  });

  it('is 0 for a constant and refuses three samples', () => {
    expect(Math.max(...lombScargle(times, new Float64Array(times.length).fill(2), 0.1, 50).power)).toBe(0);
    expect(() => lombScargle(times.slice(0, 3), values.slice(0, 3), 0.1, 5)).toThrow(RangeError);
  });
});

describe('nonUniformTransform', () => {
  it('agrees with the direct sum to 1e-9 of the peak at every frequency', () => {
    const count = 1500;
    const values = seededNoise(300, 2);
    const angles = seededNoise(300, 3).map((value) => 7 * value);
    const fast = nonUniformTransform(angles, values, count);
    let [worst, peak] = [0, 0];
    for (let k = 0; k < count; k++) {
      let [real, imaginary] = [0, 0];
      values.forEach((value, j) => {
        real += value * Math.cos(k * (angles[j] as number));
        imaginary -= value * Math.sin(k * (angles[j] as number));
      });
      worst = Math.max(worst, Math.hypot((fast[2 * k] as number) - real, (fast[2 * k + 1] as number) - imaginary));
      peak = Math.max(peak, Math.hypot(real, imaginary));
    }
    expect(worst / peak).toBeLessThan(1e-9);
  });

  it('serves many sets of values at the same angles', () => {
    const angles = Float64Array.from({ length: 40 }, (_, n) => 0.1 * n * n);
    const transform = createNonUniformTransform(angles, 64);
    const [first, second] = [seededNoise(40, 5), seededNoise(40, 6)];
    const before = transform(first);
    expect(transform(second)).toEqual(nonUniformTransform(angles, second, 64));
    expect(transform(first)).toEqual(before);
  });
});
