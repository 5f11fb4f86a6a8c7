import { describe, expect, it } from 'vitest';
import { FrameBank } from '../../../worker/dsp/FrameBank.js';

/** x(t) = cos(2π·f·t + 0.7) sampled from `startS` on. */
const cosine = (frequencyHz: number, rateHz: number, startS: number, count: number): Float64Array =>
  Float64Array.from({ length: count }, (_, n) => Math.cos(2 * Math.PI * frequencyHz * (startS + n / rateHz) + 0.7));

describe('FrameBank', () => {
  it('gives half the amplitude and the phase on the common clock', () => {
    const frames = new FrameBank(cosine(120, 1000, -0.3, 3000), 1000, -0.3, [0.5, 1, 1.5], 0.5).at(120);
    for (let k = 0; k < 3; k++) {
      expect(frames[2 * k]).toBeCloseTo(0.5 * Math.cos(0.7), 6);
      expect(frames[2 * k + 1]).toBeCloseTo(0.5 * Math.sin(0.7), 6);
    }
  });

  it('sees a frequency beyond half of either rate alike at both', () => {
    const slow = new FrameBank(cosine(1733, 1000, 0, 3000), 1000, 0, [0.5, 1.2], 0.5).at(1733);
    const fast = new FrameBank(cosine(1733, 1300, 0.0213, 3900), 1300, 0.0213, [0.5, 1.2], 0.5).at(1733);
    slow.forEach((value, index) => expect(fast[index]).toBeCloseTo(value, 6));
  });
});
