import { describe, expect, it } from 'vitest';
import { bispectralTest } from '../../../worker/dsp/bispectralTest.js';
import { bispectrumCells, bispectrumLength, BispectrumMeter } from '../../../worker/dsp/BispectrumMeter.js';
import { stationarityTest } from '../../../worker/dsp/stationarityTest.js';
import { lowPass, seededNoise } from '../../support/seededNoise.js';

const blocks = 150;
const frames = blocks * bispectrumLength;
const spectraOf = (samples: Float64Array) => {
  const meter = new BispectrumMeter(blocks);
  meter.push(samples, samples.length);
  return meter.spectra;
};
const chanceOf = (samples: Float64Array, triangle: 'inner' | 'outer') =>
  bispectralTest(spectraOf(samples), blocks, bispectrumCells(triangle), triangle)?.chance ?? 1;
const skewed = (count: number, seed: number) => seededNoise(count, seed).map((value) => value * value - 1);
const everySecond = (samples: Float64Array) => samples.filter((_, n) => n % 2 === 0);

describe('bispectralTest', () => {
  it('alarms on steady Gaussian noise no more often than stated', () => {
    const alarms = Array.from({ length: 60 }, (_, run) => chanceOf(seededNoise(frames, run + 1), 'outer')).filter(
      (chance) => chance < 0.05,
    );
    // 60 runs at 5 %: more than 7 by chance in 1 % of such tests.
    expect(alarms.length).toBeLessThanOrEqual(7);
  });

  it('finds the outer triangle filled where skewed noise was sampled without a filter, and empty behind one', () => {
    // Hinich & Wolinsky 1988: an unaliased stationary signal has no bispectrum there.
    const loose = everySecond(lowPass(skewed(2 * frames + 300, 3), 0.45)).slice(100);
    const filtered = everySecond(lowPass(skewed(2 * frames + 300, 3), 0.19)).slice(100);
    expect(chanceOf(loose, 'outer')).toBeLessThan(1e-6);
    expect(chanceOf(loose, 'inner')).toBeLessThan(1e-6);
    expect(chanceOf(filtered, 'inner')).toBeLessThan(1e-6);
    expect(chanceOf(filtered, 'outer')).toBeGreaterThan(1e-3);
  });

  it('says nothing where too few bins hold power', () => {
    const narrow = lowPass(seededNoise(frames + 200, 2), 0.05).slice(140);
    expect(bispectralTest(spectraOf(narrow), blocks, bispectrumCells('outer'), 'outer')).toBeNull();
  });

  it('gives the same answer every time, at any scale, and in blocks of any length', () => {
    const noise = skewed(frames, 9);
    const whole = spectraOf(noise);
    const meter = new BispectrumMeter(blocks);
    for (let first = 0; first < frames; first += 1000)
      meter.push(noise.subarray(first, first + 1000), Math.min(1000, frames - first));
    expect(meter.spectra).toEqual(whole);
    const large = chanceOf(
      noise.map((value) => 1024 * value),
      'outer',
    );
    expect(large).toBeCloseTo(chanceOf(noise, 'outer'), 9);
  });

  it('holds cells whose frequencies add up within the band, or to the sampling rate', () => {
    expect(bispectrumCells('inner').every(({ j, k, l }) => j + k === l)).toBe(true);
    expect(bispectrumCells('outer').every(({ j, k, l }) => j + k + l === bispectrumLength && l > j && j > k)).toBe(
      true,
    );
  });
});

describe('stationarityTest', () => {
  it('tells noise that grows louder from steady noise, Gaussian or skewed', () => {
    const noise = seededNoise(frames, 4);
    const rising = noise.map((value, n) => value * (1 + (0.5 * n) / frames));
    expect(stationarityTest(spectraOf(noise), blocks)).toBeGreaterThan(0.01);
    expect(stationarityTest(spectraOf(skewed(frames, 5)), blocks)).toBeGreaterThan(0.01);
    expect(stationarityTest(spectraOf(rising), blocks)).toBeLessThan(1e-4);
  });
});
