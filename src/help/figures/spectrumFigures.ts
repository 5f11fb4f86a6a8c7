import { aliasHz, candidatesHz } from '@shared/screening/foldArithmetic.js';
import { curve, label, line, tone } from './figureParts';
import type { FigureShape, HelpFigure } from './HelpFigure';
import { seededNoise } from './seededNoise';

const rateHz = 1000;
const halfHz = rateHz / 2;
const floorDb = -78;
const bottomDb = -90;

const floorTo = (toHz: number, seed: number): FigureShape => {
  const noise = seededNoise(seed);
  return line(
    'quiet',
    curve(0, toHz, 90, () => floorDb + 3 * noise()),
  );
};
const foldLine = (atHz: number, text = 'fs/2'): FigureShape[] => [
  line(
    'quiet',
    [
      [atHz, bottomDb],
      [atHz, -6],
    ],
    true,
  ),
  label('quiet', [atHz * 1.02, -12], text),
];
const frame = {
  xLabel: 'frequency, Hz',
  yLabel: 'level, dB',
  xRange: [0, rateHz] as const,
  yRange: [bottomDb, 0] as const,
};

export function foldedToneFigure(): HelpFigure {
  const trueHz = 640;
  const landsHz = aliasHz(trueHz, rateHz);
  return {
    ...frame,
    title: 'A tone lands below fs/2',
    description: `At ${rateHz} Hz, a tone at ${trueHz} Hz (dashed) is found at ${landsHz} Hz, mirrored at fs/2 = ${halfHz} Hz. The two tones at 120 and 240 Hz are in their own place.`,
    shapes: [
      floorTo(halfHz, 11),
      ...foldLine(halfHz),
      tone('signal', 120, -24, floorDb),
      tone('signal', 240, -38, floorDb),
      tone('quiet', trueHz, -30, bottomDb, true),
      tone('folded', landsHz, -30, floorDb),
      { shape: 'arrow', role: 'folded', from: [trueHz, -28], to: [landsHz + 6, -28] },
      label('folded', [landsHz - 8, -20], 'found here', 'middle'),
      label('quiet', [trueHz + 8, -36], 'true place'),
    ],
  };
}

export function ambiguousFigure(): HelpFigure {
  const seenHz = 452;
  const both = candidatesHz(seenHz, 5000, 5000).filter((hz) => Math.abs(aliasHz(hz, 4096) - seenHz) < 1);
  const highHz = both.at(-1) ?? seenHz;
  return {
    ...frame,
    title: 'Two sources, one place',
    description: `A tone at ${seenHz} Hz and one at ${highHz} Hz both appear at ${seenHz} Hz at 5000 Hz, and also at 4096 Hz. Neither rate tells them apart; a third one does.`,
    xRange: [0, 5000],
    shapes: [
      floorTo(2500, 12),
      ...foldLine(2500, 'fs/2 at 5000 Hz'),
      tone('signal', seenHz, -34, floorDb),
      tone('quiet', highHz, -34, bottomDb, true),
      { shape: 'arrow', role: 'quiet', from: [highHz, -30], to: [seenHz + 40, -30] },
      label('signal', [seenHz + 40, -46], `${seenHz} Hz, or`),
      label('quiet', [highHz - 40, -46], `${highHz} Hz?`, 'end'),
    ],
  };
}

export function clippingHarmonicsFigure(): HelpFigure {
  const firstHz = 90;
  const harmonics = [3, 5, 7, 9].map((k) => ({ k, lands: aliasHz(k * firstHz, rateHz), isIn: k * firstHz < halfHz }));
  return {
    ...frame,
    title: 'Clipping makes harmonics that fold',
    description: `Flat tops on a tone of ${firstHz} Hz make odd harmonics. The third and fifth lie in the band; the seventh (630 Hz) and ninth (810 Hz) fold to ${harmonics[2]?.lands} and ${harmonics[3]?.lands} Hz.`,
    xRange: [0, halfHz],
    shapes: [
      floorTo(halfHz, 13),
      tone('signal', firstHz, -12, floorDb),
      label('signal', [firstHz + 6, -16], 'source'),
      ...harmonics.flatMap(({ k, lands, isIn }): FigureShape[] => [
        tone(isIn ? 'caution' : 'folded', lands, -22 - 4 * k, floorDb),
        label(isIn ? 'caution' : 'folded', [lands, -18 - 4 * k], `${k} ×`, 'middle'),
      ]),
    ],
  };
}

export function mirrorFigure(): HelpFigure {
  const noise = seededNoise(14);
  const oldHalfHz = 250;
  const source = (hz: number): number => -22 - 40 * (hz / oldHalfHz) ** 2 + (hz > 90 && hz < 120 ? 14 : 0);
  const drawn = (hz: number): number =>
    Math.max(floorDb, (hz <= oldHalfHz ? source(hz) : source(2 * oldHalfHz - hz) - 8) + 2 * noise());
  return {
    ...frame,
    title: 'Mirror images of a lower rate',
    description:
      'Above 250 Hz the spectrum repeats the part below, mirrored and weaker: the capture was first recorded at 500 Hz and raised to 1000 Hz afterwards.',
    xRange: [0, halfHz],
    shapes: [
      line('signal', curve(0, oldHalfHz, 60, drawn)),
      line('caution', curve(oldHalfHz, halfHz, 60, drawn)),
      ...foldLine(oldHalfHz, 'old fs/2'),
      label('caution', [380, -14], 'images', 'middle'),
    ],
  };
}

export function twoRatesFigure(): HelpFigure {
  const trueHz = 780;
  const [slowHz, fastHz] = [1000, 1280];
  const [slow, fast] = [aliasHz(trueHz, slowHz), aliasHz(trueHz, fastHz)];
  return {
    ...frame,
    title: 'What moves between two rates is folded',
    description: `The tone at 140 Hz stands at the same place at both rates. The other one stands at ${slow} Hz at ${slowHz} Hz and at ${fast} Hz at ${fastHz} Hz: only ${trueHz} Hz explains both.`,
    yLabel: 'two captures',
    xRange: [0, 640],
    yRange: [0, 100],
    shapes: [
      line('quiet', [
        [0, 56],
        [slowHz / 2, 56],
      ]),
      line('quiet', [
        [0, 6],
        [fastHz / 2, 6],
      ]),
      tone('signal', 140, 88, 56),
      tone('signal', 140, 38, 6),
      tone('folded', slow, 82, 56),
      tone('folded', fast, 32, 6),
      { shape: 'arrow', role: 'folded', from: [slow, 54], to: [fast - 4, 34] },
      label('quiet', [640, 92], `at ${slowHz} Hz`, 'end'),
      label('quiet', [640, 44], `at ${fastHz} Hz`, 'end'),
      label('folded', [slow + 8, 76], 'moved'),
    ],
  };
}

export function twoChannelsFigure(): HelpFigure {
  const landsHz = aliasHz(640, rateHz);
  return {
    ...frame,
    title: 'The same place in two channels',
    description: `Both channels were sampled at the same instants. The line at ${landsHz} Hz is shown to be folded in channel 1; channel 2 holds it at the same place.`,
    yLabel: 'two channels',
    xRange: [0, halfHz],
    yRange: [0, 100],
    shapes: [
      line('quiet', [
        [0, 56],
        [halfHz, 56],
      ]),
      line('quiet', [
        [0, 6],
        [halfHz, 6],
      ]),
      tone('signal', 120, 90, 56),
      tone('signal', 180, 34, 6),
      tone('folded', landsHz, 82, 56),
      tone('folded', landsHz, 24, 6),
      label('quiet', [6, 92], 'channel 1'),
      label('quiet', [6, 44], 'channel 2'),
      label('folded', [landsHz + 8, 74], 'shown'),
      label('folded', [landsHz + 8, 20], 'held too'),
    ],
  };
}

export function rateScaleFigure(): HelpFigure {
  const cycles = 0.2;
  return {
    ...frame,
    title: 'One line, two frequencies',
    description: `A capture only fixes the frequency as a share of the rate, here ${cycles}. At 1000 Hz the line is at ${cycles * 1000} Hz, at 1280 Hz it is at ${cycles * 1280} Hz.`,
    xLabel: 'share of the rate',
    xRange: [0, 0.5],
    shapes: [
      line(
        'quiet',
        curve(0, 0.5, 90, () => floorDb),
      ),
      tone('signal', cycles, -40, floorDb),
      label('signal', [cycles, -30], `${cycles * 1000} Hz if the rate is 1000 Hz`, 'middle'),
      label('caution', [cycles, -16], `${cycles * 1280} Hz if the rate is 1280 Hz`, 'middle'),
    ],
  };
}
