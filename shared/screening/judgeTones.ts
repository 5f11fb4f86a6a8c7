import type { AcquisitionSheet } from '../schemas/acquisitionSheet.js';
import type { Finding, Tone } from '../schemas/screening.js';
import type { Thresholds } from '../schemas/thresholds.js';
import type { FoldEvidence } from './FoldEvidence.js';
import { aliasHz, candidatesHz, zoneOf } from './foldArithmetic.js';
import { explainDistortion } from './explainDistortion.js';
import { explainRest } from './explainRest.js';
import { explainSideBands } from './explainSideBands.js';
import { foldedComb, type FoldedMatch, refineFamily } from './foldedComb.js';
import { foldedToneFinding } from './foldedToneFinding.js';
import { bestBlindFamily, followFamily, type HarmonicFamily, matchSigmas, toneErrorHz } from './harmonicFamily.js';
import { judgeMovedTones } from './judgeMovedTones.js';
import type { MeasurementRecord, ToneMeasurement } from './MeasurementRecord.js';

/** Large supply grids keep their frequency within some 0.4 %, three of these (common practice). */
const supplyRelativeError = 1.3e-3;
/** A speed written into a sheet is known to about this. */
const speedRelativeError = 2e-3;
const candidatesListed = 4;
const mostBlindFamilies = 4;
/** A match less sure than this is not listed as folded. */
const leastFoldedConfidence = 0.8;
/** Captures with a family in band of which one in six also holds folded members: a match by chance weighs that much more. */
const priorOdds = 0.2;
/** Below the total power by the protection and this much more, a folded tone is no reason to call a capture folded. */
const immaterialBelowDb = 25;
const largestLogRatio = 6;
/** What the fold score is a probability of: folded energy over this share of the total, below this part of the band. */
const labelledShareDb = -40;
const labelledBand = 0.9;

/** Explains each tone that stands out: stated source, harmonic, supply, folded source, folded member of a family, or nothing. */
export function judgeTones(record: MeasurementRecord, thresholds: Thresholds, sheet: AcquisitionSheet): FoldEvidence {
  const { sampleRateHz, durationS } = record;
  if (sampleRateHz === null || durationS === null || durationS === 0) {
    return { tones: [], findings: [], logRatio: 0, shownConfidence: 0 };
  }
  const binHz = 1 / durationS;
  const measured = record.tones.filter((tone) => tone.standsOutDb >= thresholds.toneStandsOutDb);
  const reachHz = sheet.sensorBandHz ?? 2 * sampleRateHz;
  const tones: Tone[] = measured.map((tone) => ({
    frequencyHz: tone.frequencyHz,
    uncertaintyHz: Math.max(tone.boundHz, tone.wanderHz),
    levelDb: tone.levelDb,
    standsOutDb: tone.standsOutDb,
    explanation: 'unexplained',
    candidatesHz: candidatesHz(tone.frequencyHz, sampleRateHz, reachHz).slice(0, candidatesListed),
    confidence: 0,
  }));
  if (record.companion !== null) judgeMovedTones(tones, measured, record.companion, sampleRateHz, binHz, reachHz);
  explainFamilies(tones, measured, statedFundamentals(sheet, sampleRateHz), sampleRateHz, binHz);
  explainKnownSources(tones, measured, sheet, sampleRateHz, binHz);
  explainSideBands(tones, measured, binHz);
  const distortion = explainDistortion(tones, measured, record, sampleRateHz, binHz);
  explainRest(tones, measured, binHz, record.samples / 2);
  const folded = tones.filter(
    (tone) => tone.explanation.startsWith('folded') || tone.explanation === 'movedBetweenRates',
  );
  // A folded tone far below what the project asks protection from is reported, but does not decide.
  const totalDb = record.level?.powerDb ?? 0;
  const isMaterial = (tone: Tone): boolean =>
    tone.levelDb > totalDb - thresholds.requiredProtectionDb - immaterialBelowDb;
  const material = folded.filter(isMaterial);
  const leastChance = material.reduce((least, tone) => Math.min(least, tone.chanceProbability ?? 1), 1);
  const logRatio =
    folded.length === 0 ? 0 : Math.min(largestLogRatio, Math.max(0, -Math.log(Math.max(leastChance, 1e-6)) / 1.5));
  const findings = folded
    .filter((tone) => tone.confidence >= thresholds.confidence)
    .map((tone): Finding => {
      const finding = foldedToneFinding(tone, sampleRateHz);
      return isMaterial(tone) ? finding : { ...finding, severity: 'limit' };
    });
  const shownConfidence = folded
    .filter((tone) => tone.confidence >= thresholds.confidence)
    .filter((tone) => tone.levelDb > totalDb + labelledShareDb && tone.frequencyHz < (labelledBand * sampleRateHz) / 2)
    .reduce((best, tone) => Math.max(best, tone.confidence), 0);
  return {
    tones,
    findings: [...findings, ...distortion, ...sourcesAtFold(sheet, sampleRateHz)],
    logRatio,
    shownConfidence,
  };
}

function statedFundamentals(
  sheet: AcquisitionSheet,
  sampleRateHz: number,
): { name: string; frequencyHz: number; errorHz: number }[] {
  const stated: { name: string; frequencyHz: number; errorHz: number }[] = [];
  const add = (name: string, frequencyHz: number | undefined, relativeError: number): void => {
    if (frequencyHz === undefined || frequencyHz >= sampleRateHz / 2) return;
    stated.push({ name, frequencyHz, errorHz: relativeError * frequencyHz });
  };
  add('supply', sheet.supplyHz, supplyRelativeError);
  add('shaft', sheet.nominalSpeedHz, speedRelativeError);
  return stated;
}

/**
 * Stated families (supply, shaft) first, then blind ones; after each its folded members, so that the comb they make is not
 * taken for a family of its own.
 */
function explainFamilies(
  tones: Tone[],
  measured: ToneMeasurement[],
  stated: { name: string; frequencyHz: number; errorHz: number }[],
  sampleRateHz: number,
  binHz: number,
): void {
  const free = (): number[] =>
    tones.map((_, index) => index).filter((index) => tones[index]?.explanation === 'unexplained');
  let families = 0;
  const explain = (family: HarmonicFamily): void => {
    explainInBand(tones, family);
    if (family.members.length < 2) return;
    families++;
    const matches = foldedComb(measured, free(), family, sampleRateHz, binHz, families);
    for (const match of matches) explainFolded(tones[match.tone] as Tone, match, family);
    // Folded members know the fundamental better, by their multiple: with it further combs come within reach.
    const better = refineFamily(family, measured, matches.filter(isSure), sampleRateHz);
    if (better === null) return;
    for (const match of foldedComb(measured, free(), better, sampleRateHz, binHz, families)) {
      explainFolded(tones[match.tone] as Tone, match, better);
    }
  };
  for (const { name, frequencyHz, errorHz } of stated) {
    explain(followFamily(measured, name, frequencyHz, errorHz, binHz, true));
  }
  for (let round = 0; round < mostBlindFamilies; round++) {
    const family = bestBlindFamily(measured, free(), binHz);
    if (family === null) break;
    explain(family);
  }
}

const confidenceOf = ({ chanceProbability }: FoldedMatch): number => 1 / (1 + chanceProbability / priorOdds);
const isSure = (match: FoldedMatch): boolean => confidenceOf(match) >= leastFoldedConfidence;

function explainInBand(tones: Tone[], family: HarmonicFamily): void {
  for (const { tone: index, multiple } of family.members) {
    const tone = tones[index] as Tone;
    if (tone.explanation !== 'unexplained') continue;
    Object.assign(tone, {
      explanation: family.name === 'supply' ? 'supply' : 'harmonic',
      confidence: 1 - family.chanceProbability,
      chanceProbability: family.chanceProbability,
      explainedBy: `${multiple} × ${family.fundamentalHz.toPrecision(6)} Hz`,
    } satisfies Partial<Tone>);
  }
}

function explainFolded(tone: Tone, match: FoldedMatch, family: HarmonicFamily): void {
  const confidence = confidenceOf(match);
  if (tone.explanation !== 'unexplained' || confidence < leastFoldedConfidence) return;
  Object.assign(tone, {
    explanation: 'foldedHarmonic',
    trueFrequencyHz: match.trueFrequencyHz,
    confidence,
    chanceProbability: match.chanceProbability,
    explainedBy: `${match.multiple} × ${family.fundamentalHz.toPrecision(6)} Hz`,
  } satisfies Partial<Tone>);
}

/** Sources at stated frequencies: in band they explain a tone; beyond fs/2 a tone at their alias is folded, against chance. */
function explainKnownSources(
  tones: Tone[],
  measured: ToneMeasurement[],
  sheet: AcquisitionSheet,
  sampleRateHz: number,
  binHz: number,
): void {
  const sources = sheet.sources ?? [];
  for (const source of sources) {
    const name = source.name === undefined || source.name === '' ? `${source.frequencyHz} Hz` : source.name;
    const isBeyond = source.frequencyHz > sampleRateHz / 2;
    const expectedHz = aliasHz(source.frequencyHz, sampleRateHz);
    let best: { index: number; distance: number; chance: number } | null = null;
    measured.forEach((tone, index) => {
      if (tones[index]?.explanation !== 'unexplained') return;
      const sigma = Math.hypot(toneErrorHz(tone, binHz), 2e-4 * source.frequencyHz, binHz / 2);
      const distance = Math.abs(tone.frequencyHz - expectedHz);
      if (distance > matchSigmas * sigma || (best !== null && distance >= best.distance)) return;
      const chance = 1 - Math.exp(-2 * matchSigmas * sigma * tone.peaksPerHz);
      best = { index, distance, chance: Math.min(1, chance * Math.max(1, sources.length)) };
    });
    if (best === null) continue;
    const { index, chance } = best as { index: number; chance: number };
    Object.assign(tones[index] as Tone, {
      explanation: isBeyond ? 'foldedSource' : 'knownSource',
      ...(isBeyond ? { trueFrequencyHz: source.frequencyHz } : {}),
      confidence: 1 - chance,
      chanceProbability: chance,
      explainedBy: name,
    } satisfies Partial<Tone>);
  }
}

/** Sources exactly at a multiple of fs/2 land on 0 Hz or fs/2, where their level depends on the phase. */
function sourcesAtFold(sheet: AcquisitionSheet, sampleRateHz: number): Finding[] {
  return (sheet.sources ?? [])
    .filter(({ frequencyHz }) => zoneOf(frequencyHz, sampleRateHz).direction === 'none')
    .map(({ name, frequencyHz }) => ({
      kind: 'sourceAtFold' as const,
      severity: 'limit' as const,
      confidence: 1,
      frequencyHz: aliasHz(frequencyHz, sampleRateHz),
      trueFrequencyHz: frequencyHz,
      text: `The source ${name ?? ''} at ${frequencyHz} Hz is a multiple of half the sampling rate: it lands on ${aliasHz(frequencyHz, sampleRateHz)} Hz with a level that depends on its phase, and can't be seen.`,
      evidence: { sourceHz: frequencyHz, sampleRateHz },
      method: 'fold arithmetic',
    }));
}
