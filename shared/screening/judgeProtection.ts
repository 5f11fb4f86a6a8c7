import type { AcquisitionSheet } from '../schemas/acquisitionSheet.js';
import type { Finding } from '../schemas/screening.js';
import type { Thresholds } from '../schemas/thresholds.js';
import { clearToFindings, isBandProtected, type Protection } from './clearToFindings.js';
import { clearToFrequency } from './clearToFrequency.js';
import { type ContaminationBound, contaminationBound } from './contaminationBound.js';
import type { MeasurementRecord } from './MeasurementRecord.js';
import { oldRate } from './oldRate.js';
import { worstFoldedShareDb } from './worstFoldedShare.js';

export interface ProtectionJudgement {
  bound: ContaminationBound;
  clearToHz: number | null;
  worstShareDb: number;
  isProtected: boolean;
  findings: Finding[];
}

/**
 * How far the band of interest is protected: the bound on folded density, the clear-to frequency and their findings.
 * @param foldedHz places of tones shown to be folded: nothing is claimed from there on
 * @returns null without a band edge (irregular stamps, too few samples, rate unknown)
 */
export function judgeProtection(
  record: MeasurementRecord,
  thresholds: Thresholds,
  sheet: AcquisitionSheet,
  { band, foldedHz, foldScore }: { band: [number, number]; foldedHz: number[]; foldScore: number },
): ProtectionJudgement | null {
  const { profile, sampleRateHz, irregular } = record;
  const bound = irregular === null ? contaminationBound(record, thresholds.confidence, sheet) : null;
  if (bound === null || profile === null || sampleRateHz === null) return null;
  const isOldRate = bound.foldingFrequencyHz < sampleRateHz / 2;
  const protection: Protection = {
    ...clearToFrequency(profile, bound, thresholds.requiredProtectionDb, {
      lowestHz: band[0],
      highestHz: band[1],
      sampleRateHz,
      stopsHz: isOldRate ? [...foldedHz, bound.foldingFrequencyHz] : foldedHz,
    }),
    // Without a stated band the statement is about the whole capture.
    worstShareDb: worstFoldedShareDb(
      profile,
      bound,
      sheet.highestFrequencyHz === undefined ? [band[0], sampleRateHz / 2] : band,
    ),
    foldingFrequencyHz: sampleRateHz / 2,
    isRaised: oldRate(record) !== null,
  };
  return {
    bound,
    clearToHz: protection.clearToHz,
    worstShareDb: protection.worstShareDb,
    isProtected: isBandProtected(protection, thresholds, band[1]),
    findings: clearToFindings(protection, thresholds, band, bound.assumption, foldScore),
  };
}
