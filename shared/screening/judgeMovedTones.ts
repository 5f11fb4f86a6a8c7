import type { Tone } from '../schemas/screening.js';
import { formatHz } from './formatNumber.js';
import { judgeMoves } from './judgeMoves.js';
import { matchMovedTones } from './matchMovedTones.js';
import type { CompanionMeasurement, ToneMeasurement } from './MeasurementRecord.js';

/**
 * Tones of the same event in a capture at another rate: one that stands elsewhere there has moved and is folded; its true
 * frequency solves |f − n1·fs1| = fa1 and |f − n2·fs2| = fa2, smallest zones first (Xia 1999). A tone at the same place in both
 * stays as it is.
 * Changes the tones' explanations.
 */
export function judgeMovedTones(
  tones: Tone[],
  measured: ToneMeasurement[],
  companion: CompanionMeasurement,
  sampleRateHz: number,
  binHz: number,
  reachHz: number,
): void {
  if (Math.abs(companion.sampleRateHz / sampleRateHz - 1) < 1e-6) return;
  if (companion.moves === undefined) {
    return matchMovedTones(tones, measured, companion, sampleRateHz, binHz, reachHz);
  }
  const judged = judgeMoves(measured, companion);
  judged?.tones.forEach((one, index) => {
    const tone = tones[index];
    if (one === null || tone === undefined || one.place === null) return;
    tone.candidatesHz = one.candidatesHz;
    if (one.outcome === 'moved') {
      const chance = one.chanceProbability;
      const alike = one.candidatesHz.filter((hz) => hz !== one.place?.trueHz).slice(0, 3);
      Object.assign(tone, {
        explanation: 'movedBetweenRates',
        trueFrequencyHz: one.place.trueHz,
        confidence: 1 - chance,
        chanceProbability: chance,
        explainedBy: `${companion.name} at ${companion.sampleRateHz} Hz shows it at ${formatHz(one.place.expectedHz)}${alike.length > 0 ? `; ${alike.map(formatHz).join(', ')} would look the same` : ''}`,
      } satisfies Partial<Tone>);
    }
  });
}
