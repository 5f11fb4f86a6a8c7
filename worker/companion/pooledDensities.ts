import type { DensityPair } from '../../shared/screening/MeasurementRecord.js';
import type { MeasuredSpectrum } from '../measure/ChannelMeasurement.js';

/** Cells of 0 … fs/2. */
const cells = 40;
/** A cell holds at least as many bins of either spectrum, or there are fewer cells. */
const leastBins = 3;

/**
 * Mean density of a slow capture in equal cells of 0 … fs/2, and what a fast companion holds at the same place and, summed over
 * its higher zones, at all places that fold there. No phases: the event may have been repeated.
 * @returns null where a spectrum is missing or too coarse
 */
export function pooledDensities(
  own: MeasuredSpectrum | undefined,
  ownRateHz: number,
  other: MeasuredSpectrum | undefined,
  otherRateHz: number,
): DensityPair | null {
  if (own === undefined || other === undefined) return null;
  const half = ownRateHz / 2;
  const coarsest = Math.max(own.resolutionHz, other.resolutionHz);
  const count = Math.min(cells, Math.floor(half / (leastBins * coarsest)));
  if (count < 8) return null;
  const cellHz = half / count;
  const zones = Math.floor(otherRateHz / ownRateHz + 1e-9);
  const [ownDb, sameDb, foldedDb]: [number[], number[], number[]] = [[], [], []];
  for (let cell = 0; cell < count; cell++) {
    const [from, to] = [cell * cellHz, (cell + 1) * cellHz];
    let folded = 0;
    for (let zone = 2; zone <= zones; zone++) {
      const start = zone % 2 === 0 ? zone * half - to : (zone - 1) * half + from;
      folded += meanDensity(other, start, start + cellHz);
    }
    ownDb.push(toDb(meanDensity(own, from, to)));
    sameDb.push(toDb(meanDensity(other, from, to)));
    foldedDb.push(toDb(folded));
  }
  return { cellHz, zones, ownDb, sameDb, foldedDb };
}

/** The bins at 0 Hz and beside it hold the mean and the window's skirt of it. */
function meanDensity({ densityMean, resolutionHz }: MeasuredSpectrum, fromHz: number, toHz: number): number {
  const first = Math.max(2, Math.round(fromHz / resolutionHz));
  const last = Math.min(densityMean.length - 1, Math.max(first, Math.round(toHz / resolutionHz) - 1));
  let sum = 0;
  for (let bin = first; bin <= last; bin++) sum += densityMean[bin] as number;
  return sum / Math.max(1, last - first + 1);
}

const toDb = (density: number): number => 10 * Math.log10(Math.max(density, 1e-30));
