import type { AcquisitionSheet } from '../schemas/acquisitionSheet.js';
import type { ChannelJudgement, Finding } from '../schemas/screening.js';
import type { Thresholds } from '../schemas/thresholds.js';
import { clearToFrequency } from './clearToFrequency.js';
import { clearToFindings, isBandProtected, type Protection } from './clearToFindings.js';
import { contaminationBound } from './contaminationBound.js';
import { decideVerdict } from './decideVerdict.js';
import { joinEvidence } from './FoldEvidence.js';
import { foldFeatures } from './foldFeatures.js';
import { foldPrior, foldScore } from './foldScore.js';
import { bandEdgeFigures, judgeEdge } from './judgeEdge.js';
import { judgeIntegrity } from './judgeIntegrity.js';
import { judgeIrregular } from './judgeIrregular.js';
import { judgeTones } from './judgeTones.js';
import type { MeasurementRecord } from './MeasurementRecord.js';
import { oldRate } from './oldRate.js';
import { worstFoldedShareDb } from './worstFoldedShare.js';

/**
 * Judges one channel: findings, verdict, clear-to frequency, fold score. Pure: the same record, thresholds and sheet always
 * give the same judgement, in the browser as in the worker. Never claims more than was shown: `clear` needs a protected
 * band edge and no sign of folding.
 */
export function judgeChannel(
  record: MeasurementRecord,
  thresholds: Thresholds,
  sheet: AcquisitionSheet,
): ChannelJudgement {
  const rateHz = record.sampleRateHz;
  const band = bandOfInterest(rateHz, thresholds, sheet);
  const integrity = judgeIntegrity(record, thresholds, sheet);
  const isIrregular = record.irregular !== null;
  const tones =
    record.irregular !== null
      ? judgeIrregular(record.irregular, thresholds)
      : joinEvidence([judgeTones(record, thresholds, sheet)]);
  const features = isIrregular ? null : foldFeatures(record);
  const score = foldScore(features, tones.logRatio, tones.shownConfidence);
  const bandEdge = bandEdgeFigures(record, thresholds, band, sheet.noiseFloorDb);
  const bound = isIrregular ? null : contaminationBound(record, thresholds.confidence, sheet);
  const findings: Finding[] = [...tones.findings, ...integrity];
  let clearToHz: number | null = null;
  let isProtected = false;
  if (bound !== null && record.profile !== null && rateHz !== null) {
    const stopsHz = tones.tones
      .filter(({ explanation }) => explanation.startsWith('folded') || explanation === 'movedBetweenRates')
      .map(({ frequencyHz }) => frequencyHz);
    if (bound.foldingFrequencyHz < rateHz / 2) stopsHz.push(bound.foldingFrequencyHz);
    const options = { lowestHz: band[0], highestHz: band[1], sampleRateHz: rateHz, stopsHz };
    const protection: Protection = {
      ...clearToFrequency(record.profile, bound, thresholds.requiredProtectionDb, options),
      worstShareDb: worstFoldedShareDb(record.profile, bound, band),
      foldingFrequencyHz: rateHz / 2,
      isRaised: oldRate(record) !== null,
    };
    clearToHz = protection.clearToHz;
    isProtected = isBandProtected(protection, thresholds, band[1]);
    findings.push(...clearToFindings(protection, thresholds, band, bound.assumption, score?.score ?? 0));
  }
  if (bound !== null && features !== null) {
    const isDamaged = integrity.some(
      ({ kind, severity }) => severity === 'unproven' && kind !== 'rateDisagrees' && kind !== 'tooShort',
    );
    findings.push(
      ...judgeEdge(record, thresholds, {
        bandEdge,
        bound,
        features,
        foldConfidence: score?.score ?? 0,
        isDamaged,
        isProtected,
      }),
    );
  }
  const order = { fold: 0, unproven: 1, limit: 2, note: 3 } as const;
  findings.sort((a, b) => order[a.severity] - order[b.severity] || b.confidence - a.confidence);
  return {
    verdict: decideVerdict(findings, thresholds.confidence),
    foldScore: score?.score ?? null,
    foldLogLikelihoodRatio: score?.logLikelihoodRatio ?? null,
    foldPrior,
    clearToHz,
    protectionDb: thresholds.requiredProtectionDb,
    contaminationBoundDb: bound?.edgeUpperDb ?? null,
    bandOfInterestHz: band,
    guardStartHz: rateHz === null ? null : (thresholds.guardStart * rateHz) / 2,
    bandEdge,
    tones: [...tones.tones].sort((a, b) => a.frequencyHz - b.frequencyHz),
    findings,
  };
}

/** From the sheet; without one from 0 Hz to fs over the practice factor. */
function bandOfInterest(rateHz: number | null, thresholds: Thresholds, sheet: AcquisitionSheet): [number, number] {
  const highest = sheet.highestFrequencyHz ?? (rateHz ?? 0) / thresholds.rateFactor;
  return [Math.min(sheet.lowestFrequencyHz ?? 0, highest), highest];
}
