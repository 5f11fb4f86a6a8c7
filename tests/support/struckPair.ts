import { seededNoise } from './seededNoise.js';

export interface StruckTone {
  frequencyHz: number;
  amplitude: number;
  decayS: number;
  phase?: number;
}

/** A structure struck at `strikeS`: decaying tones that set in over 20 ms, so that the blow itself carries nothing beyond them. */
export function struck(tones: StruckTone[], strikeS: number): (timeS: number) => number {
  return (timeS) => {
    const since = timeS - strikeS;
    if (since < 0) return 0;
    const onset = since < 0.02 ? 0.5 - 0.5 * Math.cos((Math.PI * since) / 0.02) : 1;
    return tones.reduce(
      (sum, { frequencyHz, amplitude, decayS, phase = 0 }) =>
        sum + onset * amplitude * Math.exp(-since / decayS) * Math.sin(2 * Math.PI * frequencyHz * since + phase),
      0,
    );
  };
}

/** Samples of an event from `startS` on, without any filter, with white noise added after sampling. */
export function sampled(
  event: (timeS: number) => number,
  rateHz: number,
  durationS: number,
  { startS = 0, gain = 1, noise = 0, seed = 1 } = {},
): Float64Array {
  const grain = seededNoise(Math.round(rateHz * durationS), seed);
  return grain.map((value, n) => gain * event(startS + n / rateHz) + noise * value);
}
