import { describe, expect, it } from 'vitest';
import { digitalCliff, findCliff, oldBandEnd } from '../../../worker/dsp/findCliff.js';

const bins = 2049;
/** Density of white noise behind |H|², with a floor, resolution 1 Hz. */
const through = (gain: (hz: number) => number, floor = 1e-9) =>
  Float64Array.from({ length: bins }, (_, bin) => gain(bin) + floor);
const brick = (edge: number) => (hz: number) => (hz < edge ? 1 : 0);
/** Butterworth 1930: |H|² = 1/(1 + (f/fc)^2N). */
const butterworth = (order: number, corner: number) => (hz: number) => 1 / (1 + (hz / corner) ** (2 * order));
/** Chebyshev I, 0.5 dB ripple. */
const chebyshev = (order: number, corner: number) => (hz: number) => {
  const x = hz / corner;
  const t = x <= 1 ? Math.cos(order * Math.acos(x)) : Math.cosh(order * Math.acosh(x));
  return 1 / (1 + (10 ** 0.05 - 1) * t * t);
};

describe('findCliff', () => {
  it('finds where a digital low-pass ends the content', () => {
    expect(findCliff(through(brick(900)), 1)?.edgeHz).toBeCloseTo(900, -1);
    expect(findCliff(through(brick(461)), 1)?.edgeHz).toBeCloseTo(461, -1);
  });

  it('finds none where a filter before a converter falls, nor in flat noise, nor next to fs/2', () => {
    expect(findCliff(through(butterworth(8, 600)), 1)).toBeNull();
    expect(findCliff(through(chebyshev(8, 700)), 1)).toBeNull();
    expect(
      findCliff(
        through(() => 1),
        1,
      ),
    ).toBeNull();
    expect(findCliff(through(brick(1800)), 1, digitalCliff)).toBeNull();
  });

  it('does not take a gap in the middle of the band for its end', () => {
    expect(
      findCliff(
        through((hz) => (hz < 500 || hz > 700 ? 1 : 0)),
        1,
      ),
    ).toBeNull();
  });

  it('looks for a gentler end below an old folding frequency', () => {
    const soft = through((hz) => (hz < 1700 ? 1 : 10 ** (-(hz - 1700) / 60)));
    expect(findCliff(soft, 1, oldBandEnd)?.edgeHz).toBeGreaterThan(1690);
    expect(findCliff(soft, 1, oldBandEnd)?.edgeHz).toBeLessThan(1760);
  });
});
