import type { Finding, Tone } from '../schemas/screening.js';
import type { Thresholds } from '../schemas/thresholds.js';
import type { FoldEvidence } from './FoldEvidence.js';
import { formatHz, formatPercent } from './formatNumber.js';
import type { IrregularMeasurement } from './MeasurementRecord.js';

const reasons: Record<IrregularMeasurement['limitedBy'], string> = {
  grid: 'all intervals are multiples of one step',
  stampError: 'the stamps are rounded',
  sensorBand: 'the sensor band ends there',
  budget: 'the search ends there',
};

/** Tones recovered from irregular stamps: true frequencies; those beyond half the mean rate would be folded on a uniform grid. */
export function judgeIrregular(measured: IrregularMeasurement, thresholds: Thresholds): FoldEvidence {
  const halfHz = measured.meanRateHz / 2;
  const tones: Tone[] = measured.tones
    .filter((tone) => tone.standsOutDb >= thresholds.toneStandsOutDb)
    .map((tone) => {
      const chance = Math.min(1, Math.exp(tone.logFalseAlarm));
      return {
        frequencyHz: tone.frequencyHz,
        uncertaintyHz: tone.uncertaintyHz,
        levelDb: tone.levelDb,
        standsOutDb: tone.standsOutDb,
        explanation: 'unexplained' as const,
        trueFrequencyHz: tone.frequencyHz,
        confidence: 1 - chance,
        chanceProbability: chance,
      };
    });
  const beyond = tones.filter((tone) => tone.frequencyHz > halfHz && tone.confidence >= thresholds.confidence);
  const findings: Finding[] = beyond.map((tone) => ({
    kind: 'foldedTone',
    severity: 'fold',
    confidence: tone.confidence,
    frequencyHz: tone.frequencyHz,
    trueFrequencyHz: tone.frequencyHz,
    strengthDb: tone.levelDb,
    text: `A tone at ${formatHz(tone.frequencyHz)} lies beyond half the mean rate (${formatHz(halfHz)}): treated as uniform samples it would be folded. Chance that noise gives such a peak: ${formatPercent(tone.chanceProbability ?? 0)}.`,
    evidence: {
      frequencyHz: tone.frequencyHz,
      uncertaintyHz: tone.uncertaintyHz,
      meanRateHz: measured.meanRateHz,
      chanceProbability: tone.chanceProbability ?? 0,
    },
    method: 'generalised Lomb-Scargle periodogram, matching pursuit, held-out samples',
    source: 'Zechmeister & Kürster 2009; Tropp & Gilbert 2007',
  }));
  findings.push({
    kind: 'irregularStamps',
    severity: 'unproven',
    confidence: 1,
    toHz: measured.reachHz,
    text: `The time stamps are irregular (mean rate ${formatHz(measured.meanRateHz)}). Tones are recovered up to ${formatHz(measured.reachHz)}, where ${reasons[measured.limitedBy]}; a band edge does not exist, so nothing can be cleared.`,
    evidence: {
      meanRateHz: measured.meanRateHz,
      reachHz: measured.reachHz,
      limitedBy: measured.limitedBy,
      tones: tones.length,
    },
    method: 'generalised Lomb-Scargle periodogram',
    source: 'Eyer & Bartholdi 1999; Zechmeister & Kürster 2009',
  });
  return { tones, findings, logRatio: irregularRatio(tones, halfHz), shownConfidence: 0 };
}

/** Power beyond half the mean rate against the rest, on the scale of the other evidence. */
function irregularRatio(tones: Tone[], halfHz: number): number {
  const power = (tone: Tone): number => 10 ** (tone.levelDb / 10);
  const total = tones.reduce((sum, tone) => sum + power(tone), 0);
  const beyond = tones.filter((tone) => tone.frequencyHz > halfHz).reduce((sum, tone) => sum + power(tone), 0);
  if (total === 0) return 0;
  if (beyond === 0) return -2.5;
  return Math.max(-1, Math.min(5, 5 + (10 * Math.log10(beyond / total)) / 6));
}
