import { seededUniform } from './seededUniform.js';

export const unevenKinds = [
  'smallJitter',
  'largeJitter',
  'poisson',
  'bursts',
  'evenBursts',
  'drift',
  'missing',
] as const;
export type UnevenKind = (typeof unevenKinds)[number];

/** Time stamps of a mean rate, uneven in one way, from 0 s and written with seven decimals. */
export function unevenStamps(kind: UnevenKind, count: number, rateHz: number, seed = 1): Float64Array {
  const random = seededUniform(seed);
  const times = new Float64Array(count);
  let now = 0;
  for (let n = 0; n < count; n++) {
    times[n] = kind === 'smallJitter' ? n + 0.12 * random() : kind === 'largeJitter' ? n + 0.9 * random() : now;
    if (kind === 'poisson') now -= Math.log(1 - random());
    else if (kind === 'bursts') now += n % 32 === 31 ? 20 + 12 * random() : 0.15 + 0.15 * random();
    else if (kind === 'evenBursts') now += n % 32 === 31 ? 20 : 0.2;
    else if (kind === 'drift') now += 1 + 0.05 * Math.sin((2 * Math.PI * n) / count);
    else now += 1 + Math.floor(5 * random());
  }
  const first = times[0] as number;
  const scale = (count - 1) / rateHz / ((times[count - 1] as number) - first);
  return times.map((time) => Math.round((time - first) * scale * 1e7) / 1e7);
}
