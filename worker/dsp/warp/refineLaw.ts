import { fitLegendre, legendre } from './legendre.js';
import { envelopePoints } from './lineEnvelope.js';
import { sharedDrift, type SharedDrift } from './sharedDrift.js';
import { sharpness } from './sharpness.js';
import { lawFromWarped, type SpeedLaw } from './SpeedLaw.js';
import type { TransformOf } from './transformOf.js';
import { binPowers, type WarpedLine, warpedLines } from './warpedLines.js';

const leastLineRatio = 10;
const mostLines = 32;
const firstBin = 6;
/** Freedom of the correction, from even change to short wander. */
const degrees = [2, 6, 14, 28];
/** A freer correction has to earn its freedom. */
const leastGain = 1.02;
/** A correction that spoils the spectrum this much has followed noise; a freer one would too. */
const hopeless = 0.7;
/** Below this many turns of the highest line there is nothing left to correct. */
const leastTurns = 0.03;
const slowestRate = -0.8;
const shiftPoints = 512;

export interface Rung {
  /** Lines up to this share of the sampling rate are used. */
  band: number;
  /** The spectrum up to this share has to become sharper. */
  judgedBand: number;
  /** Bins on each side of a line within which it is looked for. */
  reach: number;
}

/**
 * One rung of a ladder: the lines of the stretch in warped time up to the rung's band tell by how much
 * the law is early or late at each moment, and the law is corrected where that makes the spectrum sharper.
 */
export function refineLaw(tapered: Float64Array, law: SpeedLaw, rung: Rung, transformOf: TransformOf): SpeedLaw {
  const { length } = law;
  const count = Math.floor(rung.judgedBand * length);
  const transform = transformOf(count);
  const spectrum = transform.forward(law.warped, tapered);
  const lines = pickLines(spectrum, Math.floor(rung.band * length), rung.reach);
  if (lines.length === 0) return law;
  const drift = sharedDrift(spectrum, lines, rung.reach);
  let best = { law, sharp: sharpness(spectrum, firstBin, count) };
  for (const degree of degrees) {
    const shifts = smoothShifts(drift, degree);
    if (shifts === null || largestOf(shifts) * length * rung.band < leastTurns) continue;
    const trial = shiftLaw(law, shifts);
    const sharp = sharpness(transform.forward(trial.warped, tapered), firstBin, count);
    if (sharp > leastGain * best.sharp) best = { law: trial, sharp };
    else if (sharp < hopeless * best.sharp) break;
  }
  return best.law;
}

/** The lines that fix time best, none within the reach of another. */
function pickLines(spectrum: Float64Array, count: number, reach: number): WarpedLine[] {
  const found = warpedLines(binPowers(spectrum), firstBin, count - reach, leastLineRatio);
  found.sort((a, b) => b.power * b.bin ** 2 - a.power * a.bin ** 2);
  const lines: WarpedLine[] = [];
  for (const line of found) {
    if (lines.length === mostLines) break;
    if (lines.every(({ bin }) => Math.abs(bin - line.bin) > reach / 2)) lines.push(line);
  }
  return lines;
}

/** The drift smoothed and summed up, as shares of the stretch at even warped times; null where it would turn time back. */
function smoothShifts({ rates, weights }: SharedDrift, degree: number): Float64Array | null {
  const places = rates.map((_, j) => (2 * (j + 1)) / envelopePoints - 1);
  const coefficients = fitLegendre(places, rates, weights, degree);
  const shifts = new Float64Array(shiftPoints + 1);
  for (let i = 0; i < shiftPoints; i++) {
    const basis = legendre((2 * i + 1) / shiftPoints - 1, degree);
    let rate = 0;
    coefficients.forEach((value, q) => (rate += value * (basis[q + 1] as number)));
    if (rate < slowestRate) return null;
    shifts[i + 1] = (shifts[i] as number) + rate / shiftPoints;
  }
  return shifts;
}

const largestOf = (values: Float64Array): number => values.reduce((most, value) => Math.max(most, Math.abs(value)), 0);

function shiftLaw(law: SpeedLaw, shifts: Float64Array): SpeedLaw {
  return lawFromWarped(
    law.warped.map((share) => {
      const exact = Math.min(shiftPoints - 1e-9, Math.max(0, share * shiftPoints));
      const low = Math.floor(exact);
      const from = shifts[low] as number;
      return share + from + (exact - low) * ((shifts[low + 1] as number) - from);
    }),
  );
}
