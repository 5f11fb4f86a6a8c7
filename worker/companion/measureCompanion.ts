import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import type {
  CompanionMeasurement,
  DensityPair,
  FoldedBand,
  MeasurementRecord,
} from '../../shared/screening/MeasurementRecord.js';
import type { ChannelMeasurement } from '../measure/ChannelMeasurement.js';
import { alignCaptures } from './alignCaptures.js';
import { foldedCoherence } from './foldedCoherence.js';
import { type Clock, measureMoves, type Recorded } from './measureMoves.js';
import { pooledDensities } from './pooledDensities.js';
import type { Excerpt } from './readExcerpt.js';
import { zoneCells } from './ZoneCells.js';

/** Highest frequency looked for where the sheet states no sensor band, as a multiple of the higher rate. */
const defaultReach = 2;
/**
 * The cross-correlation shows one event where chance is below this and the phases agree at least so far: hum and slow drifts
 * that many captures share agree a little and mean nothing.
 */
const alignedChance = 1e-4;
const leastAgreement = 0.3;

/** A companion at about twice the rate or more is taken to show each frequency at its own place. */
const fastRatio = 1.9;
const mostZones = 4;

/** Compares one channel of a capture with its companion's: the lag, and where each tone stands in the companion. */
export function measureCompanion(
  name: string,
  own: ChannelMeasurement & Recorded,
  other: ChannelMeasurement & Recorded,
  sheet: AcquisitionSheet,
): CompanionMeasurement {
  const alignment = alignCaptures(own.samples, own.rateHz, other.samples, other.rateHz);
  const isAligned =
    alignment !== null && alignment.chanceProbability < alignedChance && alignment.agreement >= leastAgreement;
  const clock = isAligned ? alignment : null;
  const reachHz = sheet.sensorBandHz ?? defaultReach * Math.max(own.rateHz, other.rateHz);
  return {
    name,
    sampleRateHz: other.rateHz,
    durationS: other.record.durationS ?? 0,
    tones: other.record.tones,
    alignment,
    moves: measureMoves(own, other, clock, own.record.tones, reachHz),
    folded: clock === null ? null : measureFolded(own, other, clock, reachHz),
    densities: clock === null && other.rateHz >= fastRatio * own.rateHz ? measureDensities(own, other) : null,
  };
}

function measureDensities(
  own: ChannelMeasurement & Recorded,
  other: ChannelMeasurement & Recorded,
): DensityPair | null {
  const surveyOf = ({ spectra }: ChannelMeasurement) => spectra.find(({ kind }) => kind === 'survey');
  return pooledDensities(surveyOf(own), own.rateHz, surveyOf(other), other.rateHz);
}

function measureFolded(own: Recorded, other: Recorded, clock: Clock, reachHz: number): FoldedBand[] | null {
  const isFast = other.rateHz >= fastRatio * own.rateHz;
  const upToHz = isFast ? other.rateHz / 2 : Math.min(reachHz, (mostZones * own.rateHz) / 2);
  const cells = zoneCells(own, other, clock, upToHz);
  return cells === null ? null : foldedCoherence(cells);
}

/** The companion's channel that goes with a channel: the one of the same name, else of the same number, else the first. */
export function pairedChannel(record: MeasurementRecord, others: MeasurementRecord[], excerpt: Excerpt): number {
  const named =
    record.channelName === '' ? -1 : others.findIndex(({ channelName }) => channelName === record.channelName);
  if (named >= 0) return named;
  return record.channel < excerpt.channels.length ? record.channel : 0;
}
