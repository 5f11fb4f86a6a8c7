import type { ChirpVote } from './chirpVotes.js';
import { lawFromWarped, type SpeedLaw } from './SpeedLaw.js';

const cells = 32;
/** Relative slopes tried, per half stretch, closer together around 0: ±scale·sinh(1 … steepness). */
const slopes = 81;
const slopeScale = 0.01;
const steepness = 6.6;
/** Frames longer than this share of the stretch see more than one slope. */
const longestFrame = 1 / 8;
const followingShare = 0.3;
const voteWeight = 0.5;
/** A change from cell to cell that costs a half in log-likelihood: in grid steps, or in slope, whichever is cheaper. */
const easySteps = 3;
const easySlope = 0.1;

const grid = Float64Array.from(
  { length: slopes },
  (_, i) => slopeScale * Math.sinh(steepness * ((2 * i) / (slopes - 1) - 1)),
);

export interface VotedLaw {
  law: SpeedLaw;
  /** Log-likelihood ratio of the path against a steady speed. */
  gain: number;
}

/**
 * A speed law of any smooth shape: in each of 32 moments the votes for a relative slope d(ln s)/dτ, the path through them
 * that has most support while changing evenly (Viterbi 1967), and the law that has these slopes.
 */
export function lawFromVotes(votes: ChirpVote[], length: number): VotedLaw {
  const half = length / 2;
  const support = Array.from({ length: cells }, () => new Float64Array(slopes));
  const near = votes.filter(({ frameLength }) => frameLength <= longestFrame * length);
  for (const { at, frequency, slope, slopeError, noiseSpread } of near) {
    const row = support[Math.min(cells - 1, Math.floor((at * cells) / length))] as Float64Array;
    const scale = half / frequency;
    const z0 = slope / noiseSpread;
    const odds =
      ((followingShare / (1 - followingShare)) * (noiseSpread / slopeError) * (1 + (z0 * z0) / 2) ** 1.5) /
      (0.35 * 2.5066);
    for (let i = 0; i < slopes; i++) {
      const spacing = ((grid[Math.min(slopes - 1, i + 1)] as number) - (grid[Math.max(0, i - 1)] as number)) / 4;
      const error = Math.hypot(slopeError * scale, spacing);
      const z = (slope * scale - (grid[i] as number)) / error;
      if (z > 4 || z < -4) continue;
      row[i] =
        (row[i] as number) + voteWeight * Math.log(1 + ((odds * slopeError * scale) / error) * Math.exp(-0.5 * z * z));
    }
  }
  const { path, score } = bestPath(support);
  const steady = support.reduce((sum, row) => sum + (row[(slopes - 1) / 2] as number), 0);
  return { law: lawFromSlopes(refine(path, near, length), length), gain: score - steady };
}

function bestPath(support: Float64Array[]): { path: number[]; score: number } {
  const cost = (a: number, b: number): number =>
    0.5 * Math.min(((a - b) / easySteps) ** 2, (((grid[a] as number) - (grid[b] as number)) / easySlope) ** 2);
  let totals = Float64Array.from(support[0] as Float64Array);
  const origins: Uint8Array[] = [];
  for (const row of support.slice(1)) {
    const origin = new Uint8Array(slopes);
    const next = row.map((own, to) => {
      let best = -Infinity;
      for (let from = 0; from < slopes; from++) {
        const value = (totals[from] as number) - cost(from, to);
        if (value > best) {
          best = value;
          origin[to] = from;
        }
      }
      return own + best;
    });
    origins.push(origin);
    totals = next;
  }
  let place = totals.reduce((top, value, i) => (value > (totals[top] as number) ? i : top), 0);
  const score = totals[place] as number;
  const path = [place];
  for (const origin of origins.reverse()) path.unshift((place = origin[place] as number));
  return { path, score };
}

/** Each moment's slope as the mean of the votes around the path, the surest counting most. */
function refine(path: number[], votes: ChirpVote[], length: number): Float64Array {
  const half = length / 2;
  const sums = new Float64Array(cells);
  const weights = new Float64Array(cells);
  const start = Float64Array.from(path, (i) => grid[i] as number);
  for (const { at, frequency, slope, slopeError } of votes) {
    const cell = Math.min(cells - 1, Math.floor((at * cells) / length));
    const i = path[cell] as number;
    const spacing = ((grid[Math.min(slopes - 1, i + 1)] as number) - (grid[Math.max(0, i - 1)] as number)) / 2;
    const error = (slopeError * half) / frequency;
    const value = (slope * half) / frequency;
    if (Math.abs(value - (start[cell] as number)) > 2 * Math.hypot(error, spacing)) continue;
    const weight = 1 / (error * error + (spacing * spacing) / 4);
    sums[cell] = (sums[cell] as number) + weight * value;
    weights[cell] = (weights[cell] as number) + weight;
  }
  return start.map((value, cell) =>
    (weights[cell] as number) > 0 ? (sums[cell] as number) / (weights[cell] as number) : value,
  );
}

/** ln s is the integral of the slopes over τ, straight between the middles of the cells. */
function lawFromSlopes(values: Float64Array, length: number): SpeedLaw {
  const warped = new Float64Array(length);
  let logSpeed = 0;
  let sum = 0;
  for (let n = 0; n < length; n++) {
    warped[n] = sum;
    const exact = Math.min(cells - 1, Math.max(0, (n * cells) / length - 0.5));
    const low = Math.floor(exact);
    const from = values[low] as number;
    const slope = from + (exact - low) * ((values[Math.min(cells - 1, low + 1)] as number) - from);
    sum += Math.exp(logSpeed);
    logSpeed += (2 * slope) / length;
  }
  return lawFromWarped(warped);
}
