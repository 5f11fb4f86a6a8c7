import type { ContaminationBound } from './contaminationBound.js';
import type { ProfileMeasurement } from './MeasurementRecord.js';

export interface ClearTo {
  /** null: not even the lowest cell is protected. */
  clearToHz: number | null;
  /** Least distance of the smoothed density to the bound over the stretch asked about, dB. */
  marginDb: number;
}

/**
 * The top of the unbroken stretch from the lowest frequency of interest in which the mean density, smoothed over fs/40,
 * valleys included, stays above the bound by the protection. Nothing is claimed at or above a tone shown to be folded.
 */
export function clearToFrequency(
  profile: ProfileMeasurement,
  bound: ContaminationBound,
  protectionDb: number,
  options: { lowestHz: number; highestHz: number; sampleRateHz: number; stopsHz: number[] },
): ClearTo {
  const { cellHz } = profile;
  const linear = profile.meanDb.map((level) => 10 ** (level / 10));
  const reach = Math.max(0, Math.floor(options.sampleRateHz / 40 / cellHz / 2));
  const stopHz = options.stopsHz.reduce((least, value) => Math.min(least, value), Number.POSITIVE_INFINITY);
  // The first cells hold what the removal of the mean leaves of 0 Hz.
  const first = Math.max(Math.floor(options.lowestHz / cellHz), Math.ceil((2 * profile.resolutionHz) / cellHz));
  let clearToHz: number | null = null;
  let marginDb = Number.POSITIVE_INFINITY;
  for (let cell = first; cell < linear.length; cell++) {
    const from = Math.max(first, cell - reach);
    const to = Math.min(linear.length - 1, cell + reach);
    let sum = 0;
    for (let near = from; near <= to; near++) sum += linear[near] as number;
    const distance = 10 * Math.log10(sum / (to - from + 1)) - bound.atDb((cell + 0.5) * cellHz);
    const topHz = (cell + 1) * cellHz;
    if ((cell + 0.5) * cellHz <= options.highestHz) marginDb = Math.min(marginDb, distance);
    if (distance < protectionDb || topHz > stopHz) break;
    clearToHz = topHz;
  }
  return { clearToHz, marginDb: Number.isFinite(marginDb) ? marginDb : 0 };
}
