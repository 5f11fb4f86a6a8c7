import { lowPass } from './lowPass.js';
import type { SeededRandom } from './SeededRandom.js';

export function whiteNoise(frames: number, rms: number, random: SeededRandom): Float64Array {
  return Float64Array.from({ length: frames }, () => rms * random.gaussian());
}

/** Noise as it leaves a steep filter; `corner` is a share of the sampling rate. */
export function filteredNoise(frames: number, rms: number, corner: number, random: SeededRandom): Float64Array {
  return lowPass(whiteNoise(frames, rms / Math.sqrt(2 * corner), random), corner);
}
