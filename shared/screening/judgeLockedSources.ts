import type { AcquisitionSheet } from '../schemas/acquisitionSheet.js';
import type { Finding } from '../schemas/screening.js';
import type { Thresholds } from '../schemas/thresholds.js';
import { stopbandEnvelope } from './filterModels.js';
import { aliasHz } from './foldArithmetic.js';
import { formatHz } from './formatNumber.js';
import type { MeasurementRecord, ToneMeasurement } from './MeasurementRecord.js';

/** Relative error of a frequency written into a sheet. */
const statedRelativeError = 2e-3;
const mostMultiples = 400;
const highestFold = 3;

interface Stated {
  name: string;
  frequencyHz: number;
  /** Harmonics are expected of it. */
  isFamily: boolean;
}

/**
 * What the sheet gives reason to suspect but one capture can't show: a source, or a harmonic of a stated family, beyond fs/2
 * that lands where an in-band harmonic or source stands. Both make the same samples; only another rate, a speed that changes
 * or a filter that is known to stop it can tell. Not reported where the family's own harmonics have died down
 * towards fs/2, or where the stated filter takes off the protection asked for.
 */
export function judgeLockedSources(
  record: MeasurementRecord,
  thresholds: Thresholds,
  sheet: AcquisitionSheet,
): Finding[] {
  const { sampleRateHz, durationS, tones, level } = record;
  if (sampleRateHz === null || durationS === null || durationS === 0 || level === null) return [];
  // A companion at another rate settles it.
  if (record.companion !== null) return [];
  const binHz = 1 / durationS;
  const reachHz = sheet.sensorBandHz ?? highestFold * sampleRateHz;
  const visible = tones.filter((tone) => tone.levelDb > level.powerDb - thresholds.requiredProtectionDb);
  const toneAt = (hz: number): ToneMeasurement | undefined =>
    visible.find((tone) => Math.abs(tone.frequencyHz - hz) <= Math.max(2 * binHz, statedRelativeError * hz));
  const isStopped = (hz: number): boolean => {
    const gain = sheet.filter === undefined ? null : stopbandEnvelope(sheet.filter, hz);
    return gain !== null && 10 * Math.log10(gain) <= -thresholds.requiredProtectionDb;
  };
  const findings: Finding[] = [];
  const stated = statedSources(sheet);
  for (const source of stated) {
    const suspects = source.isFamily
      ? familyBeyond(source.frequencyHz, sampleRateHz, reachHz, toneAt)
      : source.frequencyHz > sampleRateHz / 2 && source.frequencyHz <= reachHz
        ? [source.frequencyHz]
        : [];
    for (const trueHz of suspects) {
      const landsHz = aliasHz(trueHz, sampleRateHz);
      // How sharply the place is known decides whether the two could be told apart.
      const widthHz = Math.max(2 * binHz, source.isFamily ? 0 : statedRelativeError * trueHz);
      const taken = stated.find((other) =>
        other !== source || source.isFamily ? fits(other, landsHz, widthHz) : false,
      );
      if (taken === undefined || toneAt(landsHz) === undefined || isStopped(trueHz)) continue;
      findings.push(lockedFinding(source, trueHz, landsHz, taken, sampleRateHz));
      break;
    }
  }
  return findings;
}

function statedSources(sheet: AcquisitionSheet): Stated[] {
  const list: Stated[] = (sheet.sources ?? []).map(({ name, frequencyHz }) => ({
    name: name === undefined || name === '' ? formatHz(frequencyHz) : name,
    frequencyHz,
    isFamily: false,
  }));
  if (sheet.supplyHz !== undefined) list.push({ name: 'supply', frequencyHz: sheet.supplyHz, isFamily: true });
  if (sheet.nominalSpeedHz !== undefined) {
    list.push({ name: 'shaft', frequencyHz: sheet.nominalSpeedHz, isFamily: true });
  }
  return list;
}

/** Harmonics beyond fs/2 that are likely: the two in-band harmonics next to fs/2 of which one is seen speak for them. */
function familyBeyond(
  fundamentalHz: number,
  sampleRateHz: number,
  reachHz: number,
  toneAt: (hz: number) => ToneMeasurement | undefined,
): number[] {
  const last = Math.floor(sampleRateHz / 2 / fundamentalHz);
  if (last < 1 || last > mostMultiples) return [];
  const reaches = [last, last - 1].some((k) => k > 0 && toneAt(k * fundamentalHz) !== undefined);
  if (!reaches) return [];
  return [last + 1, last + 2].map((k) => k * fundamentalHz).filter((hz) => hz > sampleRateHz / 2 && hz <= reachHz);
}

function fits(stated: Stated, hz: number, widthHz: number): boolean {
  const multiple = stated.isFamily ? Math.max(1, Math.round(hz / stated.frequencyHz)) : 1;
  return Math.abs(hz - multiple * stated.frequencyHz) <= widthHz;
}

function lockedFinding(source: Stated, trueHz: number, landsHz: number, taken: Stated, sampleRateHz: number): Finding {
  return {
    kind: 'ambiguousFold',
    severity: 'limit',
    confidence: 0.95,
    frequencyHz: landsHz,
    trueFrequencyHz: trueHz,
    text: `${source.isFamily ? `A harmonic of the ${source.name}` : `The source ${source.name}`} at ${formatHz(trueHz)} would land on ${formatHz(landsHz)}, where the ${taken.name} stands in its own right: one capture at ${formatHz(sampleRateHz)} can't tell the two apart. Record once more at another rate, or state a filter that stops it.`,
    evidence: { trueFrequencyHz: trueHz, frequencyHz: landsHz, sampleRateHz },
    method: 'fold arithmetic of the stated sources',
    source: 'fold arithmetic',
  };
}
