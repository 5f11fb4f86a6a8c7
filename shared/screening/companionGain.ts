import type { ToneMove, TonePlace } from './MeasurementRecord.js';

/** Aligned: what stands at a place moves with the tone if this share of its power does. */
export const leastCoherence = 0.5;
const sureCoherence = 0.8;
const sureStandOutDb = 12;

/** Something of the tone's kind stands at the place, whatever its level. */
export function isOccupied({ ratioDb, besideDb, coherence }: TonePlace, standOutDb: number): boolean {
  return ratioDb > besideDb + standOutDb && (coherence === null || coherence >= leastCoherence);
}

/**
 * Sensitivity of the companion's channel against this one's, dB: the median over tones of the level at the place that fits
 * best. Filters, sensors and units differ; within one pair the step is the same for all tones far from the filters' corners.
 * @returns null where no tone stands anywhere in the companion
 */
export function companionGainDb(moves: readonly ToneMove[]): number | null {
  const steps: number[] = [];
  for (const { places } of moves) {
    const sure = places.filter(
      (place) => isOccupied(place, sureStandOutDb) && (place.coherence === null || place.coherence >= sureCoherence),
    );
    // Without phases only the tone's own place is beyond doubt.
    const best = sure.reduce<TonePlace | undefined>(
      (found, place) => ((place.coherence ?? 0) > (found?.coherence ?? -1) ? place : found),
      undefined,
    );
    if (best !== undefined) steps.push(best.ratioDb);
  }
  if (steps.length === 0) return null;
  steps.sort((a, b) => a - b);
  return steps[steps.length >> 1] as number;
}
