import type { Tone } from '../schemas/screening.js';
import { companionGainDb } from './companionGain.js';
import { formatHz } from './formatNumber.js';
import { poissonTail } from './harmonicFamily.js';
import { judgeMove } from './judgeMove.js';
import { matchMovedTones } from './matchMovedTones.js';
import type { CompanionMeasurement, ToneMeasurement } from './MeasurementRecord.js';

/**
 * Tones of the same event in a capture at another rate: one that stands elsewhere there has moved and is folded; its true
 * frequency solves |f − n1·fs1| = fa1 and |f − n2·fs2| = fa2, smallest zones first (Xia 1999). A tone at the same place in both
 * stays as it is. As many moves as were found have to be unlikely by chance too: among many tones that the companion doesn't
 * show, some would find a place by accident.
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
  const moves = companion.moves ?? null;
  if (moves === null) return matchMovedTones(tones, measured, companion, sampleRateHz, binHz, reachHz);
  const gainDb = companionGainDb(moves);
  if (gainDb === null) return;
  const judged = measured.map((tone) => {
    const move = moves.find(({ frequencyHz }) => frequencyHz === tone.frequencyHz);
    return move === undefined ? null : { move, ...judgeMove(move, tone, companion, gainDb) };
  });
  const moved = judged.flatMap((one) => (one?.outcome === 'moved' ? [one.chanceProbability] : []));
  const unplaced = judged.filter((one) => one?.outcome === 'absent' || one?.outcome === 'hidden').length;
  const typical = moved.reduce((sum, chance) => sum + chance, 0) / Math.max(1, moved.length);
  const together = poissonTail(moved.length, typical * (moved.length + unplaced));
  judged.forEach((one, index) => {
    const tone = tones[index];
    if (one === null || tone === undefined || one.place === null) return;
    tone.candidatesHz = one.candidatesHz;
    if (one.outcome === 'moved') {
      const chance = Math.max(one.chanceProbability, together);
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
