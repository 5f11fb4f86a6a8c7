import type { AcquisitionSheet } from '../schemas/acquisitionSheet.js';
import type { Finding, Tone } from '../schemas/screening.js';
import type { Thresholds } from '../schemas/thresholds.js';
import type { FoldEvidence } from './FoldEvidence.js';
import { candidatesHz, zoneOf } from './foldArithmetic.js';
import { formatDb, formatHz, formatPercent, formatSeconds } from './formatNumber.js';
import type { MeasurementRecord } from './MeasurementRecord.js';
import { type OrderFamily, orderFamily } from './orderFamily.js';
import type { FoldedOrderMeasurement, OrderLawMeasurement } from './OrderMeasurement.js';

/** Below this (k + j)·Δf0·T a folded path can't be told from one in band. */
const leastApartBins = 3;
/** Spread of a path that changes evenly is its range over √12. */
const rangeOverSpread = Math.sqrt(12);
/** The same line has to be seen below fs/2 when nothing else follows the law. */
const leastInBandDb = 12;
/** The background of a real capture has a heavier tail than noise of the same mean. */
const tailWeight = 1.5;
const candidatesListed = 4;
/** Below the total power by the protection and this much more, a folded order is no reason to call a capture folded. */
const immaterialBelowDb = 25;
const largestLogRatio = 6;
/** What the fold score is a probability of: folded energy over this share of the total, below this part of the band. */
const labelledShareDb = -40;
const labelledBand = 0.9;
const modeText = {
  speedChannel: 'the speed channel',
  nominalSpeed: 'the stated speed, refined',
  blind: 'all lines together',
} as const;

interface JudgedLine {
  line: FoldedOrderMeasurement;
  law: OrderLawMeasurement;
  family: OrderFamily | null;
  tone: Tone;
  isMaterial: boolean;
}

/**
 * Folded orders and reflected sweeps: lines that follow a moving speed law at a true frequency beyond fs/2. Two ways to be
 * wrong are added up: noise that makes a line so high at any of the places tried, and something else that moves and happens
 * to bend like a folded path.
 */
export function judgeOrders(record: MeasurementRecord, thresholds: Thresholds, sheet: AcquisitionSheet): FoldEvidence {
  const { sampleRateHz } = record;
  const orders = record.orders ?? [];
  const empty: FoldEvidence = { tones: [], findings: [], logRatio: 0, shownConfidence: 0 };
  if (sampleRateHz === null || orders.length === 0) return empty;
  const leastLevelDb = (record.level?.powerDb ?? 0) - thresholds.requiredProtectionDb - immaterialBelowDb;
  const judged = orders
    .flatMap(({ laws, fromS, toS, highestHz }) =>
      laws.flatMap((law) => judgeLaw(law, orderFamily(law, sheet, 1 / (toS - fromS)), sampleRateHz, highestHz)),
    )
    .map((one): JudgedLine => ({ ...one, isMaterial: one.line.levelDb > leastLevelDb }));
  const shown = judged.filter(({ tone }) => tone.confidence >= thresholds.confidence);
  const laws = [...new Set(shown.map(({ law }) => law))];
  const leastChance = judged.reduce(
    (least, { tone, isMaterial }) => (isMaterial ? Math.min(least, tone.chanceProbability ?? 1) : least),
    1,
  );
  const counted = shown.filter(({ line }) => line.frequencyHz < (labelledBand * sampleRateHz) / 2);
  const countedDb = 10 * Math.log10(counted.reduce((sum, { line }) => sum + 10 ** (line.levelDb / 10), 0));
  const isEnough = counted.length > 0 && countedDb > (record.level?.powerDb ?? 0) + labelledShareDb;
  return {
    tones: judged.map(({ tone }) => tone),
    findings: laws.map((law) =>
      lawFinding(
        law,
        shown.filter((one) => one.law === law),
        sampleRateHz,
        record.integrity.clippedShare > thresholds.maxClippedShare,
      ),
    ),
    logRatio: Math.min(largestLogRatio, Math.max(0, -Math.log(Math.max(leastChance, 1e-6)) / 1.5)),
    shownConfidence: isEnough ? Math.max(...counted.map(({ tone }) => tone.confidence)) : 0,
  };
}

function judgeLaw(
  law: OrderLawMeasurement,
  family: OrderFamily | null,
  sampleRateHz: number,
  highestHz: number,
): Omit<JudgedLine, 'isMaterial'>[] {
  const tried = Math.log(Math.max(2, law.linesTried));
  // Where even the opposite law shows lines higher than noise makes them, all are measured against those.
  const unit = tailWeight * Math.max(1, 10 ** (law.chanceStandsOutDb / 10) / tried);
  return law.lines
    .filter(({ apartBins }) => apartBins >= leastApartBins)
    .filter(({ inBandStandsOutDb }) => law.inBandLines.length > 0 || (inBandStandsOutDb ?? 0) > leastInBandDb)
    .map((line) => {
      const byNoise = Math.exp(Math.min(0, tried - 10 ** (line.standsOutDb / 10) / unit));
      const byCoincidence = (1 + law.otherLines) / (rangeOverSpread * line.apartBins);
      const chanceProbability = Math.min(1, byNoise + byCoincidence);
      const tone: Tone = {
        frequencyHz: line.frequencyHz,
        uncertaintyHz: line.uncertaintyHz,
        levelDb: line.levelDb,
        standsOutDb: line.standsOutDb,
        explanation: 'foldedOrder',
        trueFrequencyHz: line.trueFrequencyHz,
        candidatesHz: candidatesHz(line.frequencyHz, sampleRateHz, highestHz).slice(0, candidatesListed),
        confidence: 1 - chanceProbability,
        chanceProbability,
        explainedBy: explainedBy(law, family, line),
      };
      return { line, law, family, tone };
    })
    .filter(({ tone }) => tone.confidence >= 0.5);
}

function explainedBy(law: OrderLawMeasurement, family: OrderFamily | null, line: FoldedOrderMeasurement): string {
  const range = `speed × ${law.speedFrom.toFixed(3)} to ${law.speedTo.toFixed(3)}`;
  const order = family?.orderOf(line.meanFrequencyHz) ?? null;
  if (family === null || order === null) return `speed law, ${range}`;
  return `order ${order} of ${family.fundamentalHz.toPrecision(5)} Hz, ${range}`;
}

/** One finding a law: the strongest folded line stands for all of them. */
function lawFinding(law: OrderLawMeasurement, shown: JudgedLine[], sampleRateHz: number, isClipped: boolean): Finding {
  const best = shown.reduce((top, one) => (one.line.levelDb > top.line.levelDb ? one : top));
  const { line, tone, family } = best;
  const order = family?.orderOf(line.meanFrequencyHz) ?? null;
  const zone = zoneOf(line.trueFrequencyHz, sampleRateHz);
  const confidence = Math.max(...shown.map((one) => one.tone.confidence));
  const isSweep = law.inBandLines.length < 2 && shown.some((one) => (one.line.inBandStandsOutDb ?? 0) > leastInBandDb);
  const place = `stands at ${formatHz(line.frequencyHz)} and belongs at ${formatHz(line.trueFrequencyHz)} (zone ${zone.number}${zone.direction === 'mirrored' ? ', mirrored' : ''})`;
  const change = formatPercent(law.speedChange);
  const others = shown.length > 1 ? ` ${shown.length} lines are folded in this way.` : '';
  // Harmonics made after sampling fold like any other, and no filter in front helps against them.
  const clipping = isClipped ? ' The capture is clipped: clipping makes harmonics that fold, so remove it first.' : '';
  const text = isSweep
    ? `A sweep runs through the folding frequency and is reflected: from ${formatSeconds(line.fromS)} to ${formatSeconds(line.toS)} it ${place}, with the same phase law as before.`
    : `The speed changes by ${change}, and ${order === null ? 'a line' : `order ${order}`} beyond the folding frequency follows it: it ${place}, ${formatDb(line.standsOutDb)} over its surroundings.${others} The speed is known from ${modeText[family?.isStated === true && law.mode === 'blind' ? 'nominalSpeed' : law.mode]}.`;
  return {
    kind: isSweep ? 'reflectedSweep' : 'foldedOrder',
    severity: shown.some(({ isMaterial }) => isMaterial) ? 'fold' : 'limit',
    confidence,
    frequencyHz: line.frequencyHz,
    trueFrequencyHz: line.trueFrequencyHz,
    fromS: line.fromS,
    toS: line.toS,
    strengthDb: line.levelDb,
    text: `${text}${clipping} Chance of such a match: ${formatPercent(tone.chanceProbability ?? 1)}.`,
    evidence: {
      uncertaintyHz: line.uncertaintyHz,
      standsOutDb: line.standsOutDb,
      chanceStandsOutDb: law.chanceStandsOutDb,
      apartBins: line.apartBins,
      linesFoundCount: shown.length,
      linesTriedCount: law.linesTried,
      inBandLinesCount: law.inBandLines.length,
      speedChangeShare: law.speedChange,
      speedFromShare: law.speedFrom,
      speedToShare: law.speedTo,
      ...(family === null ? {} : { fundamentalHz: family.fundamentalHz }),
      ...(order === null ? {} : { orderCount: order }),
      chanceProbability: tone.chanceProbability ?? 1,
      sampleRateHz,
    },
    method: 'non-uniform transform over the shaft angle; lines beyond fs/2 against the background and the opposite law',
    source: 'Blough 2003; Dutt & Rokhlin 1993; Oberlin, Meignen & Perrier 2015',
  };
}
