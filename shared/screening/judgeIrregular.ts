import type { AcquisitionSheet } from '../schemas/acquisitionSheet.js';
import type { Finding, Tone } from '../schemas/screening.js';
import type { Thresholds } from '../schemas/thresholds.js';
import { type FoldEvidence, isFoldedTone } from './FoldEvidence.js';
import { formatDb, formatHz, formatPercent } from './formatNumber.js';
import { broadbandChance, type IrregularShare, irregularShare } from './irregularShare.js';
import type { IrregularMeasurement, IrregularTone } from './MeasurementRecord.js';

const reasons: Record<IrregularMeasurement['limitedBy'], string> = {
  grid: 'all intervals are multiples of one step',
  stampError: 'the stamps are rounded',
  sensorBand: 'the sensor band ends there',
  budget: 'the search ends there',
};
/** As for tones on an even grid: what lies this far below the protection asked for stops nothing. */
const immaterialBelowDb = 25;
/** How exactly a sheet states a source's frequency. */
const statedWithin = 1e-3;
const materialShareDb = -40;

/**
 * Judges what was recovered from irregular stamps. Tones stand at their true frequencies; those beyond half the mean rate,
 * shown against chance and against every other frequency in their place, count as folded: read as evenly sampled, they would stand
 * elsewhere. The rest beyond half the mean rate counts by its share of the power.
 */
export function judgeIrregular(
  measured: IrregularMeasurement,
  thresholds: Thresholds,
  sheet: AcquisitionSheet = {},
): FoldEvidence {
  const halfHz = measured.meanRateHz / 2;
  const kept = measured.tones.filter((tone) => tone.standsOutDb >= thresholds.toneStandsOutDb);
  const judged = kept.map((tone) => ({ tone, seen: describeTone(tone, { halfHz, measured, thresholds, sheet }) }));
  const folded = judged.filter(({ seen }) => isFoldedTone(seen));
  const share = irregularShare(
    measured,
    folded.map(({ tone }) => tone),
    thresholds.confidence,
  );
  const findings: Finding[] = folded.map(({ seen }) => toneFinding(seen, measured, thresholds));
  if (share.isBroadbandShown) findings.push(shareFinding(share, measured));
  findings.push(stampsFinding(share, measured, judged.length));
  const best = Math.max(
    0,
    ...folded.map(({ seen }) => seen.confidence),
    share.isBroadbandShown ? broadbandConfidence(measured) : 0,
  );
  return {
    tones: judged.map(({ seen }) => seen),
    findings,
    logRatio: share.logRatio,
    shownConfidence: share.materialChance > 0.5 ? best * share.materialChance : 0,
  };
}

function describeTone(
  tone: IrregularTone,
  {
    halfHz,
    measured,
    thresholds,
    sheet,
  }: { halfHz: number; measured: IrregularMeasurement; thresholds: Thresholds; sheet: AcquisitionSheet },
): Tone {
  const { frequencyHz, uncertaintyHz, levelDb, standsOutDb } = tone;
  const rivalHz = tone.rivalHz ?? null;
  const rivalChance = Math.exp(-(tone.rivalLogRatio ?? Number.POSITIVE_INFINITY));
  const noise = Math.min(1, Math.exp(tone.logFalseAlarm));
  // A rival that is beyond half the mean rate as well leaves the frequency open, not the folding.
  const isOpen = rivalHz !== null && rivalChance > 1 - thresholds.confidence;
  const chance = Math.min(1, noise + (rivalHz !== null && rivalHz <= halfHz ? rivalChance : 0));
  const isBeyond = frequencyHz - 3 * uncertaintyHz > halfHz && 1 - chance >= thresholds.confidence;
  const source = (sheet.sources ?? []).find(
    ({ frequencyHz: statedHz }) =>
      Math.abs(statedHz - frequencyHz) <= Math.max(3 * uncertaintyHz, statedWithin * statedHz),
  );
  return {
    frequencyHz,
    uncertaintyHz,
    levelDb,
    standsOutDb,
    explanation: isBeyond ? 'foldedSource' : source ? 'knownSource' : 'unexplained',
    trueFrequencyHz: frequencyHz,
    ...(isOpen ? { candidatesHz: [frequencyHz, rivalHz].sort((a, b) => a - b) } : {}),
    confidence: 1 - chance,
    chanceProbability: chance,
    ...(source
      ? { explainedBy: `source ${source.name ?? ''} (${formatHz(source.frequencyHz)})`.replace('  ', ' ') }
      : isBeyond
        ? { explainedBy: `a source beyond half the mean rate of ${formatHz(measured.meanRateHz)}` }
        : {}),
  };
}

function toneFinding(tone: Tone, measured: IrregularMeasurement, thresholds: Thresholds): Finding {
  const { meanRateHz, totalDb } = measured;
  const chance = tone.chanceProbability ?? 0;
  const isMaterial =
    totalDb === undefined || tone.levelDb > totalDb - thresholds.requiredProtectionDb - immaterialBelowDb;
  const open =
    tone.candidatesHz === undefined ? '' : ` It may also be ${tone.candidatesHz.map(formatHz).join(' or ')}.`;
  return {
    kind: 'foldedTone',
    severity: isMaterial ? 'fold' : 'note',
    confidence: tone.confidence,
    frequencyHz: tone.frequencyHz,
    trueFrequencyHz: tone.frequencyHz,
    strengthDb: tone.levelDb,
    text: `A tone at ${formatHz(tone.frequencyHz)} lies beyond half the mean rate (${formatHz(meanRateHz / 2)}): treated as uniform samples it would be folded. Chance that noise or a tone elsewhere gives this: ${formatPercent(chance)}.${open}`,
    evidence: {
      frequencyHz: tone.frequencyHz,
      uncertaintyHz: tone.uncertaintyHz,
      meanRateHz,
      standsOutDb: tone.standsOutDb,
      chanceProbability: chance,
    },
    method:
      'generalised Lomb-Scargle periodogram, matching pursuit with joint refinement, held-out samples, false alarms from shuffled samples',
    source: 'Zechmeister & Kürster 2009; Tropp & Gilbert 2007',
  };
}

const broadbandConfidence = ({ beyond }: IrregularMeasurement): number => (beyond ? 1 - broadbandChance(beyond) : 0);

function shareFinding({ shownDb }: IrregularShare, measured: IrregularMeasurement): Finding {
  const { beyond, meanRateHz, reachHz } = measured;
  const restDb = beyond?.beyondDb ?? 0;
  const isMaterial = (shownDb ?? restDb) > materialShareDb;
  const share = formatPercent(10 ** ((shownDb ?? restDb) / 10));
  return {
    kind: 'foldedShare',
    severity: isMaterial ? 'fold' : 'note',
    confidence: broadbandConfidence(measured),
    fromHz: meanRateHz / 2,
    toHz: beyond?.toHz ?? reachHz,
    strengthDb: shownDb ?? restDb,
    text: `${share} of the power (${formatDb(shownDb ?? restDb)}) lies beyond half the mean rate, between ${formatHz(meanRateHz / 2)} and ${formatHz(beyond?.toHz ?? reachHz)}: treated as uniform samples it would be folded. Stretches that took no part in the estimate confirm it.`,
    evidence: {
      shareDb: shownDb ?? restDb,
      broadbandShareDb: restDb,
      broadbandErrorDb: beyond?.errorDb ?? 0,
      heldOutLogRatio: beyond?.heldOutLogRatio ?? 0,
      meanRateHz,
    },
    method: 'powers of frequency bands by maximum likelihood from uneven samples, confirmed on held-out stretches',
    source: 'Burg, Luenberger & Wenger 1982; Snyder, O’Sullivan & Miller 1989',
  };
}

function stampsFinding({ mostDb }: IrregularShare, measured: IrregularMeasurement, tones: number): Finding {
  const { meanRateHz, reachHz, limitedBy } = measured;
  const upTo =
    mostDb === null
      ? ''
      : ` Up to there, at most ${formatPercent(10 ** (Math.min(0, mostDb) / 10))} of the power (${formatDb(Math.min(0, mostDb))}) lies beyond half the mean rate.`;
  return {
    kind: 'irregularStamps',
    severity: 'unproven',
    confidence: 1,
    toHz: reachHz,
    text: `The time stamps are irregular (mean rate ${formatHz(meanRateHz)}). Tones are recovered up to ${formatHz(reachHz)}, where ${reasons[limitedBy]}.${upTo} A band edge does not exist, and what lies higher stays unseen, so nothing can be cleared.`,
    evidence: {
      meanRateHz,
      reachHz,
      limitedBy,
      tones,
      ...(mostDb === null ? {} : { mostBeyondHalfDb: mostDb }),
    },
    method: 'generalised Lomb-Scargle periodogram; powers of frequency bands by maximum likelihood',
    source: 'Eyer & Bartholdi 1999; Zechmeister & Kürster 2009',
  };
}
