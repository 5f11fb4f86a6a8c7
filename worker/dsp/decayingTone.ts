import type { Complex } from './blockResponse.js';
import type { ToneDemodulator } from './ToneDemodulator.js';

/** Decays looked at first, in nepers over the whole stretch: growing, steady, falling. */
const coarseNepers = [-4, -2, -1, 0, 1, 2, 4, 7, 11, 16];
/** A decay is believed where it explains this many times the noise more: a chance of 1 in 1000 (chi-square, one degree). */
const leastGain = 11;

type Stretch = Pick<ToneDemodulator, 'blocks' | 'blockFrames' | 'origin'>;

const blockTime = (block: number, { blockFrames, origin }: Stretch): number =>
  block * blockFrames + (blockFrames - 1) / 2 - origin;

/** What a decaying tone is worth in the middle of a block against the middle of the stretch. */
export function decayWeight(decay: number, block: number, stretch: Stretch): number {
  return decay === 0 ? 1 : Math.exp(-decay * blockTime(block, stretch));
}

function blockLength(delta: number, blockFrames: number): number {
  const half = Math.sin(delta / 2);
  return Math.abs(half) < 1e-12 ? blockFrames : Math.sin((delta * blockFrames) / 2) / half;
}

/** Σ z·conj(D) and Σ|D|² of a single tone D at the given offset and decay over the blocks. */
function project(
  stretch: Stretch,
  z: Float64Array,
  delta: number,
  decay: number,
): { real: number; imaginary: number; energy: number; length: number } {
  const { blocks, blockFrames } = stretch;
  const first = blockTime(0, stretch);
  const length = blockLength(delta, blockFrames);
  let c = Math.cos(delta * first);
  let s = -Math.sin(delta * first);
  const stepC = Math.cos(delta * blockFrames);
  const stepS = -Math.sin(delta * blockFrames);
  let weight = Math.exp(-decay * first);
  const ratio = Math.exp(-decay * blockFrames);
  let [real, imaginary, energy] = [0, 0, 0];
  for (let block = 0; block < blocks; block++) {
    const [x, y] = [z[2 * block] as number, z[2 * block + 1] as number];
    real += weight * (x * c - y * s);
    imaginary += weight * (x * s + y * c);
    energy += weight * weight;
    weight *= ratio;
    const next = c * stepC - s * stepS;
    s = s * stepC + c * stepS;
    c = next;
  }
  return { real, imaginary, energy, length };
}

/** Least-squares amplitude of a single tone at the given offset and decay: Σ z·conj(D) / Σ|D|². */
export function amplitudeAt(stretch: Stretch, z: Float64Array, delta: number, decay: number): Complex {
  const { real, imaginary, energy, length } = project(stretch, z, delta, decay);
  return { real: real / (energy * length), imaginary: imaginary / (energy * length) };
}

/** |Σ z·conj(D)|²/Σ|D|²: the amplitude alone would favour offsets at which a block responds less. */
export function explainedPower(stretch: Stretch, z: Float64Array, delta: number, decay: number): number {
  const { real, imaginary, energy } = project(stretch, z, delta, decay);
  return (real * real + imaginary * imaginary) / energy;
}

/**
 * Decay of a tone, per sample, by the most explained power at the given offset: the maximum-likelihood figure of an
 * exponentially damped tone in white noise (Kumaresan & Tufts 1982 state the model). 0 where a steady tone does as well.
 */
export function bestDecay(stretch: Stretch, z: Float64Array, delta: number, start: number): number {
  const span = stretch.blocks * stretch.blockFrames;
  const steady = explainedPower(stretch, z, delta, 0);
  const power = (decay: number): number => explainedPower(stretch, z, delta, decay);
  let best = start;
  let bestPower = power(start);
  if (start === 0) {
    for (const nepers of coarseNepers) {
      const value = power(nepers / span);
      if (value > bestPower) [best, bestPower] = [nepers / span, value];
    }
  }
  for (let width = 0.5 / span; width > 1e-3 / span; width /= 2) {
    const [below, above] = [power(best - width), power(best + width)];
    const curvature = below - 2 * bestPower + above;
    const shift = curvature < 0 ? (0.5 * width * (below - above)) / curvature : 0;
    best += Math.max(-2 * width, Math.min(2 * width, shift));
    bestPower = power(best);
  }
  const total = z.reduce((sum, value) => sum + value * value, 0);
  const noise = Math.max(total - bestPower, 1e-300) / Math.max(1, 2 * stretch.blocks - 4);
  return bestPower - steady > leastGain * noise ? best : 0;
}
