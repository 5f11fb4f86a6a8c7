import { createChirpTransform } from '../dsp/createChirpTransform.js';
import { createRealFft } from '../dsp/createRealFft.js';
import { hannWindow } from '../dsp/hannWindow.js';
import type { Clock, Recorded } from './measureMoves.js';

/**
 * Two aligned captures cut into the same moments and put on one frequency grid. `ours` holds this capture's transform at
 * b·stepHz up to fs/2, `theirs` the companion's at j·stepHz up to the reach, beyond half its own rate too, both interleaved and
 * with phases on one clock; row after row of one segment each.
 */
export interface ZoneCells {
  segments: number;
  stepHz: number;
  /** Bins of one row of this capture: 0 … fs/2. */
  ownBins: number;
  otherBins: number;
  ours: Float64Array;
  theirs: Float64Array;
  /** Stretch of time behind the segments, overlaps counted once, s. */
  coveredS: number;
}

const mostSegments = 512;
const mostCells = 2 ** 20;
const leastSegments = 8;

/**
 * Hann-windowed segments, 50 % overlap; longer captures are sampled by segments spread evenly.
 * @param reachHz highest frequency wanted of the companion
 * @returns null where the overlap is too short
 */
export function zoneCells(
  own: Recorded,
  other: Recorded,
  { lagS, clockRatio }: Clock,
  reachHz: number,
): ZoneCells | null {
  const fromS = Math.max(0, -lagS / clockRatio);
  const toS = Math.min(own.samples.length / own.rateHz, (other.samples.length / other.rateHz - lagS) / clockRatio);
  const frames = Math.floor((toS - fromS) * own.rateHz) - 2;
  const length = Math.min(1024, 2 ** Math.floor(Math.log2(Math.max(1, frames / 48))));
  if (length < 32) return null;
  const stepHz = own.rateHz / length;
  const ownBins = length / 2 + 1;
  const otherBins = Math.floor(reachHz / stepHz) + 1;
  const most = Math.max(leastSegments, Math.min(mostSegments, Math.floor(mostCells / otherBins)));
  const possible = Math.floor((frames - length) / (length / 2)) + 1;
  const segments = Math.min(most, possible);
  if (segments < leastSegments) return null;
  const hop = segments === possible ? length / 2 : Math.floor((frames - length) / (segments - 1));
  const first = Math.ceil(fromS * own.rateHz) + 1;
  const fft = createRealFft(length);
  const window = hannWindow(length);
  const otherRateHz = other.rateHz * clockRatio;
  const otherLength = Math.ceil((length / own.rateHz) * otherRateHz) + 1;
  const chirp = createChirpTransform(otherLength, otherBins, stepHz / otherRateHz);
  const ours = new Float64Array(2 * segments * ownBins);
  const theirs = new Float64Array(2 * segments * otherBins);
  const piece = new Float64Array(length);
  for (let k = 0; k < segments; k++) {
    const start = first + k * hop;
    for (let n = 0; n < length; n++) piece[n] = (window[n] as number) * (own.samples[start + n] as number);
    ours.set(fft.transform(piece).subarray(0, 2 * ownBins), 2 * k * ownBins);
    const startS = start / own.rateHz;
    const lengthS = length / own.rateHz;
    // The companion's clock is stretched onto this capture's before its samples are placed.
    const place = (startS * clockRatio + lagS) * other.rateHz;
    const from = Math.ceil(place);
    const count = Math.min(otherLength, other.samples.length - from, Math.ceil(place + lengthS * otherRateHz) - from);
    const otherPiece = new Float64Array(Math.max(0, count));
    const scale = own.rateHz / otherRateHz;
    for (let n = 0; n < count; n++) {
      const share = (from + n - place) / (lengthS * otherRateHz);
      otherPiece[n] = scale * (0.5 - 0.5 * Math.cos(2 * Math.PI * share)) * (other.samples[from + n] ?? 0);
    }
    const spectrum = chirp.transform(otherPiece);
    const delayTurns = (stepHz * (from - place)) / otherRateHz;
    for (let j = 0; j < otherBins; j++) {
      const turns = delayTurns * j;
      const angle = -2 * Math.PI * (turns - Math.round(turns));
      const [c, s] = [Math.cos(angle), Math.sin(angle)];
      const [a, b] = [spectrum[2 * j] as number, spectrum[2 * j + 1] as number];
      theirs[2 * (k * otherBins + j)] = a * c - b * s;
      theirs[2 * (k * otherBins + j) + 1] = a * s + b * c;
    }
  }
  const coveredS = Math.min((segments * length) / own.rateHz, ((segments - 1) * hop + length) / own.rateHz);
  return { segments, stepHz, ownBins, otherBins, ours, theirs, coveredS };
}
