export type FigurePoint = readonly [x: number, y: number];

/** `folded` is kept for folded energy; the others are the theme's roles. */
export type FigureRole = 'signal' | 'folded' | 'caution' | 'protected' | 'quiet';

export type FigureShape =
  | { shape: 'line'; role: FigureRole; points: FigurePoint[]; isDashed?: boolean }
  | { shape: 'arrow'; role: FigureRole; from: FigurePoint; to: FigurePoint }
  | { shape: 'dots'; role: FigureRole; points: FigurePoint[] }
  | { shape: 'area'; role: FigureRole; points: FigurePoint[] }
  | { shape: 'label'; role: FigureRole; at: FigurePoint; text: string; anchor?: 'start' | 'middle' | 'end' };

/** A small drawing in the units of its own axes, with the words that stand for it. */
export interface HelpFigure {
  title: string;
  /** What there is to see, for whoever doesn't see it. */
  description: string;
  xLabel: string;
  yLabel: string;
  xRange: FigurePoint;
  yRange: FigurePoint;
  shapes: FigureShape[];
}
