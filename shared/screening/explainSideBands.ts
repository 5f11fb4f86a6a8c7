import type { Tone } from '../schemas/screening.js';
import { matchSigmas, toneErrorHz } from './harmonicFamily.js';
import type { ToneMeasurement } from './MeasurementRecord.js';

const weakerByDb = 3;
const leastConfidence = 0.9;

/**
 * Side-bands: two unexplained tones at the same distance below and above a stronger one (modulation of a carrier by a
 * shaft, a gear, a supply). Explains them in place, with the chance that two tones stand so by accident.
 */
export function explainSideBands(tones: Tone[], measured: ToneMeasurement[], binHz: number): void {
  const free = tones
    .map((_, index) => index)
    .filter((index) => tones[index]?.explanation === 'unexplained')
    .sort((a, b) => (measured[b]?.levelDb ?? 0) - (measured[a]?.levelDb ?? 0));
  for (const lower of free) {
    for (const upper of free) {
      const [a, b] = [measured[lower] as ToneMeasurement, measured[upper] as ToneMeasurement];
      if (b.frequencyHz <= a.frequencyHz || tones[lower]?.explanation !== 'unexplained') continue;
      if (tones[upper]?.explanation !== 'unexplained') continue;
      const toleranceHz = matchSigmas * Math.hypot(toneErrorHz(a, binHz), toneErrorHz(b, binHz));
      const centreHz = (a.frequencyHz + b.frequencyHz) / 2;
      const carrier = measured.findIndex(
        (tone) =>
          Math.abs(tone.frequencyHz - centreHz) < toleranceHz / 2 &&
          tone.levelDb > Math.max(a.levelDb, b.levelDb) + weakerByDb,
      );
      if (carrier < 0) continue;
      // How many pairs there were to try for this carrier is what the density of peaks says.
      const chance = Math.min(1, free.length * (1 - Math.exp(-toleranceHz * b.peaksPerHz)));
      if (1 - chance < leastConfidence) continue;
      const spacingHz = (b.frequencyHz - a.frequencyHz) / 2;
      for (const index of [lower, upper]) {
        Object.assign(tones[index] as Tone, {
          explanation: 'harmonic',
          confidence: 1 - chance,
          chanceProbability: chance,
          explainedBy: `side-band at ${spacingHz.toPrecision(4)} Hz of ${(measured[carrier] as ToneMeasurement).frequencyHz.toPrecision(6)} Hz`,
        } satisfies Partial<Tone>);
      }
    }
  }
}
