import type { AcquisitionSheet } from '../schemas/acquisitionSheet.js';
import type { ChannelJudgement, Finding, Tone } from '../schemas/screening.js';
import type { Thresholds } from '../schemas/thresholds.js';
import { decideVerdict } from './decideVerdict.js';
import { isFoldedTone } from './FoldEvidence.js';
import { formatHz, formatPercent } from './formatNumber.js';
import { matchSigmas } from './harmonicFamily.js';
import { judgeChannel } from './judgeChannel.js';
import type { MeasurementRecord } from './MeasurementRecord.js';

/**
 * Judges all channels of a capture, each alone and then together: channels are sampled at the same instants, so a tone shown
 * to be folded in one is folded wherever the same tone stands, unless that place is hit by chance.
 */
export function judgeChannels(
  records: MeasurementRecord[],
  thresholds: Thresholds,
  sheet: AcquisitionSheet,
): ChannelJudgement[] {
  const alone = records.map((record) => judgeChannel(record, thresholds, sheet));
  if (alone.length < 2) return alone;
  const shown = alone.flatMap(({ tones }, channel) =>
    tones
      .filter((tone) => isFoldedTone(tone) && tone.confidence >= thresholds.confidence)
      .map((tone) => ({ tone, channel })),
  );
  return alone.map((judgement, channel) => {
    const record = records[channel];
    const others = shown.filter((one) => one.channel !== channel);
    return record === undefined || others.length === 0 ? judgement : checked(judgement, record, others, thresholds);
  });
}

function checked(
  judgement: ChannelJudgement,
  record: MeasurementRecord,
  others: { tone: Tone; channel: number }[],
  thresholds: Thresholds,
): ChannelJudgement {
  const findings: Finding[] = [];
  const binHz = record.durationS === null || record.durationS === 0 ? 0 : 1 / record.durationS;
  const tones = judgement.tones.map((tone): Tone => {
    if (tone.explanation !== 'unexplained') return tone;
    const near = others
      .map((one) => ({ ...one, distanceHz: Math.abs(one.tone.frequencyHz - tone.frequencyHz) }))
      .sort((a, b) => a.distanceHz - b.distanceHz)[0];
    if (near === undefined) return tone;
    const sigmaHz = Math.hypot(tone.uncertaintyHz, near.tone.uncertaintyHz, 0.1 * binHz);
    if (near.distanceHz > matchSigmas * sigmaHz) return tone;
    const peaksPerHz = nearestPeaksPerHz(record, tone.frequencyHz);
    const chance = Math.min(1, others.length * (1 - Math.exp(-2 * matchSigmas * sigmaHz * peaksPerHz)));
    const confidence = Math.min(near.tone.confidence, 1 - chance);
    if (confidence < thresholds.confidence) return tone;
    findings.push(finding(tone, near.tone, near.channel, confidence, chance));
    return {
      ...tone,
      explanation: near.tone.explanation,
      ...(near.tone.trueFrequencyHz === undefined ? {} : { trueFrequencyHz: near.tone.trueFrequencyHz }),
      confidence,
      chanceProbability: chance,
      explainedBy: `channel ${near.channel + 1}`,
    };
  });
  if (findings.length === 0) return judgement;
  const all = [...findings, ...judgement.findings];
  const lowestHz = findings.reduce((least, { frequencyHz }) => Math.min(least, frequencyHz ?? least), Infinity);
  return {
    ...judgement,
    tones,
    findings: all,
    verdict: decideVerdict(all, thresholds.confidence),
    clearToHz: judgement.clearToHz === null ? null : Math.min(judgement.clearToHz, lowestHz),
  };
}

function nearestPeaksPerHz(record: MeasurementRecord, frequencyHz: number): number {
  let best = { distanceHz: Infinity, peaksPerHz: 0 };
  for (const tone of record.tones) {
    const distanceHz = Math.abs(tone.frequencyHz - frequencyHz);
    if (distanceHz < best.distanceHz) best = { distanceHz, peaksPerHz: tone.peaksPerHz };
  }
  return best.peaksPerHz;
}

function finding(tone: Tone, other: Tone, channel: number, confidence: number, chance: number): Finding {
  const belongs = other.trueFrequencyHz === undefined ? '' : `, where it belongs at ${formatHz(other.trueFrequencyHz)}`;
  return {
    kind: 'foldedInOtherChannel',
    severity: 'fold',
    confidence,
    frequencyHz: tone.frequencyHz,
    ...(other.trueFrequencyHz === undefined ? {} : { trueFrequencyHz: other.trueFrequencyHz }),
    strengthDb: tone.levelDb,
    text: `The tone at ${formatHz(tone.frequencyHz)} is shown to be folded in channel ${channel + 1}${belongs}; this channel was sampled at the same instants and holds it too. Chance of such a match: ${formatPercent(chance)}.`,
    evidence: { frequencyHz: tone.frequencyHz, otherChannel: channel + 1, chanceProbability: chance },
    method: 'place of the tone in simultaneously sampled channels, corrected for all places tried',
    source: 'fold arithmetic',
  };
}
