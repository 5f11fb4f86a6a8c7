import type { ProfileMeasurement } from '../../shared/screening/MeasurementRecord.js';
import { decibels } from '../dsp/decibels.js';
import type { SpectrumMeter } from './SpectrumMeter.js';

const mostCells = 512;

/** Averages of Hann segments at 50 % overlap: neighbours correlate by (1/6)² in power (Welch 1967). */
export function effectiveAverages(segments: number): number {
  return segments <= 1 ? segments : segments / (1 + (2 / 36) * (1 - 1 / segments));
}

/** Pools the survey into at most 512 equal cells; bin 0 is left out, the bin at fs/2 too. */
export function measureProfile(meter: SpectrumMeter, toneless: Float64Array, median: Float64Array): ProfileMeasurement {
  const { segments, resolutionHz, binCount } = meter.survey;
  const cells = Math.min(mostCells, binCount - 1);
  const binsPerCell = (binCount - 1) / cells;
  const pool = (density: Float64Array, scale: number): number[] =>
    Array.from({ length: cells }, (_, cell) => {
      const from = Math.max(1, cell * binsPerCell);
      const to = Math.max(from + 1, (cell + 1) * binsPerCell);
      let sum = 0;
      for (let bin = from; bin < to; bin++) sum += density[bin] as number;
      return Number(decibels((scale * sum) / (to - from)).toFixed(2));
    });
  return {
    cellHz: resolutionHz * binsPerCell,
    resolutionHz,
    segments,
    effectiveSegments: effectiveAverages(segments),
    meanDb: pool(meter.surveySum, 1 / segments),
    tonelessDb: pool(toneless, 1),
    medianDb: pool(median, 1),
  };
}
