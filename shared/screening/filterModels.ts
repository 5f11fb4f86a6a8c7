import type { AntiAliasFilter } from '../schemas/acquisitionSheet.js';
import { ellipticRational } from './ellipticRational.js';

const defaultRippleDb = 0.5;
const defaultStopbandDb = 60;

/**
 * |H(f)|² of an anti-alias filter as described in the sheet, 1 at its highest: Butterworth 1/(1+(f/fc)^(2N)), Chebyshev I
 * 1/(1+ε²·T_N(f/fc)²), elliptic 1/(1+ε²·R_N(f/fc)²); the corner is where Butterworth is −3 dB and where the ripple ends in
 * the other two. `null` where type, order or corner is missing: then nothing may be taken off.
 */
export function magnitudeSquared(filter: AntiAliasFilter, frequencyHz: number): number | null {
  if (filter.type === 'none') return 1;
  const { order, cornerHz } = filter;
  if (order === undefined || cornerHz === undefined) return null;
  const x = Math.abs(frequencyHz) / cornerHz;
  const epsilonSquared = 10 ** ((filter.rippleDb ?? defaultRippleDb) / 10) - 1;
  switch (filter.type) {
    case 'butterworth':
      return 1 / (1 + x ** (2 * order));
    case 'chebyshev1':
      return 1 / (1 + epsilonSquared * chebyshev(order, x) ** 2);
    case 'elliptic': {
      const stopband = filter.stopbandDb ?? defaultStopbandDb;
      const value = ellipticRational(order, Math.sqrt(epsilonSquared / (10 ** (stopband / 10) - 1)), x);
      return 1 / (1 + epsilonSquared * value * value);
    }
    default:
      return null;
  }
}

function chebyshev(order: number, x: number): number {
  return x <= 1 ? Math.cos(order * Math.acos(x)) : Math.cosh(order * Math.acosh(x));
}

/**
 * The largest |H|² at or beyond a frequency: what may be counted on in the stop band. For elliptic filters the ripples'
 * tops count, not the zeros between them.
 */
export function stopbandEnvelope(filter: AntiAliasFilter, frequencyHz: number): number | null {
  const here = magnitudeSquared(filter, frequencyHz);
  if (here === null || filter.type !== 'elliptic') return here;
  return Math.max(here, 10 ** (-(filter.stopbandDb ?? defaultStopbandDb) / 10));
}

/** Images summed: beyond these the filters here are deep in their stop band. */
const imagesCounted = 64;

/**
 * Alias protection at f for a source of flat density, dB: the filtered source at f over the power sum of the filtered source at
 * all images k·fs − f and k·fs + f. null without a usable filter model.
 */
export function aliasProtectionDb(filter: AntiAliasFilter, frequencyHz: number, sampleRateHz: number): number | null {
  const wanted = magnitudeSquared(filter, frequencyHz);
  if (wanted === null) return null;
  let folded = 0;
  for (let k = 1; k <= imagesCounted; k++) {
    folded += magnitudeSquared(filter, k * sampleRateHz - frequencyHz) ?? 0;
    folded += magnitudeSquared(filter, k * sampleRateHz + frequencyHz) ?? 0;
  }
  return 10 * Math.log10(wanted / Math.max(folded, 1e-40));
}

/** The lowest frequency from which on the filter attenuates by at least `protectionDb`; null when it never does. */
export function stopbandStartHz(filter: AntiAliasFilter, protectionDb: number): number | null {
  const isReached = (frequencyHz: number): boolean =>
    (stopbandEnvelope(filter, frequencyHz) ?? 1) <= 10 ** (-protectionDb / 10);
  if (filter.cornerHz === undefined) return null;
  let low = filter.cornerHz / 1e3;
  let high = filter.cornerHz * 1e6;
  if (!isReached(high)) return null;
  for (let turn = 0; turn < 200 && high / low > 1 + 1e-9; turn++) {
    const middle = Math.sqrt(low * high);
    if (isReached(middle)) high = middle;
    else low = middle;
  }
  return high;
}
