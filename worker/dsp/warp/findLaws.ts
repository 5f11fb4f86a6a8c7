import type { ChirpVote } from './chirpVotes.js';
import { lawFromVotes } from './lawFromVotes.js';
import { type PolishedRate, polishRate } from './polishRate.js';
import { evenChange, proportionalChange, type RateFamily } from './RateFamily.js';
import { refineLaw, type Rung } from './refineLaw.js';
import { sharpness } from './sharpness.js';
import { linearLaw, type SpeedLaw } from './SpeedLaw.js';
import type { TransformOf } from './transformOf.js';
import { binPowers, warpedLines } from './warpedLines.js';
import { type RateCandidate, voteForRates } from './voteForRates.js';

export interface FoundLaw {
  law: SpeedLaw;
  /** Sharpness of the spectrum in warped time, and at steady speed. */
  sharpness: number;
  steadySharpness: number;
}

const mostLaws = 2;
const leastScore = 10;
/** Below three bins of change across fs a law can't be told from a steady one. */
const leastBins = 3;
/** Log-likelihood ratio from which a law of free shape is worth refining. */
const leastGainOfPath = 30;
const leastReach = 0.003;
/** Below this rate even and proportional change are the same. */
const alikeRate = 0.1;
const leastLineRatio = 20;
/** A law has to gather the spectrum this much better than steady speed does, and better than noise can. */
const leastGain = 1.5;
/** One that is known has to do less. */
const leastKnownGain = 1.05;
const noiseSharpness = 2;
const leastSharpness = 3;
/** Noise alone has 2: without lines there is nothing to climb on. */
const sharpnessOfLines = 2.3;
/** So much sharper than steady: no need to look for wander as well. */
const clearGain = 3;
/** Lines up to 1.3·fs/2 count: a sweep through fs/2 has its middle there. */
const countedBand = 0.65;
const firstBin = 3;
const comparedPlaces = 48;
/** Laws whose warped times differ by less than this (samples, rms) are the same law, found twice. */
const sameTurns = 3;
const inBandRatio = 10;

/** From a slope that is known, and from steady speed: each rung needs the law as well as the one before leaves it. */
const upperRungs: Rung[] = [
  { band: 0.2, judgedBand: countedBand, reach: 32 },
  { band: 0.5, judgedBand: countedBand, reach: 12 },
  { band: 0.5, judgedBand: countedBand, reach: 8 },
];
const lowerRungs: Rung[] = [
  { band: 0.03, judgedBand: 0.03, reach: 32 },
  { band: 0.03, judgedBand: 0.03, reach: 32 },
  { band: 0.08, judgedBand: 0.08, reach: 32 },
  { band: 0.2, judgedBand: 0.2, reach: 32 },
];

const ladder = [...lowerRungs, ...upperRungs.slice(1)];

/**
 * Speed laws that gather the energy of the stretch in lines, the sharpest first: linear ones proposed by the slopes of the
 * spectrum's peaks, wander about a steady speed, and laws of free shape from the slopes moment by moment; all refined up a ladder of rising frequency.
 */
export function findLaws(tapered: Float64Array, votes: ChirpVote[], transformOf: TransformOf): FoundLaw[] {
  const { length } = tapered;
  const count = Math.floor(countedBand * length);
  const sharpnessOf = (law: SpeedLaw): number =>
    sharpness(transformOf(count).forward(law.warped, tapered), firstBin, count);
  const steady = linearLaw(0, length);
  const steadySharpness = sharpnessOf(steady);
  const least = Math.max(leastSharpness, leastGain * steadySharpness);
  const found: FoundLaw[] = [];
  const consider = (start: SpeedLaw, rungs: Rung[]): void => {
    const law = rungs.reduce((reached, rung) => refineLaw(tapered, reached, rung, transformOf), start);
    if (law === steady || found.some((other) => isSameLaw(other.law, law))) return;
    const sharp = sharpnessOf(law);
    if (sharp >= least) found.push({ law, sharpness: sharp, steadySharpness });
  };
  const candidates = voteForRates(evenChange, votes, length, mostLaws).map((rate) => ({ family: evenChange, rate }));
  if (candidates.some(({ rate }) => Math.abs(rate.rate) > alikeRate)) {
    const others = voteForRates(proportionalChange, votes, length, 1);
    candidates.push(...others.map((rate) => ({ family: proportionalChange, rate })));
  }
  for (const { family, rate } of candidates) {
    if (rate.score < leastScore || Math.abs(rate.rate) * length < leastBins) continue;
    const polished = polishBest(tapered, family, rate);
    if (polished === null || Math.abs(polished.rate) > family.largest) continue;
    const start = family.lawOf(polished.rate, length);
    if (sharpnessOf(start) < least) continue;
    consider(polishHigh(tapered, family, polished.rate, sharpnessOf, transformOf), upperRungs);
  }
  const isClear = (): boolean => found.some((law) => law.sharpness > clearGain * steadySharpness);
  if (!isClear() && steadySharpness > sharpnessOfLines) consider(steady, ladder);
  if (!isClear()) {
    const voted = lawFromVotes(votes, length);
    if (voted.gain > leastGainOfPath) consider(voted.law, ladder);
  }
  return found.sort((a, b) => b.sharpness - a.sharpness).slice(0, mostLaws);
}

/**
 * A law known from elsewhere, refined up the upper rungs; null where it is steady or nothing in the stretch follows it.
 */
export function followLaw(tapered: Float64Array, known: SpeedLaw, transformOf: TransformOf): FoundLaw | null {
  const count = Math.floor(countedBand * tapered.length);
  const sharpnessOf = (law: SpeedLaw): number =>
    sharpness(transformOf(count).forward(law.warped, tapered), firstBin, count);
  const steady = linearLaw(0, tapered.length);
  const law = upperRungs.reduce((reached, rung) => refineLaw(tapered, reached, rung, transformOf), known);
  if (isSameLaw(law, steady)) return null;
  const found = { law, sharpness: sharpnessOf(law), steadySharpness: sharpnessOf(steady) };
  return found.sharpness > leastKnownGain * Math.max(noiseSharpness, found.steadySharpness) ? found : null;
}

/**
 * Laws that hardly differ but in their mean speed, which only names the lines otherwise. The ends, where samples fade and
 * no line holds a law, don't count.
 */
function isSameLaw(a: SpeedLaw, b: SpeedLaw): boolean {
  const { length } = a;
  const skip = Math.floor(0.08 * length);
  const places = Array.from({ length: comparedPlaces }, (_, i) =>
    Math.floor(skip + ((length - 1 - 2 * skip) * i) / (comparedPlaces - 1)),
  );
  const x = places.map((n) => b.warped[n] as number);
  const y = places.map((n) => a.warped[n] as number);
  const meanX = x.reduce((sum, value) => sum + value, 0) / comparedPlaces;
  const meanY = y.reduce((sum, value) => sum + value, 0) / comparedPlaces;
  const xx = x.reduce((sum, value) => sum + (value - meanX) ** 2, 0);
  const slope = x.reduce((sum, value, i) => sum + (value - meanX) * ((y[i] as number) - meanY), 0) / xx;
  const squares = x.reduce((sum, value, i) => sum + ((y[i] as number) - meanY - slope * (value - meanX)) ** 2, 0);
  return Math.sqrt(squares / comparedPlaces) * length < sameTurns;
}

/** Of the lines that support a candidate the one that fixes its slope best. */
function polishBest(
  tapered: Float64Array,
  family: RateFamily,
  { rate, reach, lines }: RateCandidate,
): PolishedRate | null {
  const all = lines
    .map((nu) => polishRate(tapered, family, { rate, nu, reach: Math.max(reach, leastReach) }))
    .filter(({ ratio }) => ratio > leastLineRatio);
  all.sort((a, b) => b.ratio * b.nu ** 2 - a.ratio * a.nu ** 2);
  return all[0] ?? null;
}

/** The law once more, from the strongest high line that it gathers below fs/2; the sharper of both. */
function polishHigh(
  tapered: Float64Array,
  family: RateFamily,
  rate: number,
  sharpnessOf: (law: SpeedLaw) => number,
  transformOf: TransformOf,
): SpeedLaw {
  const { length } = tapered;
  const law = family.lawOf(rate, length);
  const to = Math.floor(length / 2 / Math.max(law.speedAt(0), law.speedAt(1)));
  const spectrum = transformOf(Math.floor(countedBand * length)).forward(law.warped, tapered);
  const lines = warpedLines(binPowers(spectrum), firstBin, to, inBandRatio);
  lines.sort((a, b) => b.power * b.bin ** 2 - a.power * a.bin ** 2);
  const [line] = lines;
  if (line === undefined) return law;
  const polished = polishRate(tapered, family, { rate, nu: line.bin / length, reach: 5e-4 }).rate;
  const other = family.lawOf(polished, length);
  return sharpnessOf(other) > sharpnessOf(law) ? other : law;
}
