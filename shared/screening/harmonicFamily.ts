import type { ToneMeasurement } from './MeasurementRecord.js';

export interface HarmonicFamily {
  name: string;
  fundamentalHz: number;
  fundamentalErrorHz: number;
  /** Median of the members' wander over their frequency: how far the speed itself wanders. */
  relativeWander: number;
  /** Index of the tone and its multiple. */
  members: { tone: number; multiple: number }[];
  /** Chance that tones placed at random give as good a family, all fundamentals tried counted; 0 for a stated source. */
  chanceProbability: number;
  isStated: boolean;
}

/** Frequencies match within this many standard deviations. */
export const matchSigmas = 3;
const mostMultiples = 400;
const leastBlindMembers = 4;
const largestBlindChance = 1e-4;

export const toneErrorHz = (tone: ToneMeasurement, binHz: number): number =>
  Math.hypot(Math.max(tone.boundHz, tone.wanderHz), 0.1 * binHz);

/**
 * Follows a fundamental through the tones: the nearest tone to each multiple within its tolerance; fundamental and its error are
 * refitted as members are found, so that the tolerance at high multiples shrinks.
 * @param startErrorHz standard deviation of the starting value
 * @param binHz 1/T of the capture
 */
export function followFamily(
  tones: ToneMeasurement[],
  name: string,
  startHz: number,
  startErrorHz: number,
  binHz: number,
  isStated: boolean,
): HarmonicFamily {
  let fundamentalHz = startHz;
  let errorHz = startErrorHz;
  let weight = 1 / Math.max(startErrorHz, 1e-12) ** 2;
  let weighted = weight * startHz;
  const members: HarmonicFamily['members'] = [];
  let expected = 0;
  const order = tones.map((tone, index) => ({ tone, index })).sort((a, b) => a.tone.frequencyHz - b.tone.frequencyHz);
  for (const { tone, index } of order) {
    const multiple = Math.round(tone.frequencyHz / fundamentalHz);
    if (multiple < 1 || multiple > mostMultiples) continue;
    const error = toneErrorHz(tone, binHz);
    const tolerance = matchSigmas * Math.hypot(error, multiple * errorHz);
    expected += Math.min(1, (2 * tolerance) / fundamentalHz);
    if (2 * tolerance > 0.5 * fundamentalHz) continue;
    if (Math.abs(tone.frequencyHz - multiple * fundamentalHz) > tolerance) continue;
    members.push({ tone: index, multiple });
    const w = (multiple / error) ** 2;
    weight += w;
    weighted += (w * tone.frequencyHz) / multiple;
    fundamentalHz = weighted / weight;
    errorHz = Math.sqrt(1 / weight);
  }
  const distinct = new Set(members.map(({ multiple }) => multiple)).size;
  return {
    name,
    fundamentalHz,
    fundamentalErrorHz: errorHz,
    relativeWander: median(members.map(({ tone }) => relativeWanderOf(tones[tone]))),
    members,
    chanceProbability: isStated ? 0 : poissonTail(distinct, expected),
    isStated,
  };
}

const relativeWanderOf = (tone: ToneMeasurement | undefined): number =>
  tone === undefined || tone.frequencyHz === 0 ? 0 : tone.wanderHz / tone.frequencyHz;

function median(values: number[]): number {
  return [...values].sort((a, b) => a - b)[values.length >> 1] ?? 0;
}

/** The best family among tones that nothing explains yet, all fundamentals tried counted; null where none stands. */
export function bestBlindFamily(tones: ToneMeasurement[], free: number[], binHz: number): HarmonicFamily | null {
  const strongest = [...free].sort((a, b) => (tones[b]?.levelDb ?? 0) - (tones[a]?.levelDb ?? 0)).slice(0, 10);
  const chosen = free.map((index) => tones[index] as ToneMeasurement);
  let best: HarmonicFamily | null = null;
  let tried = 0;
  for (const index of strongest) {
    const tone = tones[index] as ToneMeasurement;
    for (let divisor = 1; divisor <= 12; divisor++) {
      const startHz = tone.frequencyHz / divisor;
      if (startHz < 6 * binHz) break;
      tried++;
      const family = followFamily(chosen, '', startHz, toneErrorHz(tone, binHz) / divisor, binHz, false);
      if (family.members.length < leastBlindMembers) continue;
      if (best === null || family.chanceProbability < best.chanceProbability) best = family;
    }
  }
  if (best === null) return null;
  const chanceProbability = Math.min(1, best.chanceProbability * tried);
  if (chanceProbability > largestBlindChance) return null;
  const members = best.members.map(({ tone, multiple }) => ({ tone: free[tone] as number, multiple }));
  return { ...best, name: 'family', members, chanceProbability };
}

/** P(X ≥ count) for a Poisson variable. */
export function poissonTail(count: number, mean: number): number {
  if (count <= 0) return 1;
  let term = Math.exp(-mean);
  let below = term;
  for (let k = 1; k < count; k++) {
    term *= mean / k;
    below += term;
  }
  const tail = 1 - below;
  if (tail > 1e-12) return tail;
  // Far out the sum above cancels; the first terms of the tail itself don't.
  let upper = term * (mean / count);
  let sum = upper;
  for (let k = count + 1; k < count + 50; k++) {
    upper *= mean / k;
    sum += upper;
  }
  return Math.max(sum, 1e-300);
}
