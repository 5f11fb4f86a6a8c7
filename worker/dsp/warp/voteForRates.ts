import type { ChirpVote } from './chirpVotes.js';

export interface RateCandidate {
  /** Relative slope ρ of the law s(τ) = 1 + ρ·τ, τ = −1 … 1 over the capture. */
  rho: number;
  /** Half the width over which the support is within a factor e⁸ of its best. */
  reach: number;
  /** Frequencies at mid stretch, cycles a sample, where most of the supporting votes gather. */
  lines: number[];
  /** Log-likelihood ratio of the votes against votes of plain noise. */
  score: number;
}

const largestRho = 0.96;
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
  rho: number;
  rhoError: number;
}

/** The rates with most support, best first; each next one from the votes that the ones before leave unexplained. */
export function voteForRates(chirps: ChirpVote[], length: number, most: number): RateCandidate[] {
  let cells = groupVotes(chirps, length);
  const found: RateCandidate[] = [];
  while (found.length < most) {
    const best = bestRate(cells);
    if (best.score < leastScore) break;
    const distance = (vote: RelativeVote): number =>
      Math.abs(vote.slope - best.rho / (1 + best.rho * vote.tau)) / vote.error;
    const supporting = cells.flatMap((cell) => cell.filter((vote) => distance(vote) < 3));
    found.push({ ...best, lines: gatherLines(supporting, best.rho) });
    cells = cells.map((cell) => cell.filter((vote) => distance(vote) > farAway));
  }
  return found;
}

function bestRate(cells: RelativeVote[][]): Rate {
  const starts = cells.flatMap((cell) =>
    cell
      .filter(({ rho, rhoError }) => Math.abs(rho) < largestRho && rhoError < 0.3)
      .sort((a, b) => a.rhoError - b.rhoError)
      .slice(0, startsPerCell),
  );
  let best: Rate = { rho: 0, reach: 0, score: rateScore(cells, 0) };
  const consider = (rho: number): void => {
    if (Math.abs(rho) > largestRho) return;
    const score = rateScore(cells, rho);
    if (score > best.score) best = { rho, reach: 0, score };
  };
  for (const { rho } of starts) consider(rho);
  for (let step = 0.004; step > 1e-6; step /= 2) {
    const { rho } = best;
    consider(rho - step);
    consider(rho + step);
  }
  return { ...best, reach: Math.max(reachTo(cells, best, 1), reachTo(cells, best, -1)) };
}

function reachTo(cells: RelativeVote[][], { rho, score }: Rate, direction: 1 | -1): number {
  let step = 1e-5;
  while (step < 0.1 && rateScore(cells, rho + direction * step) > score - reachDrop) step *= 1.6;
  return step;
}

/** Strongest gatherings of the votes' frequencies at mid stretch. */
function gatherLines(votes: RelativeVote[], rho: number): number[] {
  const places = votes
    .map(({ frequency, tau, error }) => ({ nu: frequency / (1 + rho * tau), weight: 1 / (error * frequency) }))
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

function groupVotes(votes: ChirpVote[], length: number): RelativeVote[][] {
  const half = length / 2;
  const cells = new Map<number, RelativeVote[]>();
  for (const { at, frequency, slope, slopeError, noiseSpread, cell } of votes) {
    const scale = half / frequency;
    const tau = (at - half) / half;
    const relative = slope * scale;
    const bottom = 1 - relative * tau;
    const z = slope / noiseSpread;
    const vote = {
      tau,
      frequency,
      slope: relative,
      error: slopeError * scale,
      peakRatio: ((noiseSpread / slopeError) * (1 + (z * z) / 2) ** 1.5) / (0.35 * 2.5066),
      rho: relative / bottom,
      rhoError: bottom > 0.02 ? (slopeError * scale) / (bottom * bottom) : Infinity,
    };
    const list = cells.get(cell);
    if (list === undefined) cells.set(cell, [vote]);
    else list.push(vote);
  }
  return [...cells.values()];
}

function rateScore(cells: RelativeVote[][], rho: number): number {
  let total = 0;
  const sums = new Float64Array(shares.length);
  for (const cell of cells) {
    sums.fill(0);
    let far = 0;
    for (const { slope, tau, error, peakRatio } of cell) {
      const z = (slope - rho / (1 + rho * tau)) / error;
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
