import type { ScreenedCapture } from '../screening/ScreenedCapture.js';
import { type Calibration, calibrationAtShare } from '../statistics/calibrationAtShare.js';
import { type ReliabilityBin, reliability } from '../statistics/reliability.js';
import { hasSomethingToSee, isClean, isFolded } from './methodFigures.js';

export interface CalibrationFigures {
  population: string;
  captures: number;
  atShares: Calibration[];
  /** At the first of the shares. */
  bins: ReliabilityBin[];
}

/** Shares of folded captures that the score is recomputed for. */
export const foldedShares = [0.5, 0.2] as const;

/** The fold score's calibration over three populations: the last is what the score says literally. */
export function calibrationFigures(captures: readonly ScreenedCapture[]): CalibrationFigures[] {
  const of = (population: string, chosen: readonly ScreenedCapture[]): CalibrationFigures => {
    const ratios = chosen.map((one) => ({ logRatio: one.logRatio ?? 0, isFolded: isFolded(one) }));
    return {
      population,
      captures: chosen.length,
      atShares: foldedShares.map((share) => calibrationAtShare(ratios, share)),
      bins: reliability(ratios, foldedShares[0]),
    };
  };
  const judged = captures.filter((one) => isFolded(one) || isClean(one));
  return [
    of(
      'folded with something to see, and clean',
      judged.filter((one) => isClean(one) || hasSomethingToSee(one)),
    ),
    of('all folded, and clean', judged),
    of(
      'all folded, clean and grey',
      captures.filter(({ truth }) => truth.label !== 'na'),
    ),
  ];
}
