import FFT from 'fft.js';
import { linearLaw } from './SpeedLaw.js';

export interface PolishedRate {
  rho: number;
  /** Frequency of the line at mid stretch, cycles a sample. */
  nu: number;
  /** Power of the line over the mean power at other trials, linear. */
  ratio: number;
}

const blocks = 512;
/** Trial bends, in cycles at the ends of the stretch against its middle. */
const bendStep = 0.25;
const mostBend = 60;

/**
 * One line of a linear law followed through the whole stretch, through reflections at fs/2 too, because sampling keeps its
 * phase: demodulated by what is known, summed in blocks, and the rest of its bend and place found where all blocks add up.
 * @param rho relative slope, known to within ±reach
 * @param nu frequency at mid stretch, cycles a sample, known to within ±256/length
 */
export function polishRate(samples: Float64Array, rho: number, nu: number, reach: number): PolishedRate {
  const { length } = samples;
  const { warped } = linearLaw(rho, length);
  const turns = nu * length;
  const sums = new Float64Array(2 * blocks);
  for (let n = 0; n < length; n++) {
    const phase = 2 * Math.PI * turns * (warped[n] as number);
    const block = Math.floor((n * blocks) / length);
    sums[2 * block] = (sums[2 * block] as number) + (samples[n] as number) * Math.cos(phase);
    sums[2 * block + 1] = (sums[2 * block + 1] as number) - (samples[n] as number) * Math.sin(phase);
  }
  const bend = Math.min(mostBend, Math.max(1, (turns * reach) / 4));
  const trial = createTrial(sums);
  let best = { bend: 0, bin: 0, power: -1 };
  let total = 0;
  let trials = 0;
  for (let c = -bend; c <= bend; c += bendStep) {
    const top = trial(c);
    if (top.power > best.power) best = { bend: c, ...top };
    total += top.mean;
    trials++;
  }
  for (let step = bendStep / 2; step > 0.005; step /= 2) {
    for (const c of [best.bend - step, best.bend + step]) {
      const top = trial(c);
      if (top.power > best.power) best = { bend: c, ...top };
    }
  }
  const newTurns = turns + best.bin;
  return {
    rho: (turns * rho + 4 * best.bend) / newTurns,
    nu: newTurns / length,
    ratio: best.power / Math.max(total / trials, 1e-300),
  };
}

/** For a bend in cycles: the strongest bin (−blocks/2 … blocks/2), its power and the mean power. */
function createTrial(sums: Float64Array): (bend: number) => { bin: number; power: number; mean: number } {
  const fft = new FFT(blocks);
  const input = new Float64Array(2 * blocks);
  const output = new Float64Array(2 * blocks);
  return (bend) => {
    for (let b = 0; b < blocks; b++) {
      const tau = (2 * b + 1) / blocks - 1;
      const phase = 2 * Math.PI * bend * tau * tau;
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
