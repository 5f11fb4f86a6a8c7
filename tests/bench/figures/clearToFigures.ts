import type { ScreenedCapture } from '../screening/ScreenedCapture.js';
import { isClean } from './methodFigures.js';
import { type ShareFigure, shareFigure } from './shareFigure.js';

export interface ClearToFigures {
  /** Claims whose every whole band below the clear-to frequency is folded into by less than the protection. */
  holds: ShareFigure;
  /** The same, only claims that cover at least one of the ten bands: the others can't fail. */
  holdsWhereTestable: ShareFigure;
  broken: { capture: ScreenedCapture; worstBandDb: number }[];
  /** Claims on clean captures over fs/2. */
  medianShareOfBand: number | null;
  /** Claims over what the same rule gives on the true densities, where these are known; no claim counts as 0. */
  shareOfTrueRule: { captures: number; median: number; lowerQuartile: number } | null;
}

export function clearToFigures(captures: readonly ScreenedCapture[]): ClearToFigures {
  const claims = captures.filter(({ truth, clearToHz }) => clearToHz !== null && truth.bandFoldDb.length === 10);
  const breaks = (claim: ScreenedCapture): boolean => worstBandDb(claim) > -claim.protectionDb;
  const testable = claims.filter((claim) => Number.isFinite(worstBandDb(claim)));
  const shares = claims.filter(isClean).map(({ truth, clearToHz }) => (2 * (clearToHz as number)) / truth.sampleRateHz);
  const ratios = captures
    .filter(({ truth }) => truth.trueClearToHz !== null && truth.trueClearToHz > 0)
    .map(({ truth, clearToHz }) => (clearToHz ?? 0) / (truth.trueClearToHz as number));
  return {
    holds: shareFigure(claims, (claim) => !breaks(claim)),
    holdsWhereTestable: shareFigure(testable, (claim) => !breaks(claim)),
    broken: claims.filter(breaks).map((capture) => ({ capture, worstBandDb: worstBandDb(capture) })),
    medianShareOfBand: shares.length === 0 ? null : quantile(shares, 0.5),
    shareOfTrueRule:
      ratios.length === 0
        ? null
        : { captures: ratios.length, median: quantile(ratios, 0.5), lowerQuartile: quantile(ratios, 0.25) },
  };
}

/** Highest folded share of the bands that lie wholly below the claim; −Infinity where there is none. */
export function worstBandDb({ truth, clearToHz }: ScreenedCapture): number {
  const widthHz = truth.sampleRateHz / 2 / truth.bandFoldDb.length;
  const below = truth.bandFoldDb.filter((_, band) => (band + 1) * widthHz <= (clearToHz ?? 0) * (1 + 1e-9));
  return Math.max(Number.NEGATIVE_INFINITY, ...below);
}

function quantile(values: readonly number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.min(sorted.length - 1, Math.floor(share * sorted.length))] as number;
}
