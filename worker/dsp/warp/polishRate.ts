import FFT from 'fft.js';
import type { RateFamily } from './RateFamily.js';

export interface PolishedRate {
  rate: number;
  /** Frequency of the line at relative speed 1, cycles a sample. */
  nu: number;
  /** Power of the line over the mean power at other trials, linear. */
  ratio: number;
}

const blocks = 512;
/** Trials lie so near that the line turns by a quarter cycle between them, and reach so many cycles to each side. */
const mostTrialsAside = 240;
const leastTrialsAside = 4;
const finestStep = 0.02;
const difference = 1e-4;

/**
 * One line of a law followed through the whole stretch, through reflections at fs/2 too, because sampling keeps its phase:
 * demodulated by what is known, summed in blocks, and the rest of its bend and place found where all blocks add up. Done
 * twice: the second time from what the first has found.
 * @param start the family's rate, known to within ±reach, and the frequency at relative speed 1, cycles a sample, known to
 *   within ±256/length
 */
export function polishRate(
  samples: Float64Array,
  family: RateFamily,
  start: { rate: number; nu: number; reach: number },
): PolishedRate {
  const first = polishOnce(samples, family, start);
  if (!(first.nu > 0) || Math.abs(first.rate) > family.largest) return first;
  return polishOnce(samples, family, { rate: first.rate, nu: first.nu, reach: 0 });
}

function polishOnce(
  samples: Float64Array,
  family: RateFamily,
  { rate, nu, reach }: { rate: number; nu: number; reach: number },
): PolishedRate {
  const { length } = samples;
  const turns = nu * length;
  const sums = blockSums(samples, family.lawOf(rate, length).warped, turns);
  const trial = createTrial(sums, bendOf(family, rate, length));
  // The middle and the ends of the bend differ by about a quarter of the stretch times the change of the rate.
  const step = 1 / Math.max(turns, 1);
  const aside = Math.min(mostTrialsAside, Math.max(leastTrialsAside, Math.ceil(reach / step)));
  let best = { change: 0, bin: 0, power: -1 };
  let total = 0;
  const consider = (change: number): number => {
    const { bin, power, mean } = trial(change * turns);
    if (power > best.power) best = { change, bin, power };
    return mean;
  };
  for (let i = -aside; i <= aside; i++) total += consider(i * step);
  for (let finer = step / 2; finer > finestStep * step; finer /= 2) {
    const { change } = best;
    consider(change - finer);
    consider(change + finer);
  }
  const newTurns = turns + best.bin;
  return {
    // What bent the line at its old frequency bends it less at a higher one.
    rate: rate + (best.change * turns - rate * best.bin) / newTurns,
    nu: newTurns / length,
    ratio: best.power / Math.max(total / (2 * aside + 1), 1e-300),
  };
}

/** Sums of the samples times exp(−2πi·turns·warped) over equal blocks, interleaved. */
function blockSums(samples: Float64Array, warped: Float64Array, turns: number): Float64Array {
  const sums = new Float64Array(2 * blocks);
  for (let n = 0; n < samples.length; n++) {
    const phase = 2 * Math.PI * turns * (warped[n] as number);
    const place = 2 * Math.floor((n * blocks) / samples.length);
    sums[place] = (sums[place] as number) + (samples[n] as number) * Math.cos(phase);
    sums[place + 1] = (sums[place + 1] as number) - (samples[n] as number) * Math.sin(phase);
  }
  return sums;
}

/** Change of the warped time with the family's rate, in the middle of each block. */
function bendOf(family: RateFamily, rate: number, length: number): Float64Array {
  const above = family.lawOf(rate + difference, length).warped;
  const below = family.lawOf(rate - difference, length).warped;
  return Float64Array.from({ length: blocks }, (_, b) => {
    const n = Math.floor(((b + 0.5) * length) / blocks);
    return ((above[n] as number) - (below[n] as number)) / (2 * difference);
  });
}

/** For a bend times so many cycles: the strongest bin (−blocks/2 … blocks/2), its power and the mean power. */
function createTrial(
  sums: Float64Array,
  bends: Float64Array,
): (cycles: number) => { bin: number; power: number; mean: number } {
  const fft = new FFT(blocks);
  const input = new Float64Array(2 * blocks);
  const output = new Float64Array(2 * blocks);
  return (cycles) => {
    for (let b = 0; b < blocks; b++) {
      const phase = 2 * Math.PI * cycles * (bends[b] as number);
      const [c, s] = [Math.cos(phase), Math.sin(phase)];
      const [x, y] = [sums[2 * b] as number, sums[2 * b + 1] as number];
      input[2 * b] = x * c + y * s;
      input[2 * b + 1] = y * c - x * s;
    }
    fft.transform(output, input);
    let top = { bin: 0, power: -1 };
    let total = 0;
    for (let k = 0; k < blocks; k++) {
      const power = (output[2 * k] as number) ** 2 + (output[2 * k + 1] as number) ** 2;
      total += power;
      if (power > top.power) top = { bin: k < blocks / 2 ? k : k - blocks, power };
    }
    return { ...top, mean: total / blocks };
  };
}
