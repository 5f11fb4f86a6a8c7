import type { Finding } from '../schemas/screening.js';
import type { Thresholds } from '../schemas/thresholds.js';
import type { FoldEvidence } from './FoldEvidence.js';
import { formatHz } from './formatNumber.js';
import { isMaterialShare, judgeDensities } from './judgeDensities.js';
import { judgeFoldedShare } from './judgeFoldedShare.js';
import { judgeMoves } from './judgeMoves.js';
import type { MeasurementRecord } from './MeasurementRecord.js';

/** What counts as folded: over this share of the total power. */
const materialShareDb = -40;
/** Repeated captures are taken to show one event where tones stay by accident less often than this. */
const largestEventChance = 0.05;
const largestRatio = 6;
/** Log ratios of a companion that shows no folding: of all that it carries, and of the tones alone. */
const clean = { everything: -4, tones: -1.5 } as const;
const leastTones = 3;

/**
 * What a companion says beside the tones that moved (those are explained with the tones): the folded share of the power, that it
 * shows no folding, that two places are alike at both rates, or that it is of no use because it records something else.
 */
export function judgeCompanion(record: MeasurementRecord, thresholds: Thresholds): FoldEvidence {
  const none: FoldEvidence = { tones: [], findings: [], logRatio: 0, shownConfidence: 0 };
  const companion = record.companion;
  const moves = companion?.moves ?? null;
  if (companion === null || moves === null || record.sampleRateHz === null) return none;
  if (Math.abs(companion.sampleRateHz / record.sampleRateHz - 1) < 1e-6) return none;
  const totalDb = record.level?.powerDb ?? 0;
  const compared = record.tones.filter((tone) => tone.standsOutDb >= thresholds.toneStandsOutDb);
  const judgedMoves = judgeMoves(compared, companion);
  const judged = compared.flatMap((tone, index) => {
    const one = judgedMoves?.tones[index] ?? null;
    return one === null || tone.levelDb < totalDb + materialShareDb ? [] : [{ tone, ...one }];
  });
  const count = (outcome: string): number => judged.filter((one) => one.outcome === outcome).length;
  const alignment = companion.alignment ?? null;
  const isAligned = (companion.folded ?? null) !== null || moves.some((move) => move.isAligned);
  const findings: Finding[] = judged.flatMap(({ outcome, tone, candidatesHz }): Finding[] =>
    outcome !== 'ambiguous' ? [] : [ambiguous(tone.frequencyHz, candidatesHz, companion.name, companion.sampleRateHz)],
  );
  const share =
    isAligned && companion.folded ? judgeFoldedShare(companion, companion.folded, thresholds.confidence) : null;
  const isOneEvent = isAligned || (judgedMoves !== null && judgedMoves.eventChance < largestEventChance);
  const predicted = !isAligned && companion.densities ? judgeDensities(companion, companion.densities) : null;
  if (!isOneEvent) {
    const reason = 'the two captures have neither a course over time nor enough tones in common';
    const notUsed = unusable(companion.name, reason, alignment?.agreement ?? 0, judged.length);
    // Noise alone may have been recorded twice: then only the reader knows.
    return { ...none, findings: predicted === null || judged.length > 0 ? [notUsed] : [notUsed, predicted.finding] };
  }
  // Moved tones say more than a share that doesn't stand out of chance.
  if (share !== null && (share.shareDb !== null || count('moved') === 0)) findings.push(share.finding);
  if (predicted !== null) {
    const isSure = isMaterialShare(predicted) && predicted.confidence >= thresholds.confidence;
    findings.push(isSure ? { ...predicted.finding, severity: 'fold' } : predicted.finding);
    if (isSure) return { tones: [], findings, logRatio: largestRatio / 2, shownConfidence: predicted.confidence };
  }
  const isShown = share?.finding.severity === 'fold';
  if (isShown) {
    return { tones: [], findings, logRatio: largestRatio, shownConfidence: share?.confidence ?? 0 };
  }
  const isClean = count('moved') === 0 && count('absent') === 0 && count('ambiguous') === 0;
  const everything =
    isClean && share !== null && share.unnoticedDb < materialShareDb && (share.shareDb ?? -Infinity) < materialShareDb;
  const tonesStay = isClean && count('stays') >= leastTones;
  const logRatio = everything ? clean.everything : tonesStay ? clean.tones : 0;
  return { tones: [], findings, logRatio, shownConfidence: 0 };
}

function ambiguous(frequencyHz: number, candidatesHz: number[], name: string, otherRateHz: number): Finding {
  const [, ...higher] = candidatesHz;
  return {
    kind: 'ambiguousFold',
    severity: 'note',
    confidence: 1,
    frequencyHz,
    text: `The tone at ${formatHz(frequencyHz)} stands at the same place in the companion ${name} at ${formatHz(otherRateHz)}; so would ${higher.map(formatHz).join(', ')}, which both rates fold alike. A third rate tells them apart.`,
    evidence: {
      frequencyHz,
      companionRateHz: otherRateHz,
      candidatesHz: candidatesHz.map((hz) => hz.toFixed(2)).join(' '),
    },
    method: 'same place at two rates: n₁·fs₁ ± fa = n₂·fs₂ ± fa',
    source: 'Xia 1999',
  };
}

function unusable(name: string, reason: string, agreement: number, tones: number): Finding {
  return {
    kind: 'companionMissing',
    severity: 'note',
    confidence: 1,
    text: `The companion ${name} can't be used: ${reason}. It may show another event; name the capture that was taken together with this one.`,
    evidence: { companion: name, agreement, tonesCompared: tones },
    method: 'cross-correlation of the common band and places of the tones',
    source: 'Knapp & Carter 1976',
  };
}
