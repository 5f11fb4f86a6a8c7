import type { ChirpVote } from './chirpVotes.js';
import { type PolishedRate, polishRate } from './polishRate.js';
import { sharpness } from './sharpness.js';
import { linearLaw, type SpeedLaw } from './SpeedLaw.js';
import type { TransformOf } from './transformsBySize.js';
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
const leastReach = 0.003;
const leastLineRatio = 20;
/** A law has to gather the spectrum this much better than steady speed does, and better than noise can. */
const leastGain = 1.5;
const leastSharpness = 3;
/** Lines up to 1.3·fs/2 count: a sweep through fs/2 has its middle there. */
const countedBand = 0.65;
const firstBin = 3;
const inBandRatio = 10;

/** Linear speed laws that gather the energy of the stretch in lines, the one with most support first. */
export function findLaws(tapered: Float64Array, votes: ChirpVote[], transformOf: TransformOf): FoundLaw[] {
  const { length } = tapered;
  const count = Math.floor(countedBand * length);
  const sharpnessOf = (law: SpeedLaw): number =>
    sharpness(transformOf(count).forward(law.warped, tapered), firstBin, count);
  let steady: number | null = null;
  const found: FoundLaw[] = [];
  for (const candidate of voteForRates(votes, length, mostLaws)) {
    if (candidate.score < leastScore || Math.abs(candidate.rho) * length < leastBins) continue;
    const polished = polishBest(tapered, candidate);
    if (polished === null) continue;
    steady ??= sharpnessOf(linearLaw(0, length));
    const least = Math.max(leastSharpness, leastGain * steady);
    const first = linearLaw(polished.rho, length);
    const best = { law: first, sharpness: sharpnessOf(first), steadySharpness: steady };
    if (best.sharpness < least) continue;
    const rho = polishHigh(tapered, polished.rho, transformOf);
    if (rho !== null) {
      const law = linearLaw(rho, length);
      const sharp = sharpnessOf(law);
      if (sharp > best.sharpness) Object.assign(best, { law, sharpness: sharp });
    }
    if (!found.some(({ law }) => isSameLaw(law, best.law))) found.push(best);
  }
  return found;
}

/** Laws that no line below fs/2 tells apart. */
function isSameLaw(a: SpeedLaw, b: SpeedLaw): boolean {
  const difference = a.warped.reduce((most, value, n) => Math.max(most, Math.abs(value - (b.warped[n] as number))), 0);
  return difference * a.length < 2;
}

/** Of the lines that support a candidate the one that fixes its slope best. */
function polishBest(tapered: Float64Array, { rho, reach, lines }: RateCandidate): PolishedRate | null {
  const all = lines
    .map((nu) => polishRate(tapered, rho, nu, Math.max(reach, leastReach)))
    .filter(({ ratio }) => ratio > leastLineRatio);
  all.sort((a, b) => b.ratio * b.nu ** 2 - a.ratio * a.nu ** 2);
  return all[0] ?? null;
}

/** The slope once more, from the strongest high line that the law gathers below fs/2. */
function polishHigh(tapered: Float64Array, rho: number, transformOf: TransformOf): number | null {
  const { length } = tapered;
  const to = Math.floor(length / 2 / (1 + Math.abs(rho)));
  const spectrum = transformOf(Math.floor(countedBand * length)).forward(linearLaw(rho, length).warped, tapered);
  const lines = warpedLines(binPowers(spectrum), firstBin, to, inBandRatio);
  lines.sort((a, b) => b.power * b.bin ** 2 - a.power * a.bin ** 2);
  const [line] = lines;
  return line === undefined ? null : polishRate(tapered, rho, line.bin / length, 5e-4).rho;
}
