import { describe, expect, it } from 'vitest';
import { cramerRaoHz } from '../../../worker/dsp/cramerRaoHz.js';
import { refineTones } from '../../../worker/dsp/refineTones.js';
import { ToneDemodulator } from '../../../worker/dsp/ToneDemodulator.js';
import { seededNoise } from '../../support/seededNoise.js';

const fs = 1000;
const count = 4096;

function refine(samples: Float64Array, startsHz: number[]): { frequencyHz: number; power: number }[] {
  const omegas = startsHz.map((hz) => (2 * Math.PI * hz) / fs);
  const demodulator = new ToneDemodulator(omegas, 64, count / 64);
  demodulator.push(samples, count, 0, 0);
  return refineTones(demodulator, (2 * Math.PI * 1.2) / fs).map(({ delta, amplitude }, index) => ({
    frequencyHz: (((omegas[index] as number) + delta) * fs) / (2 * Math.PI),
    power: 2 * (amplitude.real ** 2 + amplitude.imaginary ** 2),
  }));
}

describe('refineTones', () => {
  it('finds frequency and power of a clean tone', () => {
    const samples = Float64Array.from(
      { length: count },
      (_, n) => 0.5 * Math.sin((2 * Math.PI * 123.456 * n) / fs + 0.3),
    );
    const [tone] = refine(samples, [123]);
    expect(tone?.frequencyHz).toBeCloseTo(123.456, 5);
    expect(tone?.power).toBeCloseTo(0.125, 6);
  });

  it('separates two tones 1.5 bins apart', () => {
    const other = 200 + (1.5 * fs) / count;
    const samples = Float64Array.from(
      { length: count },
      (_, n) => Math.sin((2 * Math.PI * 200 * n) / fs) + 0.6 * Math.cos((2 * Math.PI * other * n) / fs + 1),
    );
    const tones = refine(samples, [200.05, other - 0.05]);
    expect(tones[0]?.frequencyHz).toBeCloseTo(200, 2);
    expect(tones[1]?.frequencyHz).toBeCloseTo(other, 2);
  });

  // Source: Kay 1993, "Fundamentals of Statistical Signal Processing", example 3.14: the bound for a real tone in white noise.
  it('reaches the Cramér-Rao bound within 1 dB at 20 dB SNR', () => {
    const runs = 120;
    const amplitude = Math.sqrt(2);
    const sigma = 0.1;
    let sum = 0;
    for (let run = 0; run < runs; run++) {
      const noise = seededNoise(count, 100 + run);
      const samples = noise.map(
        (value, n) => sigma * value + amplitude * Math.sin((2 * Math.PI * 217.3 * n) / fs + run),
      );
      const [tone] = refine(samples, [217.1]);
      sum += ((tone?.frequencyHz ?? 0) - 217.3) ** 2;
    }
    const boundHz = cramerRaoHz(1 / ((2 * sigma * sigma) / fs), count, fs);
    const ratioDb = 20 * Math.log10(Math.sqrt(sum / runs) / boundHz);
    // 120 runs leave ±0.6 dB of chance.
    expect(Math.abs(ratioDb)).toBeLessThan(1.3);
  });
});

describe('cramerRaoHz', () => {
  // By hand: η = 100, N = 1000, fs = 1000: var = 12e6/(4π²·100·1000·(1e6−1)) → 1.743 mHz.
  it('agrees with the formula worked by hand', () => {
    const density = 0.01 / 500;
    expect(cramerRaoHz(1 / density, 1000, 1000)).toBeCloseTo(1.7434e-3, 6);
  });
});
