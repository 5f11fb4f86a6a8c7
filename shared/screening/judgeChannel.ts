import type { AcquisitionSheet } from '../schemas/acquisitionSheet.js';
import type { ChannelJudgement } from '../schemas/screening.js';
import type { Thresholds } from '../schemas/thresholds.js';
import type { MeasurementRecord } from './MeasurementRecord.js';

/** Judges one channel. Pure: the same record, thresholds and sheet always give the same judgement. */
export function judgeChannel(
  record: MeasurementRecord,
  thresholds: Thresholds,
  sheet: AcquisitionSheet,
): ChannelJudgement {
  const rateHz = sheet.sampleRateHz ?? record.sampleRateHz;
  return {
    verdict: 'unproven',
    foldScore: null,
    foldLogLikelihoodRatio: null,
    foldPrior: 0.3,
    clearToHz: null,
    protectionDb: thresholds.requiredProtectionDb,
    contaminationBoundDb: null,
    bandOfInterestHz: [sheet.lowestFrequencyHz ?? 0, sheet.highestFrequencyHz ?? (rateHz ?? 0) / thresholds.rateFactor],
    guardStartHz: rateHz === null ? null : (thresholds.guardStart * rateHz) / 2,
    bandEdge: { skirtDb: null, edgeAboveFloorDb: null, guardShareDb: null },
    tones: [],
    findings: [],
  };
}
