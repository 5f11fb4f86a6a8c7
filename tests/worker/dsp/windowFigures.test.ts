import { describe, expect, it } from 'vitest';
import { blackmanHarrisWindow } from '../../../worker/dsp/blackmanHarrisWindow.js';
import { hannWindow } from '../../../worker/dsp/hannWindow.js';
import { windowFigures } from '../../../worker/dsp/windowFigures.js';

describe('windowFigures', () => {
  // Source: Harris 1978, "On the use of windows for harmonic analysis", Table 1.
  it.each([
    ['Hann', hannWindow, 1.5, 1.42, 0.5],
    ['four-term Blackman-Harris', blackmanHarrisWindow, 2.0, 0.83, 0.36],
  ] as const)('agrees with Harris 1978 for the %s window', (_, make, noiseBandwidth, scalloping, gain) => {
    const figures = windowFigures(make(4096));
    expect(figures.noiseBandwidthBins).toBeCloseTo(noiseBandwidth, 2);
    expect(figures.scallopingLossDb).toBeCloseTo(scalloping, 2);
    expect(figures.coherentGain).toBeCloseTo(gain, 2);
  });

  it('makes Hann windows that add up to a constant at half overlap', () => {
    const window = hannWindow(64);
    for (let n = 0; n < 32; n++) expect((window[n] as number) + (window[n + 32] as number)).toBeCloseTo(1, 12);
  });

  it('refuses an empty window', () => {
    expect(() => hannWindow(0)).toThrow(RangeError);
    expect(() => blackmanHarrisWindow(0)).toThrow(RangeError);
    expect(hannWindow(1)).toEqual(Float64Array.of(0));
  });
});
