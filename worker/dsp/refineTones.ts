import { amplitudeAt, bestDecay, decayWeight, explainedPower } from './decayingTone.js';
import { blockResponse } from './blockResponse.js';
import { closeBins, fitToneGroup } from './fitToneGroup.js';
import type { RefinedTone } from './RefinedTone.js';
import type { ToneDemodulator } from './ToneDemodulator.js';

/**
 * Maximum-likelihood frequencies and amplitudes of several tones from their demodulated blocks: cyclic relaxation (each
 * tone is re-estimated with all others taken out; Li & Stoica 1996) and a last joint least-squares fit of close tones.
 * @param searchRad largest offset searched, rad a sample
 */
export function refineTones(demodulator: ToneDemodulator, searchRad: number, rounds = 4): RefinedTone[] {
  const tones: RefinedTone[] = demodulator.values.map((values) => ({
    delta: 0,
    amplitude: { real: 0, imaginary: 0 },
    decay: 0,
    residual: Float64Array.from(values),
  }));
  const order = [...tones.keys()].sort((a, b) => energy(demodulator.values[b]) - energy(demodulator.values[a]));
  for (let round = 0; round < rounds; round++) {
    for (const index of order) {
      const tone = tones[index] as RefinedTone;
      tone.residual = lessOthers(demodulator, tones, index);
      const reach = round === 0 ? searchRad : searchRad / 4;
      tone.delta = bestOffset(demodulator, tone.residual, round === 0 ? 0 : tone.delta, reach, tone.decay);
      // Two close tones beat like one that decays: such groups are fitted together as steady tones.
      if (round > 0 && !isCrowded(demodulator, tones, index))
        tone.decay = bestDecay(demodulator, tone.residual, tone.delta, tone.decay);
      tone.amplitude = amplitudeAt(demodulator, tone.residual, tone.delta, tone.decay);
    }
  }
  fitToneGroup(demodulator, tones);
  tones.forEach((tone, index) => (tone.residual = lessOthers(demodulator, tones, index)));
  return tones;
}

function isCrowded({ omegas, blocks, blockFrames }: ToneDemodulator, tones: RefinedTone[], index: number): boolean {
  const place = (at: number): number => (omegas[at] as number) + (tones[at]?.delta ?? 0);
  const near = (closeBins * 2 * Math.PI) / (blocks * blockFrames);
  return tones.some((_, other) => other !== index && Math.abs(place(other) - place(index)) < near);
}

function energy(values: Float64Array | undefined): number {
  return values === undefined ? 0 : values.reduce((sum, value) => sum + value * value, 0);
}

/** Leakage below this share of a tone's own amplitude is left in. */
const negligible = 1e-5;

/** The blocks of one tone with the leakage of all others, and of all conjugates, taken out. */
function lessOthers(demodulator: ToneDemodulator, tones: RefinedTone[], index: number): Float64Array {
  const { omegas, blocks, blockFrames, origin, values } = demodulator;
  const result = Float64Array.from(values[index] as Float64Array);
  const here = omegas[index] as number;
  const own = (tones[index] as RefinedTone).amplitude;
  const ownSize = Math.hypot(own.real, own.imaginary);
  tones.forEach((other, place) => {
    const { real: a, imaginary: b } = other.amplitude;
    if (a === 0 && b === 0) return;
    const omega = (omegas[place] as number) + other.delta;
    // Far and weak tones leave nothing worth the trigonometry.
    const leak = Math.hypot(a, b) / Math.max(1e-12, Math.abs(Math.sin((omega - here) / 2)));
    if (place !== index && leak < negligible * blocks * blockFrames * ownSize) return;
    for (let block = 0; block < blocks; block++) {
      const image = blockResponse(-omega - here, block, blockFrames, origin);
      const weight = decayWeight(other.decay, block, demodulator);
      let real = weight * (a * image.real + b * image.imaginary);
      let imaginary = weight * (a * image.imaginary - b * image.real);
      if (place !== index) {
        const direct = blockResponse(omega - here, block, blockFrames, origin);
        real += weight * (a * direct.real - b * direct.imaginary);
        imaginary += weight * (a * direct.imaginary + b * direct.real);
      }
      result[2 * block] = (result[2 * block] as number) - real;
      result[2 * block + 1] = (result[2 * block + 1] as number) - imaginary;
    }
  });
  return result;
}

function bestOffset(
  demodulator: ToneDemodulator,
  z: Float64Array,
  centre: number,
  reach: number,
  decay: number,
): number {
  const span = demodulator.blocks * demodulator.blockFrames;
  const power = (delta: number): number => explainedPower(demodulator, z, delta, decay);
  const step = Math.PI / (2 * span);
  const steps = Math.ceil(reach / step);
  let best = centre;
  let bestPower = -1;
  for (let k = -steps; k <= steps; k++) {
    const value = power(centre + k * step);
    if (value > bestPower) [best, bestPower] = [centre + k * step, value];
  }
  let width = step;
  for (let turn = 0; turn < 24; turn++) {
    const below = power(best - width);
    const above = power(best + width);
    const curvature = below - 2 * bestPower + above;
    const shift = curvature < 0 ? (0.5 * width * (below - above)) / curvature : 0;
    best += Math.max(-width, Math.min(width, shift));
    bestPower = power(best);
    width /= 2;
  }
  return best;
}
