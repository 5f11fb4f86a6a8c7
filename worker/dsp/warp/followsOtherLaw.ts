import { type SpeedLaw, warpedShareAt } from './SpeedLaw.js';

interface Part {
  law: SpeedLaw;
  /** True frequency at relative speed 1, cycles a sample. */
  nu: number;
  /** The folded part, as shares of the time. */
  from: number;
  to: number;
}

const moments = 24;
const likeBins = 8;

/** Whether the folded part of a line is also the path of some line in band that turns with another machine. */
export function followsOtherLaw({ law, nu, from, to }: Part, other: SpeedLaw): boolean {
  const times = Array.from({ length: moments }, (_, i) => from + ((to - from) * (i + 0.5)) / moments);
  const path = times.map((time) => {
    const frequency = nu * law.speedAt(warpedShareAt(law, time));
    return Math.abs(frequency - Math.round(frequency));
  });
  const speeds = times.map((time) => other.speedAt(warpedShareAt(other, time)));
  // The line of the other law that comes nearest, in the least-squares sense.
  const place = sumOf(path.map((f, i) => f * (speeds[i] as number))) / sumOf(speeds.map((s) => s * s));
  const squares = sumOf(path.map((f, i) => (f - place * (speeds[i] as number)) ** 2));
  return Math.sqrt(squares / moments) * (to - from) * law.length < likeBins;
}

const sumOf = (values: number[]): number => values.reduce((sum, value) => sum + value, 0);
