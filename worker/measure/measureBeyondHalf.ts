import type { BeyondHalfMeasurement } from '../../shared/screening/MeasurementRecord.js';
import { bandCovariance, type FrequencyBand } from '../dsp/BandCovariance.js';
import { type BandPowers, bandPowers, logLikelihood } from '../dsp/bandPowers.js';
import { decibels } from '../dsp/decibels.js';
import { quantile } from '../dsp/quantile.js';
import type { IrregularSearch } from './irregularReach.js';

const samplesPerStretch = 96;
const mostStretches = 14;
const leastStretches = 4;
const bandsBelow = 16;
const bandsBeyond = 32;
const iterations = 12;
const lowestDb = -200;
/** The question is what lies above −40 dB of the whole: differences 10 dB further down don't count. */
const blurShare = 1e-5;
/** No single stretch decides. */
const mostPerStretch = 20;

/**
 * How much of what the tones leave lies beyond half the mean rate, by maximum likelihood over bands (see bandPowers), in
 * stretches spread over the capture. Every other stretch takes part in the fit; on the others the model with bands beyond
 * half the mean rate is set against one without.
 * @param totalPower of the capture about its mean, tones included: what shares refer to
 * @returns null with too few samples, without power, or where the stamps reach no further than half the mean rate
 */
export function measureBeyondHalf(
  timesS: Float64Array,
  residual: Float64Array,
  { meanRateHz, reachHz }: IrregularSearch,
  totalPower: number,
): BeyondHalfMeasurement | null {
  const halfHz = meanRateHz / 2;
  const stretchCount = Math.min(mostStretches, Math.floor(timesS.length / samplesPerStretch));
  if (stretchCount < leastStretches || !(reachHz > 1.1 * halfHz) || !(totalPower > 0)) return null;
  const bands = [...evenBands(0, halfHz, bandsBelow), ...evenBands(halfHz, reachHz, bandsBeyond)];
  const stretches = Array.from({ length: stretchCount }, (_, index) => {
    const from = Math.floor((index * (timesS.length - samplesPerStretch)) / (stretchCount - 1));
    const to = from + samplesPerStretch;
    return bandCovariance(timesS.subarray(from, to), residual.slice(from, to), bands);
  });
  const fitted = stretches.filter((_, index) => index % 2 === 0);
  const held = stretches.filter((_, index) => index % 2 === 1);
  const all = bands.map((_, index) => index);
  const below = all.slice(0, bandsBelow);
  const full = bandPowers(fitted, all, iterations);
  const without = bandPowers(fitted, below, iterations);
  return {
    toHz: reachHz,
    heldOutLogRatio: held.reduce((sum, stretch) => {
      const blurPower = blurShare * totalPower;
      const [withBeyond, withNone] = [
        logLikelihood(stretch, full, all, blurPower),
        logLikelihood(stretch, without, below, blurPower),
      ];
      return sum + Math.max(-mostPerStretch, Math.min(mostPerStretch, withBeyond - withNone));
    }, 0),
    ...sharesOf(full, bands, fitted.length, totalPower, timesS),
  };
}

function evenBands(fromHz: number, toHz: number, count: number): FrequencyBand[] {
  const edge = (index: number): number => fromHz + ((toHz - fromHz) * index) / count;
  return Array.from({ length: count }, (_, index) => ({ fromHz: edge(index), toHz: edge(index + 1) }));
}

/** A part of the density that is the same everywhere may be noise of the converter: it is told apart, not counted. */
function sharesOf(
  { powers, white, freedom }: BandPowers,
  bands: FrequencyBand[],
  fittedStretches: number,
  totalPower: number,
  timesS: Float64Array,
): Pick<BeyondHalfMeasurement, 'beyondDb' | 'errorDb' | 'flatDb'> {
  const widths = bands.map(({ fromHz, toHz }) => toHz - fromHz);
  const flatDensity = quantile(
    widths.map((width, b) => (powers[b] as number) / width),
    0.25,
  );
  const spanS = ((timesS[timesS.length - 1] as number) - (timesS[0] as number)) / timesS.length;
  let [beyond, variance, flat] = [0, 0, white];
  for (let b = bandsBelow; b < bands.length; b++) {
    const [power, width] = [powers[b] as number, widths[b] as number];
    beyond += Math.max(0, power - flatDensity * width);
    flat += Math.min(power, flatDensity * width);
    // A band holds 2·width·time values; fewer count where noise hides them.
    const capacity = Math.min(1, 2 * width * spanS) * samplesPerStretch * fittedStretches;
    variance += (power * power * 2 * capacity) / Math.max(1, freedom[b] as number) ** 2;
  }
  return {
    beyondDb: Math.max(lowestDb, decibels(beyond / totalPower)),
    errorDb: Math.max(lowestDb, decibels(Math.sqrt(variance) / totalPower)),
    flatDb: Math.max(lowestDb, decibels(flat / totalPower)),
  };
}
