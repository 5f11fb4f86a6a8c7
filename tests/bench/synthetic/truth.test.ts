import { describe, expect, it } from 'vitest';
import { seededNoise } from '../../support/seededNoise.js';
import bessels from '../reference/bessel.json' with { type: 'json' };
import { meanPower } from './drawing.js';
import { bessel, butterworth, firDecimator, noFilter } from './filterGains.js';
import { isVisibleAt } from './isVisibleAt.js';
import { renderComponents, steady, uniformTimes } from './renderComponents.js';
import { foldedDensity, sampleFast } from './sampleFast.js';
import { trueClearToHz } from './trueClearToHz.js';
import { truthOf } from './truthOf.js';

const count = 4096;
const sine = (binHz: number, amplitude: number): Float64Array =>
  Float64Array.from({ length: count }, (_, n) => amplitude * Math.sin((2 * Math.PI * binHz * n) / count));
const silence = new Float64Array(count);

describe('truthOf', () => {
  it('sets folded against the whole, noise included', () => {
    // Powers 1/2, 1/200, 1/20000: −20 dB less the little that the others add.
    const truth = truthOf({ rightful: sine(300, 1), folded: sine(700, 0.1), noise: sine(1500, 0.01) });
    expect(truth.foldRatioDb).toBeCloseTo(10 * Math.log10(0.01 / 1.0101), 6);
    expect(truth.label).toBe('folded');
    expect(truth.foldRatioInnerDb).toBeCloseTo(truth.foldRatioDb, 3);
  });

  it.each([
    [0.1, 'folded'],
    [1e-3, 'grey'],
    [1e-4, 'clean'],
  ])('labels an amplitude ratio of %f as %s', (amplitude, label) => {
    expect(truthOf({ rightful: sine(300, 1), folded: sine(700, amplitude), noise: silence }).label).toBe(label);
  });

  it('does not call folded what lands in the top tenth only', () => {
    expect(truthOf({ rightful: sine(300, 1), folded: sine(1990, 0.1), noise: silence }).label).toBe('grey');
  });

  it('gives each tenth of the band its own ratio', () => {
    const { bandFoldDb } = truthOf({ rightful: sine(300, 1), folded: sine(700, 0.1), noise: silence });
    expect(bandFoldDb).toHaveLength(10);
    expect(bandFoldDb[1]).toBeLessThan(-60);
    expect(bandFoldDb[3]).toBeCloseTo(0, 1);
  });
});

describe('isVisibleAt', () => {
  it('sees a line above the noise and none where there is none', () => {
    const noise = seededNoise(count, 4);
    const samples = sine(900, 1).map((value, n) => value + 0.5 * (noise[n] as number));
    expect(isVisibleAt(samples, count, [900, 1400, null])).toEqual([true, false, false]);
  });
});

describe('renderComponents', () => {
  it('puts a sinusoid to the folded part at and beyond fs/2, and says where it lands', () => {
    const times = uniformTimes(1000, 1000);
    const { rightful, folded, tones } = renderComponents([steady(100, 1, 0), steady(620, 0.5, 0)], times, 1000);
    expect(meanPower(rightful)).toBeCloseTo(0.5, 6);
    expect(meanPower(folded)).toBeCloseTo(0.125, 6);
    expect(tones).toHaveLength(1);
    expect(tones[0]?.trueHz).toBeCloseTo(620, 9);
    // alias(f, fs) = |f − fs·round(f/fs)|
    expect(tones[0]?.foldedHz).toBeCloseTo(380, 9);
    expect(tones[0]?.levelDb).toBeCloseTo(10 * Math.log10(0.125), 4);
  });

  it('gives no place to one that moves', () => {
    const sweep = {
      phase: (t: number): number => 2 * Math.PI * (400 * t + 100 * t * t),
      frequencyHz: (t: number): number => 400 + 200 * t,
      amplitude: (): number => 1,
    };
    const { tones, rightful, folded } = renderComponents([sweep], uniformTimes(1000, 1000), 1000);
    expect(tones[0]?.foldedHz).toBeNull();
    // Below fs/2 for the first half second, beyond it for the second.
    expect(rightful.slice(500).every((value) => value === 0)).toBe(true);
    expect(folded.slice(0, 500).every((value) => value === 0)).toBe(true);
  });
});

describe('sampleFast', () => {
  it('is plain picking of every eighth sample, split in two', () => {
    const original = seededNoise(8 * 512, 5);
    const mean = original.reduce((sum, value) => sum + value, 0) / original.length;
    const { rightful, folded } = sampleFast(original, 1000, noFilter);
    // The transform leaves out 0 Hz and the fastest rate's own folding frequency.
    const top = original.reduce((sum, value, n) => sum + (n % 2 === 0 ? value : -value), 0) / original.length;
    rightful.forEach((value, n) => {
      expect(value + (folded[n] as number)).toBeCloseTo((original[8 * n] as number) - mean - top, 9);
    });
    // White noise over eight times the band: seven eighths come from beyond fs/2.
    expect(meanPower(folded) / meanPower(rightful)).toBeGreaterThan(5.5);
    expect(meanPower(folded) / meanPower(rightful)).toBeLessThan(8.5);
  });

  it('lets a filter take off what would fold', () => {
    const { rightful, folded } = sampleFast(seededNoise(8 * 512, 6), 1000, firDecimator(300, 499, 1000));
    expect(10 * Math.log10(meanPower(folded) / meanPower(rightful))).toBeLessThan(-70);
  });

  it('has the density that foldedDensity states', () => {
    const density = foldedDensity(1000, butterworth(1, 250));
    // fs/2 collects every odd multiple twice: 2·Σ 1/(1 + ((2j+1)·2)²), j = 0 … 3.
    const expected = [1, 3, 5, 7].reduce((sum, odd) => sum + 2 / (1 + (2 * odd) ** 2), 0);
    expect(density(500)).toBeCloseTo(expected, 9);
  });
});

describe('filter gains', () => {
  // scipy.signal.bessel(norm="mag"); see reference/makeReference.py.
  it.each(bessels.cases)('Bessel of order $order agrees with SciPy', ({ order, magnitude }) => {
    const { gain } = bessel(order, bessels.cornerHz);
    bessels.frequencyHz.forEach((hz, n) => expect(gain(hz) / (magnitude[n] as number)).toBeCloseTo(1, 6));
  });

  it('an FIR decimator passes, stops, and halves between', () => {
    const { gain } = firDecimator(300, 500, 1000);
    expect(gain(100)).toBeCloseTo(1, 3);
    expect(gain(400)).toBeCloseTo(0.5, 1);
    expect(20 * Math.log10(gain(520))).toBeLessThan(-80);
  });
});

describe('trueClearToHz', () => {
  // 1001 steps of 1 Hz, fs = 2000: 60 dB over the edge up to 400 Hz, 20 dB above.
  const density = Float64Array.from({ length: 1001 }, (_, hz) => (hz <= 400 ? 1e6 : 100));

  it('ends where the smoothed density comes within the protection', () => {
    // Smoothed over 50 Hz it holds 40 dB until half a per cent of the window is left: within a window of 400 Hz.
    const clearTo = trueClearToHz(density, 1, 2000, 40);
    expect(clearTo).toBeGreaterThan(400);
    expect(clearTo).toBeLessThanOrEqual(425);
  });

  it('stops at the first valley and is 0 where nothing is protected', () => {
    const broken = density.map((value, hz) => (hz >= 100 && hz < 180 ? 1 : value));
    expect(trueClearToHz(broken, 1, 2000, 40)).toBeLessThan(130);
    expect(trueClearToHz(density, 1, 2000, 70)).toBe(0);
  });
});
