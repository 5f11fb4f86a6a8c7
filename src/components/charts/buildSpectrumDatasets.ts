import type { Tone } from '@shared/schemas/screening.js';
import type { ChartDataset } from 'chart.js';
import { toneFaces } from './toneFaces';
import type { SpectrumModel } from './SpectrumModel';
import type { ChartColors } from './useChartColors';

export interface TonePoint {
  x: number;
  y: number;
  tone: Tone;
}
type Point = { x: number; y: number };
export type SpectrumDataset = ChartDataset<'line', Point[] | TonePoint[]>;

/** Level of the drawn density at a frequency: a marker sits on the line, whatever the tone's own power is. */
export function densityAt({ spectrum }: Pick<SpectrumModel, 'spectrum'>, frequencyHz: number): number {
  const { frequencyHz: axis, densityDb } = spectrum;
  let nearest = 0;
  for (let index = 1; index < axis.length; index += 1) {
    if (Math.abs((axis[index] ?? 0) - frequencyHz) < Math.abs((axis[nearest] ?? 0) - frequencyHz)) nearest = index;
  }
  const around = densityDb.slice(Math.max(0, nearest - 1), nearest + 2);
  return around.length > 0 ? Math.max(...around) : 0;
}

const pointsOf = (axis: number[], levels: number[], isLogarithmic: boolean): Point[] =>
  axis.flatMap((x, index) => (isLogarithmic && x <= 0 ? [] : [{ x, y: levels[index] ?? Number.NaN }]));

function toneDataset(model: SpectrumModel, label: string, tones: Tone[], colors: ChartColors): SpectrumDataset {
  const [first] = tones;
  const face = first ? toneFaces[first.explanation] : toneFaces.unexplained;
  const color = face.isFolded ? colors.folded : colors.tone;
  return {
    label,
    data: tones.map((tone) => ({ x: tone.frequencyHz, y: densityAt(model, tone.frequencyHz), tone })),
    showLine: false,
    pointStyle: face.point,
    pointRadius: face.isFolded ? 8 : 5,
    pointHoverRadius: face.isFolded ? 10 : 7,
    borderColor: color,
    backgroundColor: face.isFolded ? color : colors.paper,
    borderWidth: 2,
    order: 0,
  };
}

/** The density, its median where there is one, and one series of markers for each kind of tone. */
export function buildSpectrumDatasets(model: SpectrumModel, colors: ChartColors): SpectrumDataset[] {
  const { spectrum, screen, isLogarithmic } = model;
  const line = { pointRadius: 0, pointHitRadius: 0, tension: 0, order: 2 };
  const kinds = [...new Set(screen.tones.map(({ explanation }) => explanation))];
  return [
    {
      ...line,
      label: 'Density',
      data: pointsOf(spectrum.frequencyHz, spectrum.densityDb, isLogarithmic),
      borderColor: colors.ink,
      borderWidth: 1.3,
    },
    ...(spectrum.medianDb
      ? [
          {
            ...line,
            label: 'Median over segments',
            data: pointsOf(spectrum.frequencyHz, spectrum.medianDb, isLogarithmic),
            borderColor: colors.muted,
            borderWidth: 1,
            borderDash: [2, 3],
          },
        ]
      : []),
    ...kinds.map((kind) =>
      toneDataset(
        model,
        toneFaces[kind].label,
        screen.tones.filter(({ explanation }) => explanation === kind),
        colors,
      ),
    ),
  ];
}
