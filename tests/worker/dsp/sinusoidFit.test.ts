import { describe, expect, it } from 'vitest';
import { sinusoidFit, sinusoidModel } from '../../../worker/dsp/sinusoidFit.js';
import { seededNoise } from '../../support/seededNoise.js';
import { unevenStamps } from '../../support/unevenStamps.js';

const samples = 1000;
const centred = (times: Float64Array): Float64Array => times.map((time) => time - (times[samples - 1] as number) / 2);
const times = centred(unevenStamps('largeJitter', samples, 100));
const wave = (at: Float64Array, hz: number, amplitude: number, phase: number): Float64Array =>
  at.map((time) => amplitude * Math.cos(2 * Math.PI * hz * time + phase));
const sum = (...parts: Float64Array[]): Float64Array =>
  (parts[0] as Float64Array).map((_, n) => parts.reduce((total, part) => total + (part[n] as number), 0));

describe('sinusoidFit', () => {
  const values = sum(wave(times, 13.37, 1, 0.4), wave(times, 13.52, 0.5, 1.9), wave(times, 81.1, 0.2, 3)).map(
    (value) => value + 7,
  );

  it('moves all frequencies together onto the exact ones, close tones and tones beyond half the mean rate', () => {
    const fit = sinusoidFit(times, values, [13.36, 13.53, 81.12], { steps: 12, mostShiftHz: 0.02 });
    [13.37, 13.52, 81.1].forEach((hz, index) => expect(fit.frequenciesHz[index]).toBeCloseTo(hz, 8));
    expect(fit.constant).toBeCloseTo(7, 8);
    expect(Math.hypot(fit.cosines[1] as number, fit.sines[1] as number)).toBeCloseTo(0.5, 7);
    expect(Math.max(...fit.residual.map(Math.abs))).toBeLessThan(1e-6);
    const model = sinusoidModel(times, fit);
    expect(Math.max(...model.map((value, n) => Math.abs(value - (values[n] as number))))).toBeLessThan(1e-6);
  });

  it('keeps the frequencies without steps, and stays finite where two are the same', () => {
    const fit = sinusoidFit(times, values, [13.37, 13.37]);
    expect(fit.frequenciesHz).toEqual([13.37, 13.37]);
    expect(fit.cosines.every(Number.isFinite)).toBe(true);
  });

  // Source: Kay 1993, eq. 3.41: var(f) = 12·fs²/(4π²·η·N·(N²−1)), η = A²/(2σ²), on an even grid.
  it('states the Cramér-Rao bound', () => {
    const even = centred(Float64Array.from({ length: samples }, (_, n) => n / 100));
    const { spreadHz } = sinusoidFit(even, wave(even, 13.37, 0.5, 0.4), [13.3701], { steps: 2, mostShiftHz: 0.01 });
    const bound = Math.sqrt((12 * 100 ** 2) / (4 * Math.PI ** 2 * (0.5 ** 2 / 2) * samples * (samples ** 2 - 1)));
    // The formula leaves out terms of order 1/N.
    expect((spreadHz[0] as number) / bound).toBeCloseTo(1, 2);
  });

  it('scatters by the bound that it states', () => {
    const noise = 0.5;
    const errors = Array.from({ length: 60 }, (_, run) => {
      const noisy = sum(
        wave(times, 81.1, 1, run),
        seededNoise(samples, 100 + run).map((value) => noise * value),
      );
      const fit = sinusoidFit(times, noisy, [81.1], { steps: 4, mostShiftHz: 0.02 });
      return ((fit.frequenciesHz[0] as number) - 81.1) / (noise * (fit.spreadHz[0] as number));
    });
    const rms = Math.sqrt(errors.reduce((total, error) => total + error * error, 0) / errors.length);
    expect(rms).toBeGreaterThan(0.8);
    expect(rms).toBeLessThan(1.25);
  });
});
