import type { FoldedBand, FoldedZone } from '../../shared/screening/MeasurementRecord.js';
import { regressZones } from './regressZones.js';
import type { ZoneCells } from './ZoneCells.js';

const bands = 10;
/** Sub-bands of a band have transfers of their own: filters turn the phase across a band. */
const mostSubBands = 4;
const leastBinsOfSubBand = 4;

/**
 * Multiple coherence of a slow capture with what the companion carries in each zone (conditioned spectra, Bendat & Piersol
 * 2010, ch. 7): zone 1 is taken out first, then each higher zone, folded to this capture's rate, accounts for a part of what
 * is left. Cells are weighted to equal level over time and frequency, so that a few strong ones don't speak for all.
 * Bands are tenths of 0 … fs/2; powers in dB of the total.
 */
export function foldedCoherence(cells: ZoneCells): FoldedBand[] {
  const { segments, ownBins, otherBins, ours, stepHz, coveredS } = cells;
  const half = ownBins - 1;
  const zones = Math.floor((otherBins - 1) / half);
  const powers = new Float64Array(ownBins);
  for (let k = 0; k < segments; k++) {
    for (let b = 1; b < half; b++) {
      const at = 2 * (k * ownBins + b);
      powers[b] = (powers[b] as number) + (ours[at] as number) ** 2 + (ours[at + 1] as number) ** 2;
    }
  }
  const total = powers.reduce((sum, power) => sum + power, 0);
  return Array.from({ length: bands }, (_, band): FoldedBand => {
    const from = Math.max(1, Math.round((band * half) / bands));
    const to = Math.min(half - 1, Math.round(((band + 1) * half) / bands) - 1);
    const count = Math.max(1, Math.min(mostSubBands, Math.floor((to - from + 1) / leastBinsOfSubBand)));
    const sums = Array.from({ length: zones }, () => ({
      explained: 0,
      before: 0,
      power: 0,
      chance: 0,
      inputs: 0,
      cells: 0,
    }));
    const levels = levelsOverTime(cells, from, to, powers);
    for (let part = 0; part < count; part++) {
      const first = from + Math.floor((part * (to - from + 1)) / count);
      const last = from + Math.floor(((part + 1) * (to - from + 1)) / count) - 1;
      regressZones(cells, first, last, powers, levels, sums, coveredS * (last - first + 1) * stepHz);
    }
    const bandPower = powers.subarray(from, to + 1).reduce((sum, power) => sum + power, 0);
    return {
      fromHz: (band * half * stepHz) / bands,
      toHz: ((band + 1) * half * stepHz) / bands,
      powerDb: toDb(bandPower / Math.max(total, 1e-300)),
      zones: sums.map(({ explained, before, power, chance, inputs, cells: independent }, index): FoldedZone => ({
        zone: index + 1,
        coherence: before > 0 ? Math.min(1, explained / before) : 0,
        independent: Math.round(independent),
        inputs,
        powerDb: toDb(power / Math.max(total, 1e-300)),
        chanceDb: toDb(chance / Math.max(total, 1e-300)),
      })),
    };
  });
}

/** Cells around a segment that its level is the mean of: from few, a cell would set its own weight and lose its say. */
const leastLevelCells = 64;

/** Level of each segment over the whole band against the band's mean spectrum, smoothed over as many segments as it takes. */
function levelsOverTime(cells: ZoneCells, from: number, to: number, powers: Float64Array): Float64Array {
  const { segments, ownBins, ours } = cells;
  const each = Float64Array.from({ length: segments }, (_, k) => {
    let level = 0;
    for (let b = from; b <= to; b++) {
      const at = 2 * (k * ownBins + b);
      level += ((ours[at] as number) ** 2 + (ours[at + 1] as number) ** 2) / Math.max(powers[b] as number, 1e-300);
    }
    return level;
  });
  const reach = Math.floor(leastLevelCells / (to - from + 1) / 2);
  return each.map((_, k) => {
    const near = each.subarray(Math.max(0, k - reach), k + reach + 1);
    return near.reduce((sum, level) => sum + level, 0) / near.length;
  });
}

const toDb = (ratio: number): number => 10 * Math.log10(Math.max(ratio, 1e-20));
