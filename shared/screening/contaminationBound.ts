import type { AcquisitionSheet } from '../schemas/acquisitionSheet.js';
import type { MeasurementRecord } from './MeasurementRecord.js';
import { stopbandEnvelope } from './filterModels.js';
import { normalQuantile } from './normalQuantile.js';
import { oldRate } from './oldRate.js';

/** Share of a noise floor stated in the sheet that is taken off the edge: it may be stated a decibel too high. */
const floorShare = 0.8;
/** Gain assumed for a sensor resonance beyond fs/2 that the sheet names without its height. */
const resonanceGainDb = 30;
const imagesCounted = 32;

export interface ContaminationBound {
  /** Upper confidence limit of the mean density next to fs/2, dB: the bound where no filter helps. */
  edgeUpperDb: number;
  /** Half the rate of the recording that the bound speaks of: the old one where the rate was raised afterwards. */
  foldingFrequencyHz: number;
  /** Largest density that may be folded back at f, all zones together, dB. */
  atDb: (frequencyHz: number) => number;
  usesFilter: boolean;
  assumption: string;
}

/**
 * Upper bound on the density folded back. Let g be the one-sided density after the filter, G the observed one:
 * G(fs/2) = 2·Σ_{j≥0} g((2j+1)·fs/2). If g does not increase beyond fs/2, the folded density at any f is at most G(fs/2).
 * With a known filter and a source that does not increase before it: at most (G(fs/2)/2)·Σ_k [a(k·fs−f) + a(k·fs+f)],
 * a(v) = |H(v)|²/|H(fs/2)|² with the stop-band envelope; only attenuation relative to fs/2 is taken off.
 */
export function contaminationBound(
  record: MeasurementRecord,
  confidence: number,
  sheet: AcquisitionSheet,
): ContaminationBound | null {
  const { edge } = record;
  const old = oldRate(record);
  // A capture whose rate was raised is bounded by the edge of its first recording, where that shows.
  const usesOldEdge = old !== null && old.foldingFrequencyHz !== null && old.edgeDensityDb !== null;
  const sampleRateHz = usesOldEdge ? 2 * (old.foldingFrequencyHz as number) : record.sampleRateHz;
  if (edge === null || sampleRateHz === null) return null;
  const densityDb = usesOldEdge ? (old.edgeDensityDb as number) : edge.densityDb;
  // On a logarithmic scale, so that a wide spread never turns into a negative or absurd limit.
  const spread = Math.sqrt(Math.log(1 + edge.relativeError ** 2));
  const resonates = sheet.sensorResonanceHz !== undefined && sheet.sensorResonanceHz > sampleRateHz / 2;
  const upperDb = densityDb + (10 / Math.LN10) * Math.max(0, normalQuantile(confidence)) * spread;
  // Noise added after sampling does not fold: what the sheet states of it is no contamination.
  const hasFloor = sheet.noiseFloorDb !== undefined && sheet.noiseFloorDb < upperDb + 1;
  const floor = hasFloor ? floorShare * 10 ** (Math.min(sheet.noiseFloorDb ?? 0, densityDb) / 10) : 0;
  const edgeUpperDb = 10 * Math.log10(10 ** (upperDb / 10) - floor) + (resonates ? resonanceGainDb : 0);
  const filter = sheet.filter;
  const reference = filter === undefined ? null : stopbandEnvelope(filter, sampleRateHz / 2);
  const usesFilter = filter !== undefined && filter.type !== 'none' && reference !== null && reference > 0;
  const relativeDb = (frequencyHz: number): number => {
    if (!usesFilter) return 0;
    let sum = 0;
    for (let k = 1; k <= imagesCounted; k++) {
      sum += stopbandEnvelope(filter, k * sampleRateHz - frequencyHz) ?? 0;
      sum += stopbandEnvelope(filter, k * sampleRateHz + frequencyHz) ?? 0;
    }
    return Math.min(0, 10 * Math.log10(Math.max(sum / (2 * reference), 1e-30)));
  };
  return {
    edgeUpperDb,
    foldingFrequencyHz: sampleRateHz / 2,
    usesFilter,
    atDb: (frequencyHz) => edgeUpperDb + relativeDb(frequencyHz),
    assumption: `${
      usesFilter
        ? 'the source does not increase beyond fs/2 before the filter, and the filter is as the sheet says'
        : 'the density does not increase beyond fs/2'
    }${hasFloor ? '; the noise floor stated in the sheet is taken off' : ''}${resonates ? `; ${resonanceGainDb} dB added for the sensor resonance in the sheet` : ''}`,
  };
}
