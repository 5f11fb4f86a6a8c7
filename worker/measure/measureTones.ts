import type { ToneMeasurement } from '../../shared/screening/MeasurementRecord.js';
import { cramerRaoHz } from '../dsp/cramerRaoHz.js';
import { decibels } from '../dsp/decibels.js';
import type { RefinedTone } from '../dsp/RefinedTone.js';
import type { ToneDemodulator } from '../dsp/ToneDemodulator.js';
import { toneWander } from '../dsp/toneWander.js';
import type { PickedTone } from './pickTones.js';

/** A coherent fit that explains less than this share of the peak's power means that the tone is no steady line. */
const leastCoherentShare = 0.3;

/**
 * Least-squares figures of picked tones from their demodulated blocks; a tone that wanders too far keeps its peak's figures.
 * A steady tone stands out by what a Hann periodogram of the whole capture would show, 1.5 bins wide (Harris 1978).
 */
export function measureTones(
  picked: PickedTone[],
  refined: RefinedTone[],
  demodulator: ToneDemodulator,
  sampleRateHz: number,
  fineHz: number,
): ToneMeasurement[] {
  const frames = demodulator.blocks * demodulator.blockFrames;
  return picked.map((tone, index) => {
    const fit = refined[index];
    const coherent = fit === undefined ? 0 : 2 * (fit.amplitude.real ** 2 + fit.amplitude.imaginary ** 2);
    const boundHz = cramerRaoHz(Math.max(coherent, tone.power) / Math.max(tone.floor, 1e-300), frames, sampleRateHz);
    const isSteady = fit !== undefined && coherent > leastCoherentShare * tone.power;
    const omega = (demodulator.omegas[index] ?? 0) + (fit?.delta ?? 0);
    const noisePower = (demodulator.blockFrames * tone.floor * sampleRateHz) / 2;
    const wander = isSteady ? toneWander(demodulator, fit, noisePower) : 0;
    return {
      frequencyHz: isSteady ? (omega * sampleRateHz) / (2 * Math.PI) : tone.frequencyHz,
      boundHz: Math.min(fineHz, boundHz),
      wanderHz: isSteady ? (wander * sampleRateHz) / (2 * Math.PI) : Math.max(tone.widthHz, fineHz / 2),
      levelDb: decibels(Math.max(coherent, tone.power)),
      standsOutDb: decibels(
        isSteady ? Math.max(tone.ratio, coherent / (1.5 * tone.floor * (sampleRateHz / frames))) : tone.ratio,
      ),
      floorDb: decibels(tone.floor),
      peaksPerHz: tone.peaksPerHz,
    };
  });
}
