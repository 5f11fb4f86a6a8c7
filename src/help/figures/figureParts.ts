import type { FigurePoint, FigureRole, FigureShape } from './HelpFigure';

/** Evenly spaced values from one end to the other, both included. */
export const steps = (from: number, to: number, count: number): number[] =>
  Array.from({ length: count }, (_, index) => from + ((to - from) * index) / (count - 1));

/** A curve sampled at evenly spaced places. */
export const curve = (from: number, to: number, count: number, value: (x: number) => number): FigurePoint[] =>
  steps(from, to, count).map((x) => [x, value(x)]);

/** An upright stroke from a floor to a level, as a tone in a spectrum. */
export const tone = (role: FigureRole, x: number, level: number, floor: number, isDashed = false): FigureShape => ({
  shape: 'line',
  role,
  points: [
    [x, floor],
    [x, level],
  ],
  isDashed,
});

export const label = (
  role: FigureRole,
  at: FigurePoint,
  text: string,
  anchor: 'start' | 'middle' | 'end' = 'start',
): FigureShape => ({ shape: 'label', role, at, text, anchor });

export const line = (role: FigureRole, points: FigurePoint[], isDashed = false): FigureShape => ({
  shape: 'line',
  role,
  points,
  isDashed,
});

/** Cuts a path where it jumps, so that no stroke joins what does not hang together. */
export function unjoined(points: FigurePoint[], largestStep: number): FigurePoint[][] {
  const pieces: FigurePoint[][] = [];
  for (const point of points) {
    const piece = pieces.at(-1);
    const last = piece?.at(-1);
    if (piece && last && Math.abs(point[1] - last[1]) <= largestStep) piece.push(point);
    else pieces.push([point]);
  }
  return pieces;
}

const decibels = (power: number): number => 10 * Math.log10(power);
const power = (levelDb: number): number => 10 ** (levelDb / 10);

/** Powers add, levels in dB don't. */
export const sumDb = (...levelsDb: number[]): number =>
  decibels(levelsDb.reduce((sum, levelDb) => sum + power(levelDb), 0));
