import {
  type HarmonicFamily,
  matchSigmas,
  ownWanderHz,
  poissonTail,
  sharedWanderHz,
  toneErrorHz,
} from './harmonicFamily.js';
import type { ToneMeasurement } from './MeasurementRecord.js';
import { type FundamentalTrack, fundamentalTrack, slopeAgrees } from './phaseSlope.js';

export interface FoldedMatch {
  tone: number;
  trueFrequencyHz: number;
  multiple: number;
  chanceProbability: number;
}

const highestFold = 3;
/** Combs tried, weighted so that near folds cost less (weighted Bonferroni, Genovese, Roeder & Wasserman 2006): Σ 1/weight < 1. */
const combWeight = (fold: number): number => 2 ** (fold + 1);
/** Subharmonics (half orders of an engine, two machines on one belt) stand at these parts of the spacing in their own right. */
const ownParts = [0, 1 / 4, 1 / 3, 1 / 2, 2 / 3, 3 / 4, 1];

interface Match {
  tone: number;
  multiple: number;
  trueHz: number;
  distanceHz: number;
  errorHz: number;
  /** Chance that a tone wanders as this one is predicted to; null where none of the two wanders visibly. */
  slopeChance: number | null;
}

/**
 * Folded members of a family. At steady speed all members that fold about m·fs lie on one comb of spacing f0 with offset
 * ±(m·fs mod f0): they are one prediction, of chance 2t/f0 for each comb tried, because a carrier with side-bands imitates a
 * comb exactly; t is how far the comb really lies off its predicted place, and what that is uncertain by. As many tones as were
 * found have to be unlikely by chance too: the weaker of both statements counts. A comb that falls on the family itself or on
 * its subharmonics shows nothing and is left out, and so is a tone in the skirt of a stronger member that wanders. Where the
 * speed wanders visibly, the tones' phases have to follow it the predicted number of times, upside down in even zones: place
 * and slope together leave side-bands no room.
 * @param free tones that nothing in band explains
 */
export function foldedComb(
  tones: ToneMeasurement[],
  free: number[],
  family: HarmonicFamily,
  sampleRateHz: number,
  binHz: number,
  familiesTried: number,
): FoldedMatch[] {
  const spacingHz = family.fundamentalHz;
  const candidates = free.filter((index) => !isInSkirt(tones, index, family));
  const track = fundamentalTrack(tones, family);
  const found: FoldedMatch[] = [];
  for (let fold = 1; fold <= highestFold; fold++) {
    for (const side of [-1, 1] as const) {
      const offset = ((((side * fold * sampleRateHz) % spacingHz) + spacingHz) % spacingHz) / spacingHz;
      const comb = matchComb(tones, candidates, { ...family, track }, fold * sampleRateHz, side, binHz);
      const { expected, toleranceHz } = comb;
      const leastDistance = Math.max(1.5 * toleranceHz, binHz) / spacingHz;
      const isOnOwn = ownParts.some((part) => Math.abs(offset - part) < leastDistance);
      // What stands where the family or its subharmonics do is told from them by the way it wanders alone.
      const matches = isOnOwn ? comb.matches.filter(({ slopeChance }) => slopeChance !== null) : comb.matches;
      if (matches.length === 0) continue;
      const asOneComb = (2 * combOffsetHz(matches, family.fundamentalErrorHz)) / spacingHz;
      const asMany = poissonTail(matches.length, expected);
      const chance = Math.min(1, Math.max(asOneComb, asMany) * combWeight(fold) * familiesTried);
      for (const { tone, multiple, trueHz, slopeChance } of matches) {
        const both = chance * (slopeChance ?? 1);
        found.push({ tone, multiple, trueFrequencyHz: trueHz, chanceProbability: both });
      }
    }
  }
  return found.sort((a, b) => a.chanceProbability - b.chanceProbability || a.trueFrequencyHz - b.trueFrequencyHz);
}

function matchComb(
  tones: ToneMeasurement[],
  candidates: number[],
  { fundamentalHz, fundamentalErrorHz, relativeWander, track }: HarmonicFamily & { track: FundamentalTrack | null },
  centreHz: number,
  side: -1 | 1,
  binHz: number,
): { matches: Match[]; expected: number; toleranceHz: number } {
  const matches: Match[] = [];
  let expected = 0;
  const tolerances: number[] = [];
  for (const index of candidates) {
    const tone = tones[index] as ToneMeasurement;
    const placeHz = centreHz + side * tone.frequencyHz;
    const multiple = Math.round(placeHz / fundamentalHz);
    const toleranceHz =
      matchSigmas *
      Math.hypot(
        toneErrorHz(tone, binHz),
        sharedWanderHz(tone, relativeWander * placeHz),
        multiple * fundamentalErrorHz,
      );
    expected += Math.min(1, (2 * toleranceHz) / fundamentalHz);
    const distanceHz = placeHz - multiple * fundamentalHz;
    if (toleranceHz > 0.15 * fundamentalHz || Math.abs(distanceHz) > toleranceHz) continue;
    const slope = slopeAgrees(tone, track, side * multiple);
    if (slope?.agrees === false) continue;
    tolerances.push(toleranceHz);
    matches.push({
      tone: index,
      multiple,
      trueHz: multiple * fundamentalHz,
      distanceHz,
      errorHz: Math.hypot(
        tone.boundHz,
        ownWanderHz(tone),
        sharedWanderHz(tone, relativeWander * placeHz),
        leastErrorBins * binHz,
      ),
      slopeChance: slope?.chance ?? null,
    });
  }
  return { matches, expected, toleranceHz: tolerances.sort((a, b) => a - b)[tolerances.length >> 1] ?? 0 };
}

/** The family with its fundamental refitted to folded members too; null where there are none. */
export function refineFamily(
  family: HarmonicFamily,
  tones: ToneMeasurement[],
  matches: FoldedMatch[],
  sampleRateHz: number,
): HarmonicFamily | null {
  if (matches.length === 0) return null;
  let weight = family.fundamentalErrorHz ** -2;
  let weighted = weight * family.fundamentalHz;
  for (const { tone: index, multiple, trueFrequencyHz } of matches) {
    const tone = tones[index] as ToneMeasurement;
    const fold = Math.round(trueFrequencyHz / sampleRateHz) * sampleRateHz;
    const placeHz = fold + Math.sign(trueFrequencyHz - fold) * tone.frequencyHz;
    const errorHz = Math.hypot(
      tone.boundHz,
      ownWanderHz(tone),
      sharedWanderHz(tone, family.relativeWander * placeHz),
      1e-9 * placeHz,
    );
    const w = (multiple / errorHz) ** 2;
    weight += w;
    weighted += (w * placeHz) / multiple;
  }
  return { ...family, fundamentalHz: weighted / weight, fundamentalErrorHz: weight ** -0.5 };
}

/** No real source is steadier than this part of 1/T. */
const leastErrorBins = 0.02;

/** Weighted mean of the matches' signed distances, and its standard error: where the comb as a whole lies. */
function combOffsetHz(matches: Match[], fundamentalErrorHz: number): number {
  let [weights, weighted, multiples] = [0, 0, 0];
  for (const { distanceHz, errorHz, multiple } of matches) {
    const weight = errorHz ** -2;
    weights += weight;
    weighted += weight * distanceHz;
    multiples += weight * multiple;
  }
  const errorHz = Math.hypot(1 / Math.sqrt(weights), (multiples / weights) * fundamentalErrorHz);
  return Math.abs(weighted / weights) + errorHz;
}

/** Within this many times a member's wander, and this much weaker, a line is the member's own skirt. */
const skirtWanders = 12;
const skirtDb = 6;

function isInSkirt(tones: ToneMeasurement[], index: number, family: HarmonicFamily): boolean {
  const tone = tones[index] as ToneMeasurement;
  return family.members.some(({ tone: place, multiple }) => {
    const member = tones[place] as ToneMeasurement;
    // A speed that wanders spreads every member in proportion, also one whose own wander was too faint to measure.
    const wanderHz = Math.max(member.wanderHz, multiple * family.relativeWander * family.fundamentalHz);
    return (
      member.levelDb > tone.levelDb + skirtDb &&
      Math.abs(member.frequencyHz - tone.frequencyHz) < skirtWanders * wanderHz
    );
  });
}
