import { quantile } from '../quantile.js';
import { lawFromWarped, type SpeedLaw } from './SpeedLaw.js';

export interface ChannelSpeed {
  law: SpeedLaw;
  /** Pulses over the stretch; null where the channel holds the speed itself. */
  pulses: number | null;
}

/** Two levels: so many samples lie near the one or the other. */
const nearLevelShare = 0.9;
const nearness = 0.2;
const leastPulses = 12;
/** Neighbouring intervals of a pulse train differ by less than this: a shaft can't change its speed faster. */
const largestJump = 0.25;
/** Rising through the upper and falling through the lower of these (share of the range) counts once. */
const upper = 0.6;
const lower = 0.4;
const saysSpeed = /speed|tach|rpm|key.?phas|pulse/i;
/** A channel of speed as a voltage stays above this share of its largest value. */
const leastSpeedShare = 0.1;
const spotsOfVoltage = 256;

/**
 * The speed law that a channel holds: a pulse train (told by its two levels and even intervals), or, where the channel's
 * name says so, the speed itself as a slowly changing positive value.
 * @returns null where the channel holds neither
 */
export function speedFromChannel(samples: Float64Array, name: string): ChannelSpeed | null {
  const pulses = pulseTimes(samples);
  if (pulses !== null) return { law: lawFromPulses(pulses, samples.length), pulses: pulses.length };
  return saysSpeed.test(name) ? lawFromVoltage(samples) : null;
}

/** Moments, in samples, at which pulses begin; null where the samples are no pulse train. */
function pulseTimes(samples: Float64Array): number[] | null {
  const low = quantile(samples, 0.02);
  const high = samples.reduce((top, value) => Math.max(top, value), -Infinity);
  const bottom = samples.reduce((least, value) => Math.min(least, value), Infinity);
  // Pulses may point up or down: the level where the samples rest is the one that has most of them.
  const isUp = quantile(samples, 0.5) - bottom < high - quantile(samples, 0.5);
  const [rest, peak] = isUp ? [low, high] : [high, bottom];
  const span = peak - rest;
  if (!(Math.abs(span) > 0)) return null;
  const times: number[] = [];
  let isHigh = true;
  let near = 0;
  let before = 1;
  samples.forEach((value, n) => {
    const share = (value - rest) / span;
    if (Math.abs(share) < nearness || Math.abs(share - 1) < nearness) near++;
    if (!isHigh && share >= upper) {
      times.push(n - (share - 0.5) / Math.max(share - before, 1e-9));
      isHigh = true;
    } else if (isHigh && share <= lower) isHigh = false;
    before = share;
  });
  if (near < nearLevelShare * samples.length || times.length < leastPulses) return null;
  const gaps = times.slice(1).map((time, i) => time - (times[i] as number));
  const isEven = gaps.slice(1).every((gap, i) => Math.abs(gap / (gaps[i] as number) - 1) < largestJump);
  return isEven ? times : null;
}

/** Warped time grows by one pulse from pulse to pulse; between them the speed is straight, beyond the ends it stays. */
function lawFromPulses(times: number[], length: number): SpeedLaw {
  const turns = new Float64Array(length);
  const last = times.length - 1;
  let pulse = 0;
  const at = (i: number): number => times[i] as number;
  for (let n = 0; n < length; n++) {
    while (pulse < last - 1 && n >= at(pulse + 1)) pulse++;
    const width = at(pulse + 1) - at(pulse);
    const x = (n - at(pulse)) / width;
    // Catmull-Rom through the counts: even in value and slope from interval to interval.
    const before = pulse > 0 ? (2 * width) / (at(pulse + 1) - at(pulse - 1)) : 1;
    const after = pulse + 2 <= last ? (2 * width) / (at(pulse + 2) - at(pulse)) : 1;
    turns[n] = pulse + (x < 0 ? before * x : x > 1 ? 1 + after * (x - 1) : hermite(x, before, after));
  }
  return lawFromWarped(turns);
}

/** Cubic from 0 to 1 with slopes a and b at its ends. */
const hermite = (x: number, a: number, b: number): number =>
  x * x * (3 - 2 * x) + a * x * (1 - x) ** 2 - b * x * x * (1 - x);

function lawFromVoltage(samples: Float64Array): ChannelSpeed | null {
  const size = Math.ceil(samples.length / spotsOfVoltage);
  const spots = Float64Array.from({ length: Math.floor(samples.length / size) }, (_, i) => {
    const part = samples.subarray(i * size, (i + 1) * size);
    return part.reduce((sum, value) => sum + value, 0) / part.length;
  });
  const most = spots.reduce((top, value) => Math.max(top, value), 0);
  const least = spots.reduce((low, value) => Math.min(low, value), Infinity);
  if (!(most > 0) || least < leastSpeedShare * most) return null;
  let sum = 0;
  const warped = samples.map((_, n) => {
    const exact = Math.min(spots.length - 1, Math.max(0, (n + 0.5) / size - 0.5));
    const low = Math.floor(exact);
    const from = spots[low] as number;
    const reached = sum;
    sum += from + (exact - low) * ((spots[Math.min(spots.length - 1, low + 1)] as number) - from);
    return reached;
  });
  return { law: lawFromWarped(warped), pulses: null };
}
