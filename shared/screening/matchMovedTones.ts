import type { Tone } from '../schemas/screening.js';
import { aliasHz, candidatesHz } from './foldArithmetic.js';
import { matchSigmas, toneErrorHz } from './harmonicFamily.js';
import type { CompanionMeasurement, ToneMeasurement } from './MeasurementRecord.js';

/** Companion tones weaker than the tone by more than this are no counterpart: filters and sensors differ, sources don't. */
const largestLevelStepDb = 15;

/**
 * Tones of the same event in a capture at another rate: one that stands elsewhere there has moved and is folded; its true
 * frequency solves |f − n1·fs1| = fa1 and |f − n2·fs2| = fa2, smallest zones first (Xia 1999). A tone at the same place
 * in both stays as it is: it is true, or one of the frequencies that both rates fold alike.
 * For records without a look into the companion's samples: only its list of tones. Changes the tones' explanations.
 */
export function matchMovedTones(
  tones: Tone[],
  measured: ToneMeasurement[],
  companion: CompanionMeasurement,
  sampleRateHz: number,
  binHz: number,
  reachHz: number,
): void {
  const otherRateHz = companion.sampleRateHz;
  const otherBinHz = companion.durationS > 0 ? 1 / companion.durationS : binHz;
  if (Math.abs(otherRateHz / sampleRateHz - 1) < 1e-6) return;
  measured.forEach((tone, index) => {
    const sigma = toneErrorHz(tone, binHz);
    const others = companion.tones.filter((other) => Math.abs(other.levelDb - tone.levelDb) < largestLevelStepDb);
    const near = (frequencyHz: number) =>
      companion.tones.find(
        (other) =>
          Math.abs(other.frequencyHz - frequencyHz) <= matchSigmas * Math.hypot(sigma, toneErrorHz(other, otherBinHz)),
      );
    if (tone.frequencyHz >= 0.98 * (otherRateHz / 2) || near(tone.frequencyHz) !== undefined) return;
    const candidates = candidatesHz(tone.frequencyHz, sampleRateHz, reachHz).slice(1);
    let tried = 0;
    for (const trueHz of candidates) {
      const expectedHz = aliasHz(trueHz, otherRateHz);
      tried++;
      const match = others
        .filter(
          (other) =>
            Math.abs(other.frequencyHz - expectedHz) <= matchSigmas * Math.hypot(sigma, toneErrorHz(other, otherBinHz)),
        )
        .sort((a, b) => Math.abs(a.frequencyHz - expectedHz) - Math.abs(b.frequencyHz - expectedHz))[0];
      if (match === undefined) continue;
      const tolerance = matchSigmas * Math.hypot(sigma, toneErrorHz(match, otherBinHz));
      // A tone of the companion that also stands here is explained without folding.
      const standsHere = measured.some((own) => Math.abs(own.frequencyHz - match.frequencyHz) <= tolerance);
      if (standsHere) continue;
      const chance = Math.min(1, tried * (1 - Math.exp(-2 * tolerance * match.peaksPerHz)));
      Object.assign(tones[index] as Tone, {
        explanation: 'movedBetweenRates',
        trueFrequencyHz: trueHz,
        confidence: 1 - chance,
        chanceProbability: chance,
        explainedBy: `${companion.name} at ${otherRateHz} Hz shows it at ${match.frequencyHz.toPrecision(6)} Hz`,
      } satisfies Partial<Tone>);
      return;
    }
  });
}
