import type { MeasurementRecord, ProfileMeasurement } from './MeasurementRecord.js';
import { oldRate } from './oldRate.js';

/** Few figures, each of which moves the fold score in one direction only. */
export interface FoldFeatures {
  /** Power the edge density would carry over the whole band, less the quantisation floor, over total power, dB. Up: folded. */
  edgeShareDb: number;
  /** Steepest fall of the density within a tenth of fs/2, dB. Up: filtered. */
  cliffDb: number;
  /** Share of the edge that follows the in-band level over time, dB, −20 … 0. Up: folded. */
  followingDb: number;
  /** 0 … 1: how far the upper half of the band is a flat, steady floor, which says nothing either way. */
  floorLikeness: number;
  /** The rate was raised by repetition or straight lines: the energy at the edge is images, not folded. */
  hasImages: boolean;
}

const decibels = (power: number): number => 10 * Math.log10(Math.max(power, 1e-40));

export function foldFeatures(record: MeasurementRecord): FoldFeatures | null {
  const { profile, edge, sampleRateHz, integrity } = record;
  if (profile === null || edge === null || sampleRateHz === null) return null;
  const total = profile.meanDb.reduce((sum, level) => sum + 10 ** (level / 10), 0) * profile.cellHz;
  const density = 10 ** (edge.densityDb / 10);
  const quantisation = integrity.quantisationFloorDb === null ? 0 : 10 ** (integrity.quantisationFloorDb / 10);
  const above = Math.max(density - 1.3 * quantisation, 1e-4 * density);
  const share = edge.follows?.followingShareDb ?? null;
  return {
    edgeShareDb: decibels((above * sampleRateHz) / 2 / Math.max(total, 1e-40)),
    cliffDb: edge.steepestFallDb,
    followingDb: share === null ? -20 : Math.min(0, Math.max(-20, share)),
    floorLikeness: floorLikeness(profile, edge.kurtosis),
    hasImages: hasImages(record),
  };
}

/** Energy at the edge of a capture whose rate was raised is images. */
function hasImages(record: MeasurementRecord): boolean {
  const old = oldRate(record);
  return old !== null && old.by !== 'cliff';
}

const floorBands = 8;
const floorFrom = 0.7;
const floorTo = 0.97;
const floorToleranceDb = 0.8;

/**
 * 1 when the lower quartiles of the median density in eight bands between 0.7 and 0.97·fs/2 differ by no more than chance
 * explains and the edge is steady over time. Medians and quartiles look past tones, also past those that move.
 */
function floorLikeness(profile: ProfileMeasurement, kurtosis: number): number {
  const cells = profile.medianDb.length;
  const width = (floorTo - floorFrom) / floorBands;
  const levels = Array.from({ length: floorBands }, (_, band) => {
    const from = Math.floor((floorFrom + band * width) * cells);
    const to = Math.max(from + 1, Math.floor((floorFrom + (band + 1) * width) * cells));
    return lowerQuartile(profile.medianDb.slice(from, to));
  });
  const binsPerBand = Math.max(1, (width * cells * profile.cellHz) / profile.resolutionHz);
  const chanceDb = (1.6 * 4.34) / Math.sqrt(binsPerBand * profile.effectiveSegments);
  if (chanceDb > 0.8) return 0;
  const mean = levels.reduce((sum, level) => sum + level, 0) / floorBands;
  const variance = levels.reduce((sum, level) => sum + (level - mean) ** 2, 0) / floorBands - chanceDb ** 2;
  const flatness = Math.exp(-Math.max(0, variance) / floorToleranceDb ** 2);
  return flatness * Math.exp(-((Math.max(0, kurtosis - 1.3) / 0.5) ** 2));
}

function lowerQuartile(levels: number[]): number {
  const sorted = [...levels].sort((a, b) => a - b);
  const place = 0.25 * (sorted.length - 1);
  const below = sorted[Math.floor(place)] ?? 0;
  return below + ((sorted[Math.ceil(place)] ?? below) - below) * (place - Math.floor(place));
}
