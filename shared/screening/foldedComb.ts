import { type HarmonicFamily, matchSigmas, poissonTail, toneErrorHz } from './harmonicFamily.js';
import type { ToneMeasurement } from './MeasurementRecord.js';

export interface FoldedMatch {
  tone: number;
  trueFrequencyHz: number;
  multiple: number;
  chanceProbability: number;
}

const highestFold = 3;
const leastMatches = 2;

/**
 * Folded members of a family. At steady speed all members that fold about m·fs lie on one comb of spacing f0 with offset
 * ±(m·fs mod f0): they are one prediction, of chance 2t/f0 for each comb tried, because a carrier with side-bands imitates a
 * comb exactly; and as many tones as were found have to be unlikely by chance too. The weaker of both statements counts.
 * A comb that falls on the family itself (offset near 0) shows nothing and is left out.
 * @param free tones that nothing in band explains
 */
export function foldedComb(
  tones: ToneMeasurement[],
  free: number[],
  family: HarmonicFamily,
  sampleRateHz: number,
  binHz: number,
  combsTried: number,
): FoldedMatch[] {
  const { fundamentalHz: spacing, fundamentalErrorHz } = family;
  const found: FoldedMatch[] = [];
  for (let fold = 1; fold <= highestFold; fold++) {
    for (const side of [-1, 1] as const) {
      const matches: { tone: number; multiple: number; trueHz: number }[] = [];
      let expected = 0;
      let tolerances = 0;
      for (const index of free) {
        const tone = tones[index] as ToneMeasurement;
        const trueHz = fold * sampleRateHz + side * tone.frequencyHz;
        const multiple = Math.round(trueHz / spacing);
        const tolerance = matchSigmas * Math.hypot(toneErrorHz(tone, binHz), multiple * fundamentalErrorHz);
        expected += Math.min(1, (2 * tolerance) / spacing);
        const ownDistance = Math.abs(tone.frequencyHz - spacing * Math.round(tone.frequencyHz / spacing));
        if (tolerance > 0.15 * spacing || ownDistance < tolerance) continue;
        if (Math.abs(trueHz - multiple * spacing) > tolerance) continue;
        matches.push({ tone: index, multiple, trueHz: multiple * spacing });
        tolerances += tolerance;
      }
      if (matches.length < leastMatches) continue;
      const asOneComb = (2 * (tolerances / matches.length)) / spacing;
      const asMany = poissonTail(matches.length, expected);
      const chance = Math.min(1, Math.max(asOneComb, asMany) * combsTried);
      for (const { tone, multiple, trueHz } of matches) {
        found.push({ tone, multiple, trueFrequencyHz: trueHz, chanceProbability: chance });
      }
    }
  }
  return found.sort((a, b) => a.chanceProbability - b.chanceProbability || a.trueFrequencyHz - b.trueFrequencyHz);
}
