import type { AcquisitionSheet } from '../schemas/acquisitionSheet.js';
import type { ChannelJudgement, Finding } from '../schemas/screening.js';
import type { Thresholds } from '../schemas/thresholds.js';
import { decideVerdict } from './decideVerdict.js';
import { type FoldEvidence, isFoldedTone, joinEvidence } from './FoldEvidence.js';
import { foldFeatures } from './foldFeatures.js';
import { foldPrior, foldScore } from './foldScore.js';
import { judgeBispectrum } from './judgeBispectrum.js';
import { judgeCompanion } from './judgeCompanion.js';
import { bandEdgeFigures, judgeEdge } from './judgeEdge.js';
import { judgeIntegrity } from './judgeIntegrity.js';
import { judgeIrregular } from './judgeIrregular.js';
import { judgeLockedSources } from './judgeLockedSources.js';
import { judgeOrders } from './judgeOrders.js';
import { judgeProtection } from './judgeProtection.js';
import { judgeTones } from './judgeTones.js';
import type { MeasurementRecord } from './MeasurementRecord.js';
import { methodsDisagree } from './methodsDisagree.js';

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
  const evidence = gatherEvidence(record, thresholds, sheet);
  const features = record.irregular === null ? foldFeatures(record) : null;
  const score = foldScore(features, evidence.logRatio, evidence.shownConfidence);
  const bandEdge = bandEdgeFigures(record, thresholds, band, sheet.noiseFloorDb);
  const findings: Finding[] = [...evidence.findings, ...integrity, ...judgeLockedSources(record, thresholds, sheet)];
  const protection = judgeProtection(record, thresholds, sheet, {
    band,
    foldedHz: evidence.tones.filter(isFoldedTone).map(({ frequencyHz }) => frequencyHz),
    foldScore: score?.score ?? 0,
  });
  if (protection !== null && features !== null) {
    const { bound, isProtected, worstShareDb } = protection;
    const isDamaged = integrity.some(
      ({ kind, severity }) => severity === 'unproven' && kind !== 'rateDisagrees' && kind !== 'tooShort',
    );
    const foldConfidence = score?.score ?? 0;
    findings.push(
      ...protection.findings,
      ...judgeEdge(record, thresholds, { bandEdge, bound, features, foldConfidence, isDamaged, isProtected }),
    );
    findings.push(...methodsDisagree(findings, thresholds, { isProtected, worstShareDb }));
  }
  const order = { fold: 0, unproven: 1, limit: 2, note: 3 } as const;
  findings.sort((a, b) => order[a.severity] - order[b.severity] || b.confidence - a.confidence);
  return {
    verdict: decideVerdict(findings, thresholds.confidence),
    foldScore: score?.score ?? null,
    foldLogLikelihoodRatio: score?.logLikelihoodRatio ?? null,
    foldPrior,
    clearToHz: protection?.clearToHz ?? null,
    protectionDb: thresholds.requiredProtectionDb,
    contaminationBoundDb: protection?.bound.edgeUpperDb ?? null,
    bandOfInterestHz: band,
    guardStartHz: rateHz === null ? null : (thresholds.guardStart * rateHz) / 2,
    bandEdge,
    tones: [...evidence.tones].sort((a, b) => a.frequencyHz - b.frequencyHz),
    findings,
  };
}

/** Every method that applies, side by side. */
function gatherEvidence(record: MeasurementRecord, thresholds: Thresholds, sheet: AcquisitionSheet): FoldEvidence {
  if (record.irregular !== null) return judgeIrregular(record.irregular, thresholds, sheet);
  const binHz = record.durationS === null || record.durationS === 0 ? 0 : 1 / record.durationS;
  return joinEvidence(
    [
      judgeTones(record, thresholds, sheet),
      judgeOrders(record, thresholds, sheet),
      judgeCompanion(record, thresholds),
      judgeBispectrum(record, thresholds),
    ],
    binHz,
  );
}

/** From the sheet; without one from 0 Hz to fs over the practice factor. */
function bandOfInterest(rateHz: number | null, thresholds: Thresholds, sheet: AcquisitionSheet): [number, number] {
  const highest = sheet.highestFrequencyHz ?? (rateHz ?? 0) / thresholds.rateFactor;
  return [Math.min(sheet.lowestFrequencyHz ?? 0, highest), highest];
}
