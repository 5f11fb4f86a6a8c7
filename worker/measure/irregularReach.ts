import type { IrregularMeasurement } from '../../shared/screening/MeasurementRecord.js';
import { commonTimeStep } from '../dsp/commonTimeStep.js';

export interface IrregularSearch extends Pick<IrregularMeasurement, 'reachHz' | 'limitedBy'> {
  meanRateHz: number;
  spanS: number;
  /** Frequencies searched are stepHz, 2·stepHz, … count·stepHz. */
  stepHz: number;
  count: number;
}

/** Search no further than this many times half the mean rate, and at no more frequencies: the computing budget. */
const budgetFactor = 8;
const mostFrequencies = 2 ** 16;
/** Frequencies per 1/span, where the budget allows and at least. */
const finePerWidth = 4;
const coarsePerWidth = 2;
/** A grid's own half rate is no place to tell a frequency from its image. */
const belowGridHalf = 0.999;

/**
 * How far up the time stamps tell frequencies apart: the least of 1/(2p) (Eyer & Bartholdi 1999), 1/(2π·σ) for stamps in
 * error by σ (rounding step/√12), the sensor's band, and the computing budget.
 */
export function irregularReach(
  timesS: Float64Array,
  { roundingStepS, sensorBandHz }: { roundingStepS: number; sensorBandHz: number | null },
): IrregularSearch {
  const spanS = (timesS[timesS.length - 1] ?? 0) - (timesS[0] ?? 0);
  const meanRateHz = spanS > 0 ? (timesS.length - 1) / spanS : 0;
  const limits: Pick<IrregularSearch, 'reachHz' | 'limitedBy'>[] = [
    {
      reachHz: Math.min((budgetFactor * meanRateHz) / 2, spanS > 0 ? mostFrequencies / (coarsePerWidth * spanS) : 0),
      limitedBy: 'budget',
    },
  ];
  const step = commonTimeStep(timesS, roundingStepS);
  if (step !== null) limits.push({ reachHz: belowGridHalf / (2 * step), limitedBy: 'grid' });
  if (roundingStepS > 0) {
    limits.push({ reachHz: Math.sqrt(12) / (2 * Math.PI * roundingStepS), limitedBy: 'stampError' });
  }
  if (sensorBandHz !== null) limits.push({ reachHz: sensorBandHz, limitedBy: 'sensorBand' });
  const least = limits.reduce((lower, limit) => (limit.reachHz < lower.reachHz ? limit : lower));
  const widths = Math.max(1, least.reachHz * spanS);
  const perWidth = Math.min(finePerWidth, mostFrequencies / widths);
  const count = Math.max(1, Math.floor(perWidth * widths));
  return { ...least, meanRateHz, spanS, stepHz: least.reachHz / count, count };
}
