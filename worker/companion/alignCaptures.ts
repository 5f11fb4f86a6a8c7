import type { CompanionAlignment } from '../../shared/screening/MeasurementRecord.js';
import { createRealFft } from '../dsp/createRealFft.js';
import { inverseRealFft } from '../dsp/inverseRealFft.js';
import { resampleUniform } from '../dsp/resampleUniform.js';
import { clockDrift } from './clockDrift.js';

/** Values of either capture that enter the correlation. */
const mostValues = 2 ** 17;
/** Of half the lower rate: what both captures carry alike; above it filters differ. */
const commonBand = 0.85;
/** The strongest negative peak wins only if it is clearly higher: inputs of opposite polarity are rare. */
const polarityMargin = 1.1;

/**
 * Lag between two captures of one event from the cross-correlation of the band common to both, with the cross-spectrum
 * flattened half-way (generalised cross-correlation, Knapp & Carter 1976): tones don't hide the lag, noise doesn't bury it.
 * `significance` is the peak over the standard deviation that unrelated phases would give.
 * @returns null where either capture is too short
 */
export function alignCaptures(
  own: Float64Array,
  ownRateHz: number,
  other: Float64Array,
  otherRateHz: number,
): CompanionAlignment | null {
  const longestS = Math.max(own.length / ownRateHz, other.length / otherRateHz);
  const rateHz = Math.min(ownRateHz, otherRateHz, mostValues / longestS);
  const cornerHz = 0.5 * commonBand * rateHz;
  const a = resampleUniform(own, ownRateHz, 0, rateHz, Math.floor((own.length / ownRateHz) * rateHz), cornerHz);
  const b = resampleUniform(other, otherRateHz, 0, rateHz, Math.floor((other.length / otherRateHz) * rateHz), cornerHz);
  if (Math.min(a.length, b.length) < 64) return null;
  const size = 2 ** Math.ceil(Math.log2(a.length + b.length));
  const fft = createRealFft(size);
  const first = spectrumOf(fft.transform(padded(a, size)), size);
  const second = fft.transform(padded(b, size));
  const last = Math.floor((cornerHz / rateHz) * size);
  const cross = new Float64Array(size + 2);
  let [weights, squares] = [0, 0];
  for (let bin = 1; bin <= last; bin++) {
    const [ar, ai] = [first[2 * bin] as number, first[2 * bin + 1] as number];
    const [br, bi] = [second[2 * bin] as number, second[2 * bin + 1] as number];
    const real = br * ar + bi * ai;
    const imaginary = bi * ar - br * ai;
    const size2 = Math.hypot(real, imaginary);
    if (size2 === 0) continue;
    const weight = Math.sqrt(size2);
    cross[2 * bin] = real / weight;
    cross[2 * bin + 1] = imaginary / weight;
    weights += weight;
    squares += weight * weight;
  }
  if (weights === 0) return null;
  const correlation = inverseRealFft(cross, size);
  const at = (lag: number): number => correlation[(lag + size) % size] as number;
  let [best, worst] = [0, 0];
  for (let lag = 1 - a.length; lag < b.length; lag++) {
    if (at(lag) > at(best)) best = lag;
    if (at(lag) < at(worst)) worst = lag;
  }
  const isInverted = -at(worst) > polarityMargin * at(best);
  const peak = isInverted ? worst : best;
  const [below, middle, above] = [at(peak - 1), at(peak), at(peak + 1)];
  const bend = below - 2 * middle + above;
  const coarse = peak + (bend === 0 ? 0 : Math.max(-0.5, Math.min(0.5, (0.5 * (below - above)) / bend)));
  const refined = refineLag(cross, size, last, coarse, isInverted);
  const inverted = isInverted ? b.map((value) => -value) : b;
  const { lagShift, drift } = clockDrift(a, inverted, refined.lag, commonBand);
  const lag = refined.lag + lagShift;
  // Padding makes neighbouring bins alike: fewer of them speak for themselves.
  const perIndependent = size / Math.max(a.length, b.length);
  const significance = (Math.abs(middle) * size) / 2 / Math.sqrt((squares / 2) * perIndependent);
  // Each lag may show a peak of either sign.
  const trials = 2 * (a.length + b.length);
  return {
    lagS: lag / rateHz,
    lagErrorS: refined.errorValues / rateHz,
    clockRatio: 1 + drift,
    significance,
    chanceProbability: Math.min(1, trials * Math.exp(-(significance ** 2) / 2)),
    agreement: (Math.abs(middle) * size) / 2 / weights,
    isInverted,
    overlapS: Math.max(
      0,
      Math.min(own.length / ownRateHz, other.length / otherRateHz - lag / rateHz) - Math.max(0, -lag / rateHz),
    ),
  };
}

/** Slope of the cross-spectrum's phase about the coarse lag, weighted by its size; twice, so that no phase wraps. */
function refineLag(
  cross: Float64Array,
  size: number,
  last: number,
  coarse: number,
  isInverted: boolean,
): { lag: number; errorValues: number } {
  let lag = coarse;
  let errorValues = 0;
  for (let round = 0; round < 3; round++) {
    let [numerator, denominator, residual, weights] = [0, 0, 0, 0];
    for (let bin = 1; bin <= last; bin++) {
      const real = cross[2 * bin] as number;
      const imaginary = cross[2 * bin + 1] as number;
      const omega = (2 * Math.PI * bin) / size;
      const turn = omega * lag + (isInverted ? Math.PI : 0);
      const [c, s] = [Math.cos(turn), Math.sin(turn)];
      // The other capture lags by `lag`: its phase falls by omega·lag.
      const phase = Math.atan2(imaginary * c + real * s, real * c - imaginary * s);
      const weight = real * real + imaginary * imaginary;
      if (Math.abs(phase) > 1.5) continue;
      numerator -= weight * omega * phase;
      denominator += weight * omega * omega;
      residual += weight * phase * phase;
      weights += weight;
    }
    if (denominator === 0) break;
    lag += Math.max(-0.5, Math.min(0.5, numerator / denominator));
    errorValues = Math.sqrt(residual / denominator / Math.max(1, Math.sqrt(last)));
    if (weights === 0) break;
  }
  return { lag, errorValues };
}

function padded(values: Float64Array, size: number): Float64Array {
  const result = new Float64Array(size);
  result.set(values);
  return result;
}

const spectrumOf = (buffer: Float64Array, size: number): Float64Array => buffer.slice(0, size + 2);
