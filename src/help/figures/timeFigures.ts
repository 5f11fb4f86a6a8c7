import { aliasHz } from '@shared/screening/foldArithmetic.js';
import { curve, label, line, steps, unjoined } from './figureParts';
import type { FigurePoint, FigureShape, HelpFigure } from './HelpFigure';
import { seededNoise } from './seededNoise';

const rateHz = 1000;
const halfHz = rateHz / 2;
const wave = (s: number): number => 0.8 * Math.sin(2 * Math.PI * 4 * s) + 0.25 * Math.sin(2 * Math.PI * 11 * s);
const overTime = (value: (s: number) => number, count = 161): FigurePoint[] => curve(0, 1, count, value);

const frame = { xLabel: 'time', yLabel: 'value', xRange: [0, 1] as const, yRange: [-1.4, 1.4] as const };
const trackFrame = {
  xLabel: 'time, s',
  yLabel: 'frequency, Hz',
  xRange: [0, 10] as const,
  yRange: [0, halfHz * 2] as const,
};
const foldLine: FigureShape[] = [
  line(
    'quiet',
    [
      [0, halfHz],
      [10, halfHz],
    ],
    true,
  ),
  label('quiet', [0.1, halfHz + 20], 'fs/2'),
];

export function edgeOverTimeFigure(): HelpFigure {
  const noise = seededNoise(21);
  const inBand = (s: number): number => 0.55 + 0.55 * Math.sin(2 * Math.PI * 1.5 * s) + 0.06 * noise();
  const level = overTime(inBand, 60);
  return {
    ...frame,
    yLabel: 'level',
    title: 'The edge over time',
    description:
      'When the signal grows and fades (upper line), an edge that still holds signal does the same (dashed line below it). The floor of a converter stays flat (bottom).',
    shapes: [
      line('signal', level),
      line(
        'folded',
        level.map(([s, value]): FigurePoint => [s, value * 0.7 - 0.62]),
        true,
      ),
      line(
        'quiet',
        overTime(() => -1.15 + 0.05 * noise(), 60),
      ),
      label('signal', [0.3, 1.2], 'in band'),
      label('folded', [0.98, 0.25], 'edge, follows', 'end'),
      label('quiet', [0.98, -1.05], 'edge, a floor', 'end'),
    ],
  };
}

export function clippedFigure(): HelpFigure {
  const limit = 0.6;
  const loud = (s: number): number => 1.3 * wave(s);
  return {
    ...frame,
    title: 'Flat tops',
    description: `The signal would go on along the dashed line; the recording stays at its limit. Runs of the largest value are counted.`,
    shapes: [
      line('quiet', overTime(loud), true),
      line(
        'caution',
        overTime((s) => Math.max(-limit, Math.min(limit, loud(s)))),
      ),
    ],
  };
}

export function dropoutFigure(): HelpFigure {
  const [fromS, toS] = [0.42, 0.62];
  const held = (s: number): number => wave(s > fromS && s < toS ? fromS : s);
  return {
    ...frame,
    title: 'One value held too long',
    description:
      'Between the arrows the recording keeps one value far longer than the signal around it explains, then goes on elsewhere (the dashed line is what was lost).',
    shapes: [
      line('quiet', curve(fromS, toS, 40, wave), true),
      line('signal', overTime(held)),
      { shape: 'arrow', role: 'caution', from: [fromS, -1.25], to: [fromS, -0.1] },
      { shape: 'arrow', role: 'caution', from: [toS, -1.25], to: [toS, -0.1] },
    ],
  };
}

export function cutShortFigure(): HelpFigure {
  return {
    ...frame,
    title: 'Too little remains',
    description:
      'Only the first part is there (solid). The dashed remainder was announced or needed, but is not in the file.',
    shapes: [
      line('signal', curve(0, 0.3, 60, wave)),
      line('quiet', curve(0.3, 1, 120, wave), true),
      line(
        'caution',
        [
          [0.3, -1.3],
          [0.3, 1.3],
        ],
        true,
      ),
      label('caution', [0.32, 1.2], 'ends here'),
    ],
  };
}

export function offsetFigure(): HelpFigure {
  return {
    ...frame,
    title: 'The mean is not zero',
    description:
      'The signal moves about the dashed line at its mean, well off zero. Taking the mean out also takes out whatever folds to 0 Hz.',
    shapes: [
      line(
        'quiet',
        [
          [0, 0],
          [1, 0],
        ],
        false,
      ),
      line(
        'signal',
        overTime((s) => 0.7 + 0.5 * wave(s)),
      ),
      line(
        'caution',
        [
          [0, 0.7],
          [1, 0.7],
        ],
        true,
      ),
      label('caution', [0.99, -0.2], 'offset', 'end'),
      { shape: 'arrow', role: 'caution', from: [0.82, 0], to: [0.82, 0.66] },
    ],
  };
}

export function coarseStepsFigure(): HelpFigure {
  const step = 0.5;
  return {
    ...frame,
    title: 'Few steps for the signal',
    description: 'The dashed signal moves over only a few steps of the recording, which turns it into a staircase.',
    shapes: [
      line('quiet', overTime(wave), true),
      line(
        'caution',
        overTime((s) => step * Math.round(wave(s) / step), 301),
      ),
    ],
  };
}

export function silentFigure(): HelpFigure {
  return {
    ...frame,
    title: 'One value throughout',
    description: 'The channel stays at one value: there is nothing to judge. A pause looks the same for a while.',
    shapes: [
      line(
        'signal',
        overTime(() => 0.1, 2),
      ),
    ],
  };
}

export function timeStampFigure(): HelpFigure {
  const noise = seededNoise(22);
  const places = steps(0.04, 0.96, 24);
  const rows: { role: 'signal' | 'caution'; text: string; height: number; at: number[] }[] = [
    { role: 'signal', text: 'even', height: 1, at: places },
    { role: 'caution', text: 'jitter', height: 0.35, at: places.map((s) => s + 0.012 * noise()) },
    { role: 'caution', text: 'gap', height: -0.3, at: places.filter((s) => s < 0.4 || s > 0.6) },
    {
      role: 'caution',
      text: 'repeated',
      height: -0.95,
      at: places.map((_, index) => 0.04 + 0.08 * Math.floor(index / 2)),
    },
  ];
  return {
    ...frame,
    yLabel: 'time stamps',
    title: 'Even, scattered, missing, repeated',
    description:
      'Each dot is a time stamp. From the top: an even grid; stamps that scatter about it (jitter); rows missing (gap); stamps written so coarsely that two share one.',
    shapes: rows.flatMap(({ role, text, height, at }): FigureShape[] => [
      { shape: 'dots', role, points: at.map((s): FigurePoint => [s, height]) },
      label(role, [0.02, height + 0.14], text),
    ]),
  };
}

export function irregularFigure(): HelpFigure {
  const noise = seededNoise(23);
  const at = steps(0, 1, 22).map((s) => Math.min(1, Math.max(0, s + 0.02 * noise())));
  const fast = (s: number): number => Math.sin(2 * Math.PI * 17 * s);
  return {
    ...frame,
    title: 'Uneven instants tell frequencies apart',
    description:
      'At even steps a slow and a fast tone can give the same samples. At these uneven instants the dots fit the fast tone only.',
    shapes: [
      line('quiet', overTime(fast, 401)),
      { shape: 'dots', role: 'signal', points: at.map((s): FigurePoint => [s, fast(s)]) },
    ],
  };
}

export function wrappedOrderFigure(): HelpFigure {
  const speedHz = (s: number): number => 25 + 3 * Math.sin((2 * Math.PI * s) / 10);
  const order = 28;
  return {
    ...trackFrame,
    title: 'An order beyond fs/2 runs the wrong way',
    description: `The shaft’s speed rises and falls. Order 6 rises and falls with it. Order ${order} lies beyond fs/2 (dashed) and is found below it, falling when the speed rises.`,
    shapes: [
      ...foldLine,
      line(
        'signal',
        curve(0, 10, 80, (s) => 6 * speedHz(s)),
      ),
      line(
        'quiet',
        curve(0, 10, 80, (s) => order * speedHz(s)),
        true,
      ),
      line(
        'folded',
        curve(0, 10, 80, (s) => aliasHz(order * speedHz(s), rateHz)),
      ),
      label('signal', [10, 70], 'order 6', 'end'),
      label('folded', [10, 420], `order ${order}, found`, 'end'),
      label('quiet', [10, 800], `order ${order}, true`, 'end'),
    ],
  };
}

export function reflectedSweepFigure(): HelpFigure {
  const sweepHz = (s: number): number => 100 + 80 * s;
  const seen = curve(0, 10, 101, (s) => aliasHz(sweepHz(s), rateHz));
  const turnS = (halfHz - 100) / 80;
  const [below, above] = [seen.filter(([s]) => s <= turnS), seen.filter(([s]) => s >= turnS)];
  return {
    ...trackFrame,
    title: 'A sweep turns back at fs/2',
    description: `A tone rises through fs/2 after ${turnS} s. From then on its true path (dashed) is seen mirrored, falling at the same rate.`,
    shapes: [
      ...foldLine,
      line('signal', below),
      ...unjoined(above, 50).map((points) => line('folded', points)),
      line('quiet', curve(turnS, 10, 20, sweepHz), true),
      label('signal', [1.4, 150], 'true'),
      label('folded', [8.2, 330], 'folded'),
    ],
  };
}

export function sourceAtFoldFigure(): HelpFigure {
  const at = steps(0, 1, 13);
  const tone = (phase: number) => (s: number) => Math.cos(2 * Math.PI * 6 * s + phase);
  const samples = (phase: number): FigurePoint[] => at.map((s) => [s, tone(phase)(s)]);
  return {
    ...frame,
    title: 'At fs/2 the level depends on the phase',
    description:
      'Two equal tones at exactly fs/2. The samples (dots) of one catch its tops, those of the other (dashed) catch its zeros and show nothing.',
    shapes: [
      line('signal', overTime(tone(0), 241)),
      { shape: 'dots', role: 'signal', points: samples(0) },
      line('quiet', overTime(tone(Math.PI / 2), 241), true),
      { shape: 'dots', role: 'caution', points: samples(Math.PI / 2) },
    ],
  };
}

export function triangleFigure(): HelpFigure {
  return {
    ...frame,
    xLabel: 'first frequency, share of fs',
    yLabel: 'second frequency',
    xRange: [0, 0.5],
    yRange: [0, 0.4],
    title: 'Inner and outer triangle',
    description:
      'Pairs of frequencies below fs/2. In the inner triangle the pair’s sum stays below fs/2. In the outer one (filled) a pair hangs together only by way of the sampling rate.',
    shapes: [
      line('signal', [
        [0, 0],
        [0.25, 0.25],
        [0.5, 0],
        [0, 0],
      ]),
      {
        shape: 'area',
        role: 'caution',
        points: [
          [0.25, 0.25],
          [1 / 3, 1 / 3],
          [0.5, 0],
        ],
      },
      line('caution', [
        [0.25, 0.25],
        [1 / 3, 1 / 3],
        [0.5, 0],
      ]),
      label('signal', [0.25, 0.1], 'inner', 'middle'),
      label('caution', [0.4, 0.28], 'outer'),
    ],
  };
}
