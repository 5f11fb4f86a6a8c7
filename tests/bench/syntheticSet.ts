import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { encodeWav } from '../support/encodeWav.js';
import { createRealFft } from '../../worker/dsp/createRealFft.js';

/** Seeded generator (mulberry32): the same seed gives the same captures. */
export function seededRandom(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

interface Made {
  name: string;
  family: string;
  sampleRateHz: number;
  rightful: Float64Array;
  folded: Float64Array;
  tones: { trueHz: number; foldedHz: number }[];
}

const frames = 16_384;

/** A small labelled set of its own: machines, supply, band-limited and unfiltered noise bursts. Writes captures and labels.csv. */
export function writeSyntheticSet(directory: string, seed: number, perFamily = 10): void {
  const random = seededRandom(seed);
  mkdirSync(join(directory, 'captures'), { recursive: true });
  const header =
    'file,part,family,op,label,csv_variant,band_fold_db,tones_true_hz,tones_folded_hz,tones_visible,pair_id,fs_hz';
  const lines = [header];
  for (let n = 0; n < perFamily; n++) {
    for (const make of [makeMachine, makeSupply, makeBursts]) {
      const isBad = n % 2 === 0;
      const made = make(random, isBad);
      const noiseLevel = 10 ** (-(20 + 40 * random()) / 20);
      const file = `captures/${made.name}${String(n).padStart(2, '0')}.wav`;
      const samples = mix(made, noiseLevel, random);
      writeFileSync(join(directory, file), encodeWav([samples], made.sampleRateHz));
      const ratio = 10 * Math.log10(Math.max(power(made.folded), 1e-30) / power(samples));
      const label = ratio > -40 ? 'folded' : ratio < -70 ? 'clean' : 'grey';
      const tones = made.tones;
      lines.push(
        [
          file,
          'synthetic',
          made.family,
          'sampled',
          label,
          '',
          bandFoldDb(made.folded, samples),
          tones.map((tone) => tone.trueHz).join('|'),
          tones.map((tone) => tone.foldedHz).join('|'),
          tones.map(() => '1').join('|'),
          '',
          made.sampleRateHz,
        ].join(','),
      );
    }
  }
  writeFileSync(join(directory, 'labels.csv'), `${lines.join('\n')}\n`);
}

function render(
  sampleRateHz: number,
  components: { frequencyHz: number; amplitude: number; phase: number }[],
): Pick<Made, 'rightful' | 'folded' | 'tones'> {
  const rightful = new Float64Array(frames);
  const folded = new Float64Array(frames);
  const tones: Made['tones'] = [];
  for (const { frequencyHz, amplitude, phase } of components) {
    const isFolded = frequencyHz >= sampleRateHz / 2;
    const target = isFolded ? folded : rightful;
    for (let n = 0; n < frames; n++)
      target[n] = (target[n] as number) + amplitude * Math.sin((2 * Math.PI * frequencyHz * n) / sampleRateHz + phase);
    if (isFolded)
      tones.push({
        trueHz: frequencyHz,
        foldedHz: Math.abs(frequencyHz - sampleRateHz * Math.round(frequencyHz / sampleRateHz)),
      });
  }
  return { rightful, folded, tones };
}

function makeMachine(random: () => number, isBad: boolean): Made {
  const sampleRateHz = 1000 * Math.ceil(1 + 6 * random());
  const speedHz = 12 + 40 * random();
  const top = (sampleRateHz / 2) * (isBad ? 1.6 : 0.8);
  const orders = Math.floor(top / speedHz);
  const components = Array.from({ length: orders }, (_, index) => ({
    frequencyHz: (index + 1) * speedHz,
    amplitude: (0.3 + random()) / Math.sqrt(index + 1),
    phase: 2 * Math.PI * random(),
  }));
  return { name: 'machine', family: 'machine', sampleRateHz, ...render(sampleRateHz, components) };
}

function makeSupply(random: () => number, isBad: boolean): Made {
  const sampleRateHz = 1250 + Math.round(100 * random());
  const supplyHz = 50 + 0.05 * (random() - 0.5);
  const orders = isBad ? 35 : 9;
  const components = Array.from({ length: Math.ceil(orders / 2) }, (_, index) => ({
    frequencyHz: (2 * index + 1) * supplyHz,
    amplitude: 1 / (2 * index + 1),
    phase: 2 * Math.PI * random(),
  }));
  return { name: 'supply', family: 'supply', sampleRateHz, ...render(sampleRateHz, components) };
}

/** Noise bursts: white when bad (as if picked from a faster recording without a filter), low-passed twice when good. */
function makeBursts(random: () => number, isBad: boolean): Made {
  const sampleRateHz = 8000;
  const noise = gaussian(random, frames);
  const burst = noise.map((value, n) => value * Math.exp(-((n % 4096) / 900)));
  const filtered = lowPass(burst, 0.25);
  const empty = new Float64Array(frames);
  // White bursts of a recording made four times as fast: three quarters of their power come from beyond fs/2.
  const made = isBad
    ? { rightful: burst.map((value) => value / 2), folded: burst.map((value) => value * 0.866) }
    : { rightful: filtered, folded: empty };
  return { name: 'bursts', family: 'bursts', sampleRateHz, tones: [], ...made };
}

/** Windowed-sinc low-pass of 129 taps at the given share of fs. */
function lowPass(samples: Float64Array, corner: number): Float64Array {
  const taps = Array.from({ length: 129 }, (_, index) => {
    const place = index - 64;
    const sinc = place === 0 ? 2 * corner : Math.sin(2 * Math.PI * corner * place) / (Math.PI * place);
    const angle = (2 * Math.PI * index) / 128;
    return sinc * (0.35875 - 0.48829 * Math.cos(angle) + 0.14128 * Math.cos(2 * angle) - 0.01168 * Math.cos(3 * angle));
  });
  return samples.map((_, n) => taps.reduce((sum, tap, index) => sum + tap * (samples[n - index] ?? 0), 0));
}

function gaussian(random: () => number, count: number): Float64Array {
  return Float64Array.from(
    { length: count },
    () => Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random()),
  );
}

function power(samples: Float64Array): number {
  return samples.reduce((sum, value) => sum + value * value, 0) / samples.length;
}

/** Folded share of ten equal bands, dB, joined with |; bands more than 80 dB below the strongest hold nothing to claim. */
function bandFoldDb(folded: Float64Array, samples: Float64Array): string {
  const bands = (values: Float64Array): number[] => {
    const spectrum = Float64Array.from(createRealFft(frames).transform(values));
    return Array.from({ length: 10 }, (_, band) => {
      let sum = 0;
      for (let bin = Math.ceil((band * frames) / 20); bin < ((band + 1) * frames) / 20; bin++) {
        sum += (spectrum[2 * bin] as number) ** 2 + (spectrum[2 * bin + 1] as number) ** 2;
      }
      return sum;
    });
  };
  const all = bands(samples);
  const strongest = Math.max(...all);
  return bands(folded)
    .map((value, band) =>
      (all[band] as number) < 1e-8 * strongest ? -120 : 10 * Math.log10(Math.max(value / (all[band] as number), 1e-12)),
    )
    .map((level) => level.toFixed(1))
    .join('|');
}

function mix(made: Made, noiseLevel: number, random: () => number): Float64Array {
  const sum = made.rightful.map((value, n) => value + (made.folded[n] as number));
  const noise = gaussian(random, sum.length);
  const level = Math.sqrt(power(sum)) * noiseLevel;
  const noisy = sum.map((value, n) => value + level * (noise[n] as number));
  const peak = noisy.reduce((top, value) => Math.max(top, Math.abs(value)), 0);
  for (const part of [noisy, made.rightful, made.folded]) part.forEach((value, n) => (part[n] = (0.8 * value) / peak));
  return noisy;
}
