import { CaptureError } from '../../shared/formats/CaptureError.js';
import type { TimeStampReport } from './SampleSource.js';

export interface TimeStampAnalysis {
  report: TimeStampReport;
  /** Rate of the uniform grid, or the mean rate where there is none. */
  rateHz: number;
  /** Row -> place on the uniform grid; null where the stamps are irregular or no row is missing. */
  gridIndex: Float64Array | null;
}

/** Beyond this residual about a uniform grid (share of the interval, rounding taken off) stamps are irregular. */
const irregularShare = 0.02;
const listedGaps = 64;
/** A grid with more holes than rows is no grid. */
const largestMissingShare = 0.5;

function median(values: Float64Array): number {
  const sorted = Float64Array.from(values).sort();
  return sorted[Math.floor(sorted.length / 2)] ?? 0;
}

/** The largest power of ten of which all stamps (up to 2000 looked at) are multiples. */
function findRoundingStep(timesS: Float64Array): number {
  const stride = Math.max(1, Math.floor(timesS.length / 2000));
  const origin = timesS[0] ?? 0;
  const precision = Math.abs(origin) * 4 * Number.EPSILON;
  for (let exponent = 0; exponent >= -9; exponent -= 1) {
    const step = 10 ** exponent;
    let isMultiple = true;
    for (let row = 0; row < timesS.length && isMultiple; row += stride) {
      const multiple = ((timesS[row] ?? 0) - origin) / step;
      isMultiple = Math.abs(multiple - Math.round(multiple)) * step < Math.max(precision, step * 1e-4);
    }
    if (isMultiple) return step;
  }
  return 0;
}

/** @throws CaptureError TIME_ORDER, TIME_DUPLICATE, TIME_RESOLUTION */
function checkOrder(timesS: Float64Array, lineOf: (row: number) => number): number {
  let repeated = 0;
  for (let row = 1; row < timesS.length; row += 1) {
    const step = (timesS[row] ?? 0) - (timesS[row - 1] ?? 0);
    if (step < 0) {
      throw new CaptureError(
        'TIME_ORDER',
        `Line ${lineOf(row)}: time runs backwards. Sort the rows or export them again.`,
        {
          line: lineOf(row),
        },
      );
    }
    if (step === 0) repeated += 1;
  }
  if (repeated === timesS.length - 1) {
    throw new CaptureError(
      'TIME_DUPLICATE',
      'All time stamps are equal: the time column holds no time. Export more digits.',
    );
  }
  if (repeated > 0.5 * timesS.length) {
    throw new CaptureError(
      'TIME_RESOLUTION',
      'Most time stamps repeat the one before: they are written more coarsely than the sampling interval. Export more digits, or state the sampling rate and choose no time column.',
    );
  }
  return repeated;
}

/**
 * @throws CaptureError NON_UNIFORM where each half is evenly sampled, at another rate than the other: one spectrum over
 * both would be wrong for each
 */
function checkRateChange(steps: Float64Array, roundingStepS: number): void {
  const middle = Math.floor(steps.length / 2);
  const [before, after] = [steps.subarray(0, middle), steps.subarray(middle)].map((half) => {
    const medianS = median(half);
    const even = half.filter(
      (step) => Math.abs(step - medianS) <= Math.max(0.001 * medianS, 1.01 * roundingStepS),
    ).length;
    return { medianS, isEven: even > 0.95 * half.length };
  });
  if (!before?.isEven || !after?.isEven || before.medianS <= 0) return;
  const change = after.medianS / before.medianS - 1;
  if (Math.abs(change) < 0.005 || Math.abs(after.medianS - before.medianS) < 1.5 * roundingStepS) return;
  throw new CaptureError(
    'NON_UNIFORM',
    `The sampling rate changes within the file, from ${Number((1 / before.medianS).toPrecision(6))} Hz to ${Number((1 / after.medianS).toPrecision(6))} Hz. Split it where the rate changes.`,
  );
}

/** Least-squares line through (place on grid, time): interval and origin. */
function fitGrid(timesS: Float64Array, gridIndex: Float64Array): { intervalS: number; originS: number } {
  let meanIndex = 0;
  let meanTimeS = 0;
  for (let row = 0; row < timesS.length; row += 1) {
    meanIndex += (gridIndex[row] ?? 0) / timesS.length;
    meanTimeS += (timesS[row] ?? 0) / timesS.length;
  }
  let covariance = 0;
  let variance = 0;
  for (let row = 0; row < timesS.length; row += 1) {
    const offset = (gridIndex[row] ?? 0) - meanIndex;
    covariance += offset * ((timesS[row] ?? 0) - meanTimeS);
    variance += offset * offset;
  }
  const intervalS = covariance / variance;
  return { intervalS, originS: meanTimeS - intervalS * meanIndex };
}

/** Places rows on a grid by counting whole intervals between neighbours. */
function countIntervals(timesS: Float64Array, intervalS: number): Float64Array {
  const gridIndex = new Float64Array(timesS.length);
  for (let row = 1; row < timesS.length; row += 1) {
    const steps = Math.max(1, Math.round(((timesS[row] ?? 0) - (timesS[row - 1] ?? 0)) / intervalS));
    gridIndex[row] = (gridIndex[row - 1] ?? 0) + steps;
  }
  return gridIndex;
}

function residualShare(
  timesS: Float64Array,
  gridIndex: Float64Array,
  roundingStepS: number,
): { rms: number; intervalS: number } {
  const { intervalS, originS } = fitGrid(timesS, gridIndex);
  let sum = 0;
  for (let row = 0; row < timesS.length; row += 1) {
    const residual = (timesS[row] ?? 0) - originS - intervalS * (gridIndex[row] ?? 0);
    sum += residual * residual;
  }
  // Rounding to a step q scatters the stamps by q²/12 however even the sampling was.
  const variance = Math.max(0, sum / timesS.length - roundingStepS ** 2 / 12);
  return { rms: Math.sqrt(variance) / intervalS, intervalS };
}

function findGaps(timesS: Float64Array, gridIndex: Float64Array): { fromS: number; toS: number }[] {
  const originS = timesS[0] ?? 0;
  const gaps: { fromS: number; toS: number }[] = [];
  for (let row = 1; row < timesS.length && gaps.length < listedGaps; row += 1) {
    if ((gridIndex[row] ?? 0) - (gridIndex[row - 1] ?? 0) > 1) {
      gaps.push({ fromS: (timesS[row - 1] ?? 0) - originS, toS: (timesS[row] ?? 0) - originS });
    }
  }
  return gaps;
}

/**
 * Whether time stamps lie on a uniform grid (within the rounding they are written with), with holes or without, or are
 * irregular. `timesS`: all stamps in seconds, at least two.
 * @throws CaptureError where they run backwards, are all equal, or are too coarse to tell the rows apart
 */
export function analyseTimeStamps(timesS: Float64Array, lineOf: (row: number) => number): TimeStampAnalysis {
  const repeatedCount = checkOrder(timesS, lineOf);
  const roundingStepS = findRoundingStep(timesS);
  const spanS = (timesS.at(-1) ?? 0) - (timesS[0] ?? 0);
  const steps = timesS.subarray(1).map((time, row) => time - (timesS[row] ?? 0));
  checkRateChange(steps, roundingStepS);
  const medianS = median(steps);
  const evenS = spanS / (timesS.length - 1);
  // Without holes the mean interval is the better one: rounding makes the median coarse.
  const hasHoles =
    medianS > 0 && evenS > 1.0005 * medianS && steps.some((step) => step > 1.6 * Math.max(medianS, roundingStepS));
  const gridIndex = hasHoles ? countIntervals(timesS, medianS) : timesS.map((_, row) => row);
  const { rms, intervalS } = residualShare(timesS, gridIndex, roundingStepS);
  const gridRows = (gridIndex.at(-1) ?? 0) + 1;
  const missingShare = 1 - timesS.length / gridRows;
  const irregular = rms > irregularShare || missingShare > largestMissingShare;
  const originS = timesS[0] ?? 0;
  return {
    rateHz: irregular ? (timesS.length - 1) / spanS : 1 / intervalS,
    gridIndex: irregular || missingShare === 0 ? null : gridIndex,
    report: {
      irregular,
      jitterShare: rms,
      missingShare: irregular ? 0 : missingShare,
      gaps: irregular ? [] : findGaps(timesS, gridIndex),
      repeatedCount,
      roundingStepS,
      ...(irregular ? { timesS: timesS.map((time) => time - originS) } : {}),
    },
  };
}
