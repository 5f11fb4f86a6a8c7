import { createRealFft } from '../dsp/createRealFft.js';

const blocks = 8;
const leastBlock = 256;
/** Loggers' clocks differ by less than this. */
const largestDrift = 2e-3;
/** Standard errors from which on a drift is believed. */
const leastSigmas = 4;

export interface ClockDrift {
  /** Values by which the lag at time 0 differs from the lag given. */
  lagShift: number;
  /** Growth of the lag, values per value: seconds of the other clock for one of this, less 1. */
  drift: number;
}

/**
 * Two loggers' clocks run apart: the lag is measured anew in equal blocks from the slope of the cross-spectrum's phase, and a
 * straight line laid through it (weighted least squares).
 * @param a, b captures at one nominal rate, band-limited below `lastShare` of half of it
 * @param lag of b after a over the whole, in values
 * @returns zeros where no drift shows
 */
export function clockDrift(a: Float64Array, b: Float64Array, lag: number, lastShare: number): ClockDrift {
  const none = { lagShift: 0, drift: 0 };
  const from = Math.max(0, Math.ceil(-lag));
  const to = Math.min(a.length, Math.floor(b.length - lag));
  const length = 2 ** Math.floor(Math.log2((to - from) / blocks));
  if (!(length >= leastBlock)) return none;
  const fft = createRealFft(length);
  const last = Math.floor((lastShare * length) / 2);
  const points: { at: number; shift: number; weight: number }[] = [];
  const step = Math.floor((to - from - length) / (blocks - 1));
  for (let block = 0; block < blocks; block++) {
    const start = from + block * step;
    const whole = Math.round(start + lag) - start;
    const first = fft.transform(tapered(a, start, length)).slice(0, length + 2);
    const second = fft.transform(tapered(b, start + whole, length));
    const point = phaseSlope(first, second, length, last, lag - whole);
    if (point !== null) points.push({ at: start + length / 2, ...point });
  }
  if (points.length < 4) return none;
  const sum = (of: (point: (typeof points)[number]) => number): number =>
    points.reduce((total, point) => total + point.weight * of(point), 0);
  const weights = sum(() => 1);
  const middle = sum(({ at }) => at) / weights;
  const mean = sum(({ shift }) => shift) / weights;
  const spread = sum(({ at }) => (at - middle) ** 2);
  const drift = sum(({ at, shift }) => (at - middle) * (shift - mean)) / spread;
  const residual = sum(({ at, shift }) => (shift - mean - drift * (at - middle)) ** 2) / weights;
  const error = Math.sqrt((residual * weights) / (spread * (points.length - 2)));
  if (!(Math.abs(drift) < largestDrift && Math.abs(drift) > leastSigmas * error)) return none;
  return { lagShift: mean - drift * middle, drift };
}

function tapered(values: Float64Array, start: number, length: number): Float64Array {
  return Float64Array.from(
    { length },
    (_, n) => (0.5 - 0.5 * Math.cos((2 * Math.PI * n) / length)) * (values[start + n] ?? 0),
  );
}

/** Delay of the second after the first beyond `expected`, in values: three rounds, so that no phase wraps. */
function phaseSlope(
  first: Float64Array,
  second: Float64Array,
  length: number,
  last: number,
  expected: number,
): { shift: number; weight: number } | null {
  let shift = 0;
  let power = 0;
  // Low frequencies first: their phases don't wrap even where the blocks lie a value or two off.
  for (const share of [0.25, 0.5, 1, 1]) {
    let [numerator, denominator] = [0, 0];
    power = 0;
    for (let bin = 1; bin <= share * last; bin++) {
      const [ar, ai] = [first[2 * bin] as number, first[2 * bin + 1] as number];
      const [br, bi] = [second[2 * bin] as number, second[2 * bin + 1] as number];
      const omega = (2 * Math.PI * bin) / length;
      const turn = omega * (expected + shift);
      const [real, imaginary] = [br * ar + bi * ai, bi * ar - br * ai];
      const [c, s] = [Math.cos(turn), Math.sin(turn)];
      const phase = Math.atan2(imaginary * c + real * s, real * c - imaginary * s);
      const weight = Math.hypot(real, imaginary);
      if (Math.abs(phase) > 2) continue;
      numerator -= weight * omega * phase;
      denominator += weight * omega * omega;
      power += weight;
    }
    if (denominator === 0) return null;
    shift += numerator / denominator;
  }
  return { shift, weight: power };
}
