import type { EdgeMeasurement, RaisedMeasurement } from '../../shared/screening/MeasurementRecord.js';
import { decibels } from '../dsp/decibels.js';
import { edgeFollowsSource } from '../dsp/edgeFollowsSource.js';
import { findCliff, oldBandEnd } from '../dsp/findCliff.js';
import { mirrorAboutPivot } from '../dsp/mirrorAboutPivot.js';
import type { RaisedRate } from '../dsp/RaisedRateMeter.js';
import { smoothDensity } from '../dsp/smoothDensity.js';
import { effectiveAverages } from './measureProfile.js';
import { edgeBins, frameBands, type SpectrumMeter } from './SpectrumMeter.js';

/** Everything about the band edge: level with its error, how it changes over time, how the spectrum falls towards it. */
export function measureEdge(
  meter: SpectrumMeter,
  mean: Float64Array,
  toneless: Float64Array,
  raised: RaisedRate | null,
): EdgeMeasurement {
  const { resolutionHz, segmentLength, segments } = meter.survey;
  const { from, to } = edgeBins(segmentLength);
  const density = meanOver(toneless, from, to);
  const frames = meter.edgeFrames.rows.map((row) => row[0] as number);
  const frameMean = frames.reduce((sum, value) => sum + value, 0) / Math.max(1, frames.length);
  const spread = frames.reduce((sum, value) => sum + (value - frameMean) ** 2, 0) / Math.max(1, frames.length - 1);
  const statistical = 1 / Math.sqrt(Math.max(1, effectiveAverages(segments) * (to - from + 1)));
  const observed = frameMean > 0 ? Math.sqrt(spread / Math.max(1, effectiveAverages(frames.length))) / frameMean : 0;
  const smooth = smoothDensity(toneless, segmentLength / 80);
  const fall = steepestFall(smooth, Math.max(2, Math.round(segmentLength / 20)));
  const top = smooth.reduce((highest, value) => Math.max(highest, value), 0);
  let occupied = smooth.length - 1;
  while (occupied > 1 && (smooth[occupied] as number) < 1e-6 * top) occupied--;
  const rows = meter.frames.rows;
  const inband = rows.map((row) => meanOver(row, 1, Math.floor(0.75 * frameBands)));
  const edge = rows.map((row) => row[frameBands - 1] as number);
  return {
    fromHz: from * resolutionHz,
    toHz: to * resolutionHz,
    densityDb: decibels(density),
    densityWithTonesDb: decibels(meanOver(mean, from, to)),
    relativeError: Math.min(10, Math.max(statistical, observed)),
    burstDb: frameMean > 0 ? decibels(frames.reduce((a, b) => Math.max(a, b), 0) / frameMean) : 0,
    kurtosis: fourthOverSecond(edge),
    follows: edgeFollowsSource(edge, inband),
    steepestFallDb: fall.fallDb,
    steepestFallHz: fall.bin * resolutionHz,
    fallToEdgeDb: decibels(top) - decibels(density),
    occupiedToHz: occupied * resolutionHz,
    mirror: mirrorAboutPivot(mean, resolutionHz),
    raised: raised === null ? null : describeRaised(raised, toneless, resolutionHz),
    cliff: findCliff(toneless, resolutionHz),
  };
}

/** An end of the content further down is the source's, not that of the old recording's filter. */
const leastContentShare = 0.75;

/** The old folding frequency, the end of the content below it, and the density next to it: the edge of the old recording. */
function describeRaised(raised: RaisedRate, toneless: Float64Array, resolutionHz: number): RaisedMeasurement {
  const pivotBin = Math.floor((toneless.length - 1) / raised.factor);
  const oldBand = toneless.subarray(0, pivotBin + 1);
  const contentTo = findCliff(oldBand, resolutionHz, oldBandEnd)?.edgeHz ?? null;
  return {
    ...raised,
    pivotHz: pivotBin * resolutionHz,
    contentToHz: contentTo !== null && contentTo > leastContentShare * pivotBin * resolutionHz ? contentTo : null,
    edgeDensityDb: decibels(meanOver(oldBand, Math.max(1, Math.floor(0.97 * pivotBin)), Math.max(1, pivotBin - 2))),
  };
}

function meanOver(values: ArrayLike<number>, from: number, to: number): number {
  let sum = 0;
  for (let place = from; place <= to; place++) sum += values[place] as number;
  return sum / Math.max(1, to - from + 1);
}

/** ⟨e²⟩/⟨e⟩² of the frame powers: how bursty the edge is; a stationary edge gives little over 1. */
function fourthOverSecond(powers: number[]): number {
  const mean = powers.reduce((sum, value) => sum + value, 0) / Math.max(1, powers.length);
  const square = powers.reduce((sum, value) => sum + value * value, 0) / Math.max(1, powers.length);
  return mean > 0 ? Math.min(1e6, square / (mean * mean)) : 1;
}

function steepestFall(smooth: Float64Array, spanBins: number): { fallDb: number; bin: number } {
  let best = { fallDb: 0, bin: 0 };
  for (let bin = 2; bin + spanBins < smooth.length; bin++) {
    const fallDb = decibels(smooth[bin] as number) - decibels(smooth[bin + spanBins] as number);
    if (fallDb > best.fallDb) best = { fallDb, bin };
  }
  return best;
}
