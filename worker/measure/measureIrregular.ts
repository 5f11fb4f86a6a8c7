import type { IrregularMeasurement, IrregularTone } from '../../shared/screening/MeasurementRecord.js';
import { commonTimeStep } from '../dsp/commonTimeStep.js';
import { decibels } from '../dsp/decibels.js';
import { lombScargle } from '../dsp/lombScargle.js';
import { quantile } from '../dsp/quantile.js';
import { sinusoidFit, sinusoidResidual } from '../dsp/sinusoidFit.js';

const mostTones = 16;
const gridPerWidth = 4;
const mostGridPoints = 2 ** 18;
/** Samples used: more only slow the search down. */
const mostSamples = 20_000;
/** Search no further than this many times half the mean rate: the computing budget. */
const budgetFactor = 8;
const leastLogFalseAlarm = Math.log(1e-3);

/**
 * Tones of an irregularly sampled capture, also beyond half the mean rate: generalised Lomb-Scargle search, one tone
 * after the other, all amplitudes refitted each time (orthogonal matching pursuit, Tropp & Gilbert 2007); each tone has to
 * lower the residual of every fifth sample, which takes no part in the fit.
 */
export function measureIrregular(
  allTimesS: Float64Array,
  allValues: Float64Array,
  options: { roundingStepS: number; sensorBandHz: number | null },
): IrregularMeasurement {
  const count = Math.min(mostSamples, allTimesS.length);
  const start = allTimesS[0] ?? 0;
  const timesS = allTimesS.slice(0, count).map((time) => time - start);
  const values = allValues.slice(0, count);
  const spanS = (timesS[count - 1] ?? 0) - (timesS[0] ?? 0);
  const meanRateHz = spanS > 0 ? (count - 1) / spanS : 0;
  const reach = reachOf(timesS, options, meanRateHz, spanS);
  const stepHz = 1 / (gridPerWidth * spanS);
  const gridPoints = Math.max(1, Math.floor(reach.reachHz / stepHz));
  const tones = spanS > 0 && count >= 64 ? pursueTones(timesS, values, stepHz, gridPoints) : [];
  return { meanRateHz, ...reach, tones };
}

function reachOf(
  timesS: Float64Array,
  { roundingStepS, sensorBandHz }: { roundingStepS: number; sensorBandHz: number | null },
  meanRateHz: number,
  spanS: number,
): Pick<IrregularMeasurement, 'reachHz' | 'limitedBy'> {
  const step = commonTimeStep(timesS, roundingStepS);
  const limits: { reachHz: number; limitedBy: IrregularMeasurement['limitedBy'] }[] = [
    {
      reachHz: Math.min((budgetFactor * meanRateHz) / 2, mostGridPoints / (gridPerWidth * spanS)),
      limitedBy: 'budget',
    },
  ];
  if (step !== null) limits.push({ reachHz: 0.999 / (2 * step), limitedBy: 'grid' });
  if (roundingStepS > 0) {
    limits.push({ reachHz: Math.sqrt(12) / (2 * Math.PI * roundingStepS), limitedBy: 'stampError' });
  }
  if (sensorBandHz !== null) limits.push({ reachHz: sensorBandHz, limitedBy: 'sensorBand' });
  return limits.reduce((least, limit) => (limit.reachHz < least.reachHz ? limit : least));
}

function pursueTones(timesS: Float64Array, values: Float64Array, stepHz: number, gridPoints: number): IrregularTone[] {
  const isHeld = (n: number): boolean => (n * 7 + (n >> 3)) % 5 === 0;
  const pick = (source: Float64Array, held: boolean): Float64Array => source.filter((_, n) => isHeld(n) === held);
  const [fitTimes, fitValues] = [pick(timesS, false), pick(values, false)];
  const [heldTimes, heldValues] = [pick(timesS, true), pick(values, true)];
  const frequencies: number[] = [];
  const tones: IrregularTone[] = [];
  let fit = sinusoidFit(fitTimes, fitValues, frequencies);
  let residual = sinusoidResidual(fitTimes, fitValues, frequencies, fit);
  let heldPower = meanSquare(sinusoidResidual(heldTimes, heldValues, frequencies, fit));
  while (tones.length < mostTones) {
    const { power } = lombScargle(fitTimes, residual, stepHz, gridPoints);
    let top = 0;
    power.forEach((value, index) => (top = value > (power[top] as number) ? index : top));
    const share = power[top] as number;
    const independent = Math.max(1, gridPoints / gridPerWidth);
    const logFalseAlarm = Math.log(independent) + ((fitTimes.length - 3) / 2) * Math.log(Math.max(1e-300, 1 - share));
    if (!(logFalseAlarm < leastLogFalseAlarm)) break;
    const frequencyHz = polish(fitTimes, residual, (top + 1) * stepHz, stepHz);
    frequencies.push(frequencyHz);
    fit = sinusoidFit(fitTimes, fitValues, frequencies);
    const nextHeld = meanSquare(sinusoidResidual(heldTimes, heldValues, frequencies, fit));
    if (!(nextHeld < heldPower)) break;
    const last = frequencies.length - 1;
    const tonePower = ((fit.cosines[last] ?? 0) ** 2 + (fit.sines[last] ?? 0) ** 2) / 2;
    residual = sinusoidResidual(fitTimes, fitValues, frequencies, fit);
    const noise = Math.max(meanSquare(residual), 1e-300);
    const spanS = (fitTimes[fitTimes.length - 1] as number) - (fitTimes[0] as number);
    tones.push({
      frequencyHz,
      uncertaintyHz: Math.sqrt((6 * noise) / (2 * tonePower * fitTimes.length)) / (Math.PI * spanS),
      levelDb: decibels(tonePower),
      standsOutDb: decibels(share / Math.max(1e-12, quantile(power, 0.5))),
      logFalseAlarm: Math.max(-1e6, logFalseAlarm),
      heldOutGainDb: decibels(heldPower / Math.max(nextHeld, 1e-300)),
    });
    heldPower = nextHeld;
  }
  return tones;
}

function meanSquare(values: Float64Array): number {
  return values.reduce((sum, value) => sum + value * value, 0) / Math.max(1, values.length);
}

/** Off-grid maximum of the residual's power near a grid point, by shrinking parabolic steps. */
function polish(timesS: Float64Array, residual: Float64Array, startHz: number, stepHz: number): number {
  const power = (frequencyHz: number): number => {
    let [c, s] = [0, 0];
    for (let n = 0; n < timesS.length; n++) {
      const angle = 2 * Math.PI * frequencyHz * (timesS[n] as number);
      c += (residual[n] as number) * Math.cos(angle);
      s += (residual[n] as number) * Math.sin(angle);
    }
    return c * c + s * s;
  };
  let best = startHz;
  for (let width = stepHz / 2; width > stepHz / 200; width /= 2) {
    const [below, here, above] = [power(best - width), power(best), power(best + width)];
    const curvature = below - 2 * here + above;
    const shift = curvature < 0 ? (0.5 * width * (below - above)) / curvature : 0;
    best += Math.max(-width, Math.min(width, shift));
  }
  return best;
}
