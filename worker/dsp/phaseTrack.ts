import { blockResponse } from './blockResponse.js';
import type { RefinedTone } from './RefinedTone.js';
import type { ToneDemodulator } from './ToneDemodulator.js';

export interface PhaseTrack {
  /** Phase against a steady tone of the fitted frequency, rad, in equal parts of the stretch; straight line taken out. */
  phasesRad: number[];
  /** What the straight line adds to the fitted frequency, rad a sample: with it the frequency is the mean over the stretch. */
  meanOffset: number;
  /** Standard deviation of one of them in white noise. */
  errorRad: number;
  /** Mean square phase over what noise alone gives: 1 for a tone that does not wander. */
  excess: number;
}

const points = 32;
/** Power of a part over its noise below which a phase may slip. */
const leastPower = 8;
/** From part to part the phase moves less than this, or turns can't be counted. */
const largestStepRad = 2;

/**
 * How a tone's phase wanders over the capture. What turns k times as fast has k times this track; a tone mirrored by
 * sampling has it upside down.
 * @param noisePower expected |noise|² of one demodulated block
 * @returns null where the tone fades into the noise, or wanders too fast for its turns to be counted
 */
export function phaseTrack(demodulator: ToneDemodulator, tone: RefinedTone, noisePower: number): PhaseTrack | null {
  const perPoint = Math.floor(demodulator.blocks / points);
  if (perPoint < 1) return null;
  const phases: number[] = [];
  let weakest = Infinity;
  let meanSquare = 0;
  for (let point = 0; point < points; point++) {
    let [real, imaginary] = [0, 0];
    for (let block = point * perPoint; block < (point + 1) * perPoint; block++) {
      const steady = blockResponse(tone.delta, block, demodulator.blockFrames, demodulator.origin);
      const [x, y] = [tone.residual[2 * block] as number, tone.residual[2 * block + 1] as number];
      real += x * steady.real + y * steady.imaginary;
      imaginary += y * steady.real - x * steady.imaginary;
    }
    const power = (real * real + imaginary * imaginary) / demodulator.blockFrames ** 2;
    weakest = Math.min(weakest, power);
    meanSquare += (perPoint * noisePower) / (2 * power) / points;
    const phase = Math.atan2(imaginary, real);
    const last = phases[point - 1];
    const turns = last === undefined ? 0 : Math.round((last - phase) / (2 * Math.PI));
    phases.push(phase + 2 * Math.PI * turns);
  }
  if (!(weakest > leastPower * perPoint * noisePower)) return null;
  if (phases.some((phase, point) => point > 0 && Math.abs(phase - (phases[point - 1] as number)) > largestStepRad))
    return null;
  const { rest: phasesRad, slope } = withoutLine(phases);
  const seen = phasesRad.reduce((sum, phase) => sum + phase * phase, 0) / (points - 2);
  const meanOffset = slope / (perPoint * demodulator.blockFrames);
  return { phasesRad, meanOffset, errorRad: Math.sqrt(meanSquare), excess: seen / Math.max(meanSquare, 1e-300) };
}

function withoutLine(values: number[]): { rest: number[]; slope: number } {
  const middle = (values.length - 1) / 2;
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  const slope =
    values.reduce((sum, value, n) => sum + value * (n - middle), 0) /
    values.reduce((sum, _, n) => sum + (n - middle) ** 2, 0);
  return { rest: values.map((value, n) => value - mean - slope * (n - middle)), slope };
}
