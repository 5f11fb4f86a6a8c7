import type { ToneMeasurement } from './MeasurementRecord.js';

export interface HarmonicFamily {
  name: string;
  fundamentalHz: number;
  fundamentalErrorHz: number;
  /** How far the speed itself wanders, over the speed: what all members' wander has in common. */
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

/** How far a tone may lie off a multiple of another one's: a mean frequency from its phase track wanders with the other's. */
export const ownWanderHz = ({ phaseTrack, wanderHz }: ToneMeasurement): number =>
  phaseTrack === undefined ? wanderHz : 0;

/** What a speed that wanders adds, unless the tone's track makes it a mean over the same stretch as the others'. */
export const sharedWanderHz = ({ phaseTrack }: ToneMeasurement, expectedHz: number): number =>
  phaseTrack === undefined ? expectedHz : 0;

export const toneErrorHz = (tone: ToneMeasurement, binHz: number): number =>
  Math.hypot(Math.max(tone.boundHz, ownWanderHz(tone)), 0.1 * binHz);

/** One pass through the tones in rising order; see followFamily. */
function followOnce(
  tones: ToneMeasurement[],
  name: string,
  startHz: number,
  startErrorHz: number,
  binHz: number,
  isStated: boolean,
  relativeWander: number,
): HarmonicFamily {
  let fundamentalHz = startHz;
  let errorHz = startErrorHz;
  let weight = 1 / Math.max(startErrorHz, 1e-12) ** 2;
  let weighted = weight * startHz;
  const members: HarmonicFamily['members'] = [];
  let expected = 0;
  const order = tones.map((tone, index) => ({ tone, index })).sort((a, b) => a.tone.frequencyHz - b.tone.frequencyHz);
  let next = 0;
  while (next < order.length) {
    const multiple = Math.round((order[next] as { tone: ToneMeasurement }).tone.frequencyHz / fundamentalHz);
    // All tones around one multiple compete: the nearest in its own tolerance is the member, the others are not.
    let best: { index: number; tone: ToneMeasurement; errorHz: number; sigmas: number } | null = null;
    for (; next < order.length; next++) {
      const { tone, index } = order[next] as { tone: ToneMeasurement; index: number };
      if (Math.round(tone.frequencyHz / fundamentalHz) !== multiple) break;
      if (multiple < 1 || multiple > mostMultiples) continue;
      const toneError = Math.hypot(toneErrorHz(tone, binHz), sharedWanderHz(tone, relativeWander * tone.frequencyHz));
      const toleranceHz = matchSigmas * Math.hypot(toneError, multiple * errorHz);
      expected += Math.min(1, (2 * toleranceHz) / fundamentalHz);
      const distanceHz = Math.abs(tone.frequencyHz - multiple * fundamentalHz);
      if (2 * toleranceHz > 0.5 * fundamentalHz || distanceHz > toleranceHz) continue;
      const sigmas = distanceHz / toleranceHz;
      if (best === null || sigmas < best.sigmas) best = { index, tone, errorHz: toneError, sigmas };
    }
    if (best === null) continue;
    members.push({ tone: best.index, multiple });
    const w = (multiple / best.errorHz) ** 2;
    weight += w;
    weighted += (w * best.tone.frequencyHz) / multiple;
    fundamentalHz = weighted / weight;
    errorHz = Math.sqrt(1 / weight);
  }
  const distinct = new Set(members.map(({ multiple }) => multiple)).size;
  return {
    name,
    fundamentalHz,
    fundamentalErrorHz: errorHz,
    relativeWander: commonWander(members.map(({ tone }) => relativeWanderOf(tones[tone]))),
    members,
    chanceProbability: isStated ? 0 : poissonTail(distinct, expected),
    isStated,
  };
}

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
  const first = followOnce(tones, name, startHz, startErrorHz, binHz, isStated, 0);
  if (first.relativeWander === 0) return first;
  // A speed that wanders puts each member off by its share, each at other times: all are known that much worse.
  return followOnce(tones, name, startHz, startErrorHz, binHz, isStated, first.relativeWander);
}

const relativeWanderOf = (tone: ToneMeasurement | undefined): number =>
  tone === undefined || tone.frequencyHz === 0 ? 0 : tone.wanderHz / tone.frequencyHz;

/** A speed's wander shows in all members alike; a close neighbour's beat adds to one. None where most show none. */
function commonWander(relative: number[]): number {
  const shown = relative.filter((value) => value > 0);
  return 2 * shown.length > relative.length ? Math.min(...shown) : 0;
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
