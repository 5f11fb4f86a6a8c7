import type { IrregularMeasurement } from '../../shared/screening/MeasurementRecord.js';
import { decibels } from '../dsp/decibels.js';
import { irregularReach } from './irregularReach.js';
import { measureBeyondHalf } from './measureBeyondHalf.js';
import { createTonePursuit } from './pursueTones.js';

/** Samples used: more only slow the search down. */
const mostSamples = 20_000;
const leastSamples = 64;
const silentDb = -400;

/**
 * Prepares the measurement of irregularly sampled channels with the same stamps: how far up frequencies can be told apart,
 * the tones, also beyond half the mean rate, and how much else lies there.
 * @param allTimesS rising, in seconds; of a longer capture the first 20 000 are used
 */
export function createIrregularMeter(
  allTimesS: Float64Array,
  options: { roundingStepS: number; sensorBandHz: number | null },
): (allValues: Float64Array) => IrregularMeasurement {
  const count = Math.min(mostSamples, allTimesS.length);
  const start = allTimesS[0] ?? 0;
  const spanS = (allTimesS[count - 1] ?? 0) - start;
  // Counted from the middle, phase and frequency of a tone hardly depend on each other.
  const timesS = allTimesS.slice(0, count).map((time) => time - start - spanS / 2);
  const search = irregularReach(timesS, options);
  const { meanRateHz, reachHz, limitedBy } = search;
  const pursue = spanS > 0 && count >= leastSamples ? createTonePursuit(timesS, search) : null;
  return (allValues) => {
    const values = allValues.slice(0, count);
    const mean = values.reduce((sum, value) => sum + value, 0) / Math.max(1, count);
    const centred = values.map((value) => value - mean);
    const power = centred.reduce((sum, value) => sum + value * value, 0) / Math.max(1, count);
    const totalDb = Math.max(silentDb, decibels(power));
    if (pursue === null || !(power > 0)) return { meanRateHz, reachHz, limitedBy, tones: [], totalDb, beyond: null };
    const { tones, falseAlarm, residual } = pursue(centred);
    const beyond = measureBeyondHalf(timesS, residual, search, power);
    return { meanRateHz, reachHz, limitedBy, tones, totalDb, falseAlarm, beyond };
  };
}
