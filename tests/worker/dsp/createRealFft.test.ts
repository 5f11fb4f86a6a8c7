import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createRealFft } from '../../../worker/dsp/createRealFft.js';

describe('createRealFft', () => {
  it('turns an impulse into ones', () => {
    const spectrum = createRealFft(8).transform([1, 0, 0, 0, 0, 0, 0, 0]);
    for (let bin = 0; bin <= 4; bin++) {
      expect(spectrum[2 * bin]).toBeCloseTo(1, 12);
      expect(spectrum[2 * bin + 1]).toBeCloseTo(0, 12);
    }
  });

  it('puts an alternating signal into the bin at fs/2 and a constant into bin 0', () => {
    const fft = createRealFft(8);
    expect(fft.transform([1, -1, 1, -1, 1, -1, 1, -1])[8]).toBeCloseTo(8, 12);
    expect(fft.transform([1, 1, 1, 1, 1, 1, 1, 1])[0]).toBeCloseTo(8, 12);
  });

  it('keeps the energy (Parseval)', () => {
    fc.assert(
      fc.property(
        fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: 64, maxLength: 64 }),
        (samples) => {
          const spectrum = createRealFft(64).transform(samples);
          const energy = samples.reduce((sum, value) => sum + value * value, 0);
          let sum = 0;
          for (let bin = 0; bin <= 32; bin++) {
            const power = (spectrum[2 * bin] as number) ** 2 + (spectrum[2 * bin + 1] as number) ** 2;
            sum += (bin === 0 || bin === 32 ? 1 : 2) * power;
          }
          expect(sum / 64).toBeCloseTo(energy, 9);
        },
      ),
    );
  });

  it('keeps two sizes side by side', () => {
    const small = createRealFft(4);
    const large = createRealFft(16);
    const first = Float64Array.from(small.transform([1, 2, 3, 4]));
    large.transform(new Float64Array(16).fill(1));
    expect(Float64Array.from(small.transform([1, 2, 3, 4]))).toEqual(first);
  });

  it.each([0, 2, 3, 12, 4.5])('refuses the length %d', (size) => {
    expect(() => createRealFft(size)).toThrow(RangeError);
  });
});
