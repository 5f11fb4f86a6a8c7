import type { ChirpVote } from './chirpVotes.js';
import type { RateFamily } from './RateFamily.js';

export interface RateCandidate {
  /** Parameter of the family. */
  rate: number;
  /** Half the width over which the support is within a factor e⁸ of its best. */
  reach: number;
  /** Frequencies at mid stretch, cycles a sample, where most of the supporting votes gather. */
  lines: number[];
  /** Log-likelihood ratio of the votes against votes of plain noise. */
  score: number;
}

/** Shares of a cell's votes that may follow one law: each cell takes the one that suits it best, or none. */
const shares = [0.02, 0.1, 0.3, 0.7];
/** Frames overlap by half, which halves what a vote says. */
const voteWeight = 0.5;
const startsPerCell = 8;
/** A line in warped time: votes this near each other, cycles a sample. */
const lineWidth = 0.004;
const linesListed = 3;
const leastScore = 4;
const farAway = 5;
const reachDrop = 8;

type Rate = Omit<RateCandidate, 'lines'>;

/** A vote with its place τ and all slopes relative to the frequency, per half capture. */
interface RelativeVote {
  tau: number;
  frequency: number;
  slope: number;
  error: number;
  /** Density of the law's slope over that of this slope among peaks of plain noise, at no distance. */
  peakRatio: number;
  rate: number;
  rateError: number;
}

/** The rates with most support, best first; each next one from the votes that the ones before leave unexplained. */
export function voteForRates(family: RateFamily, chirps: ChirpVote[], length: number, most: number): RateCandidate[] {
  let cells = groupVotes(family, chirps, length);
  const found: RateCandidate[] = [];
  while (found.length < most) {
    const best = bestRate(family, cells);
    if (best.score < leastScore) break;
    const distance = (vote: RelativeVote): number =>
      Math.abs(vote.slope - family.slopeAt(best.rate, vote.tau)) / vote.error;
    const supporting = cells.flatMap((cell) => cell.filter((vote) => distance(vote) < 3));
    found.push({ ...best, lines: gatherLines(family, supporting, best.rate) });
    cells = cells.map((cell) => cell.filter((vote) => distance(vote) > farAway));
  }
  return found;
}

function bestRate(family: RateFamily, cells: RelativeVote[][]): Rate {
  const starts = cells.flatMap((cell) =>
    cell
      .filter(({ rate, rateError }) => Math.abs(rate) < family.largest && rateError < 0.3)
      .sort((a, b) => a.rateError - b.rateError)
      .slice(0, startsPerCell),
  );
  let best: Rate = { rate: 0, reach: 0, score: rateScore(family, cells, 0) };
  const consider = (rate: number): void => {
    if (Math.abs(rate) > family.largest) return;
    const score = rateScore(family, cells, rate);
    if (score > best.score) best = { rate, reach: 0, score };
  };
  for (const { rate } of starts) consider(rate);
  for (let step = 0.004; step > 1e-6; step /= 2) {
    const { rate } = best;
    consider(rate - step);
    consider(rate + step);
  }
  return { ...best, reach: Math.max(reachTo(family, cells, best, 1), reachTo(family, cells, best, -1)) };
}

function reachTo(family: RateFamily, cells: RelativeVote[][], { rate, score }: Rate, direction: 1 | -1): number {
  let step = 1e-5;
  while (step < 0.1 && rateScore(family, cells, rate + direction * step) > score - reachDrop) step *= 1.6;
  return step;
}

/** Strongest gatherings of the votes' frequencies at mid stretch. */
function gatherLines(family: RateFamily, votes: RelativeVote[], rate: number): number[] {
  const places = votes
    .map(({ frequency, tau, error }) => ({
      nu: frequency / family.speedAt(rate, tau),
      weight: 1 / (error * frequency),
    }))
    .sort((a, b) => a.nu - b.nu);
  const lines: number[] = [];
  let left = places;
  while (lines.length < linesListed && left.length > 0) {
    let top = { sum: 0, nu: 0 };
    let from = 0;
    let sum = 0;
    for (const { nu, weight } of left) {
      sum += weight;
      while (nu - (left[from] as { nu: number }).nu > lineWidth) sum -= (left[from++] as { weight: number }).weight;
      if (sum > top.sum) top = { sum, nu: (nu + (left[from] as { nu: number }).nu) / 2 };
    }
    lines.push(top.nu);
    left = left.filter(({ nu }) => Math.abs(nu - top.nu) > lineWidth);
  }
  return lines;
}

function groupVotes(family: RateFamily, votes: ChirpVote[], length: number): RelativeVote[][] {
  const half = length / 2;
  const cells = new Map<number, RelativeVote[]>();
  for (const { at, frequency, slope, slopeError, noiseSpread, cell } of votes) {
    const scale = half / frequency;
    const tau = (at - half) / half;
    const relative = slope * scale;
    const own = family.rateFrom(relative, tau);
    const z = slope / noiseSpread;
    const vote = {
      tau,
      frequency,
      slope: relative,
      error: slopeError * scale,
      peakRatio: ((noiseSpread / slopeError) * (1 + (z * z) / 2) ** 1.5) / (0.35 * 2.5066),
      rate: own?.rate ?? 0,
      rateError: own === null ? Infinity : slopeError * scale * own.stretch,
    };
    const list = cells.get(cell);
    if (list === undefined) cells.set(cell, [vote]);
    else list.push(vote);
  }
  return [...cells.values()];
}

function rateScore(family: RateFamily, cells: RelativeVote[][], rate: number): number {
  let total = 0;
  const sums = new Float64Array(shares.length);
  for (const cell of cells) {
    sums.fill(0);
    let far = 0;
    for (const { slope, tau, error, peakRatio } of cell) {
      const z = (slope - family.slopeAt(rate, tau)) / error;
      if (z > farAway || z < -farAway) {
        far++;
        continue;
      }
      const excess = peakRatio * Math.exp(-0.5 * z * z) - 1;
      for (let i = 0; i < shares.length; i++)
        sums[i] = (sums[i] as number) + Math.log(1 + (shares[i] as number) * excess);
    }
    let best = 0;
    for (let i = 0; i < shares.length; i++) {
      best = Math.max(best, (sums[i] as number) + far * Math.log(1 - (shares[i] as number)));
    }
    total += best;
  }
  return voteWeight * total;
}
