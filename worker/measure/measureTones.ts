import type { ToneMeasurement } from '../../shared/screening/MeasurementRecord.js';
import { cramerRaoHz } from '../dsp/cramerRaoHz.js';
import { decayEnvelope } from '../dsp/decayEnvelope.js';
import { decibels } from '../dsp/decibels.js';
import { type PhaseTrack, phaseTrack } from '../dsp/phaseTrack.js';
import type { RefinedTone } from '../dsp/RefinedTone.js';
import type { ToneDemodulator } from '../dsp/ToneDemodulator.js';
import { toneWander } from '../dsp/toneWander.js';
import type { PickedTone } from './pickTones.js';

/** A coherent fit that explains less than this share of the peak's power means that the tone is no steady line. */
const leastCoherentShare = 0.3;
/** Mean square of a phase track over noise's that shows a wander: 7 standard deviations of chi-square with 30 degrees. */
const leastExcess = 2.8;

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
  const measured = picked.map((tone, index) => {
    const fit = refined[index];
    const { meanSquare, boundFactor } = decayEnvelope(fit?.decay ?? 0, frames);
    const inMiddle = fit === undefined ? 0 : 2 * (fit.amplitude.real ** 2 + fit.amplitude.imaginary ** 2);
    const coherent = inMiddle * meanSquare;
    const boundHz =
      boundFactor * cramerRaoHz(Math.max(coherent, tone.power) / Math.max(tone.floor, 1e-300), frames, sampleRateHz);
    const isSteady = fit !== undefined && coherent > leastCoherentShare * tone.power;
    const omega = (demodulator.omegas[index] ?? 0) + (fit?.delta ?? 0);
    const noisePower = (demodulator.blockFrames * tone.floor * sampleRateHz) / 2;
    const wander = isSteady ? toneWander(demodulator, fit, noisePower) : 0;
    const result: ToneMeasurement = {
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
    if (isSteady && fit.decay !== 0) result.decayPerS = fit.decay * sampleRateHz;
    return { result, track: isSteady && fit.decay === 0 ? phaseTrack(demodulator, fit, noisePower) : null };
  });
  // Tracks are of use only together: one that shows a wander, and others to set against it.
  if (measured.some(({ track }) => track !== null && track.excess > leastExcess)) {
    for (const { result, track } of measured) {
      if (track === null) continue;
      result.phaseTrack = roundedTrack(track);
      // The highest peak of a tone that wanders lies anywhere in its spread; its mean frequency is proportional in all members.
      if (track.excess > leastExcess) result.frequencyHz += (track.meanOffset * sampleRateHz) / (2 * Math.PI);
    }
  }
  return measured.map(({ result }) => result);
}

const rounded = (value: number): number => Math.round(value * 1e4) / 1e4;

function roundedTrack({ phasesRad, errorRad }: PhaseTrack): NonNullable<ToneMeasurement['phaseTrack']> {
  return { phasesRad: phasesRad.map(rounded), errorRad: Math.max(1e-4, errorRad) };
}
