import { describe, expect, it } from 'vitest';
import { RaisedRateMeter } from '../../../worker/dsp/RaisedRateMeter.js';
import { lowPass, seededNoise } from '../../support/seededNoise.js';

const noise = lowPass(seededNoise(3000, 5), 0.4);
const quantise = (samples: Float64Array, step: number) => samples.map((value) => Math.round(value / step) * step);
const held = (samples: Float64Array, factor: number) =>
  Float64Array.from({ length: samples.length * factor }, (_, n) => samples[Math.floor(n / factor)] as number);
const straight = (samples: Float64Array, factor: number) =>
  Float64Array.from({ length: (samples.length - 1) * factor }, (_, n) => {
    const [from, to] = [samples[Math.floor(n / factor)] as number, samples[Math.floor(n / factor) + 1] as number];
    return from + ((n % factor) / factor) * (to - from);
  });
const look = (samples: Float64Array, step: number | null = null, block = 512) => {
  const meter = new RaisedRateMeter(step, 1);
  for (let first = 0; first < samples.length; first += block) {
    const part = samples.subarray(first, first + block);
    meter.push(part, part.length);
  }
  return meter.result();
};

describe('RaisedRateMeter', () => {
  it.each([2, 3, 4, 7])('finds values repeated %i-fold and lines drawn between every %i-th', (factor) => {
    expect(look(held(noise, factor))).toMatchObject({ factor, by: 'held' });
    expect(look(straight(noise, factor))).toMatchObject({ factor, by: 'straight' });
    expect(look(held(noise, factor).subarray(3))).toMatchObject({ factor, by: 'held' });
  });

  it('finds them after rounding to the steps of a converter', () => {
    const step = 2 ** -10;
    expect(look(quantise(straight(noise, 4), step), step)).toMatchObject({ factor: 4, by: 'straight' });
    expect(look(quantise(held(noise, 2), step), step)).toMatchObject({ factor: 2, by: 'held' });
  });

  it('finds nothing in noise, in a slow tone, in coarse steps, in silence and in a square wave', () => {
    expect(look(noise)).toBeNull();
    expect(look(Float64Array.from({ length: 8000 }, (_, n) => Math.sin(n / 900)))).toBeNull();
    expect(look(quantise(noise, 0.5), 0.5)).toBeNull();
    expect(look(new Float64Array(8000))).toBeNull();
    expect(look(Float64Array.from({ length: 8000 }, (_, n) => ((n / 9.4) % 1 < 0.5 ? 1 : -1)))).toBeNull();
  });

  it('gives the same answer in blocks of any length', () => {
    const raised = straight(noise, 3);
    expect(look(raised, null, 7)).toEqual(look(raised, null, 4096));
  });
});
