import { quantile } from '../quantile.js';
import { envelopePoints, lineEnvelope, maskedPower } from './lineEnvelope.js';
import { type SpeedLaw, timeShareAt } from './SpeedLaw.js';
import { binPowers, type WarpedLine, warpedLines } from './warpedLines.js';

/** A line in warped time, seen where it lies beyond fs/2. Frequencies in cycles a sample. */
export interface FoldedLine {
  /** True frequency at relative speed 1. */
  nu: number;
  /** Mean power of the sine while it is folded (flattened signal). */
  power: number;
  /** The folded part over the background, linear. */
  ratio: number;
  /** The same of the part below fs/2; 0 where there is none. */
  inBandRatio: number;
  /** Shares of the stretch during which it is folded, and below fs/2. */
  foldedShare: number;
  inBandShare: number;
  /** True frequency in the middle of the folded part, and where that lands. */
  trueFrequency: number;
  foldedFrequency: number;
  /** Bins by which the folded path differs from any path of the same law in band: below about 3 nothing can be told. */
  apartBins: number;
  /** First and last moment at which it is folded, as shares of the stretch. */
  from: number;
  to: number;
}

const leastRatio = 5;
const mostTried = 64;
const places = [-0.75, -0.5, -0.25, 0, 0.25, 0.5, 0.75];
/** Bins left free around each multiple of fs/2, where a path and its reflection can't be told apart. */
const guardBins = 6;
const leastPoints = 6;
/** Points at each end where the samples fade and the law is least sure. */
const endPoints = 2;

/** @param spectrum of the tapered samples in warped time, bin k at k cycles a stretch, up to the highest order looked for */
export function foldedLines(spectrum: Float64Array, law: SpeedLaw): FoldedLine[] {
  const { length } = law;
  const powers = binPowers(spectrum);
  const speeds = Float64Array.from({ length: envelopePoints }, (_, j) => law.speedAt((j + 0.5) / envelopePoints));
  const fastest = speeds.reduce((top, value) => Math.max(top, value), 0);
  const from = Math.ceil(length / 2 / fastest);
  const lines = warpedLines(powers, from, powers.length - envelopePoints / 2, leastRatio).slice(0, mostTried);
  return lines
    .map((line) => judgeParts(line, spectrum, speeds, law))
    .filter((line): line is FoldedLine => line !== null)
    .sort((a, b) => b.ratio - a.ratio);
}

function judgeParts(line: WarpedLine, spectrum: Float64Array, speeds: Float64Array, law: SpeedLaw): FoldedLine | null {
  const { length } = law;
  const turns = line.bin;
  const guard = guardBins / length;
  const folded = new Uint8Array(envelopePoints);
  const inBand = new Uint8Array(envelopePoints);
  speeds.forEach((speed, j) => {
    if (j < endPoints || j >= envelopePoints - endPoints) return;
    const frequency = (turns * speed) / length;
    const toFold = Math.abs(2 * frequency - Math.round(2 * frequency)) / 2;
    // A crossing is over when the path has left the fold by more than it moves during one point.
    const moves = Math.abs((turns * ((speeds[j + 1] ?? speed) - (speeds[j - 1] ?? speed))) / length / 2);
    if (toFold < Math.max(guard, moves)) return;
    if (frequency > 0.5) folded[j] = 1;
    else inBand[j] = 1;
  });
  const foldedPoints = folded.reduce((sum, value) => sum + value, 0);
  if (foldedPoints < leastPoints) return null;
  const envelope = lineEnvelope(spectrum, line.bin);
  const part = standing(envelope, folded, line.floor);
  const inBandPoints = inBand.reduce((sum, value) => sum + value, 0);
  // Point j holds the samples around it: fewer where the speed is high.
  const samplesOf = (mask: Uint8Array): number =>
    mask.reduce((sum, value, j) => sum + (value * length) / envelopePoints / (speeds[j] as number), 0);
  const samples = samplesOf(folded);
  const meanSpeed = mean(speeds, folded);
  const spread = Math.sqrt(
    speeds.reduce((sum, speed, j) => sum + (folded[j] as number) * (speed - meanSpeed) ** 2, 0) / foldedPoints,
  );
  const middle = middleOf(folded);
  const trueFrequency = (turns / length) * (speeds[middle] as number);
  return {
    nu: turns / length,
    power: (2 * part.power) / samples ** 2,
    ratio: part.ratio,
    inBandRatio: inBandPoints < leastPoints ? 0 : standing(envelope, inBand, line.floor).ratio,
    foldedShare: samples / length,
    inBandShare: samplesOf(inBand) / length,
    trueFrequency,
    foldedFrequency: Math.abs(trueFrequency - Math.round(trueFrequency)),
    apartBins: spread * samples,
    from: timeShareAt(law, folded.indexOf(1) / envelopePoints),
    to: timeShareAt(law, (folded.lastIndexOf(1) + 1) / envelopePoints),
  };
}

/** The best place within a bin, over the mean of the bins farther off and over the floor of the whole stretch. */
function standing(envelope: Float64Array, mask: Uint8Array, floor: number): { power: number; ratio: number } {
  const share = mask.reduce((sum, value) => sum + value, 0) / envelopePoints;
  const power = Math.max(...places.map((m) => maskedPower(envelope, mask, m)));
  const nearest = Math.ceil(2 / share) + 2;
  const beside: number[] = [];
  for (let m = nearest; m <= 24; m++) beside.push(maskedPower(envelope, mask, m), maskedPower(envelope, mask, -m));
  const local = beside.length < 8 ? 0 : quantile(beside, 0.5) / Math.LN2;
  return { power, ratio: power / Math.max(local, share * floor, 1e-300) };
}

const mean = (values: Float64Array, mask: Uint8Array): number =>
  values.reduce((sum, value, j) => sum + value * (mask[j] as number), 0) / mask.reduce((sum, value) => sum + value, 0);

/** The masked point with as many masked points before as after it. */
function middleOf(mask: Uint8Array): number {
  const marked = Array.from(mask.keys()).filter((j) => mask[j] === 1);
  return marked[marked.length >> 1] ?? 0;
}
