import { zoneOf } from '@shared/screening/foldArithmetic.js';
import type { AnnotationOptions } from 'chartjs-plugin-annotation';
import { formatFrequency } from '@/utils/formatFrequency';
import type { SpectrumModel } from './SpectrumModel';
import { isFoldedTone } from './toneFaces';
import { withAlpha, type ChartColors } from './useChartColors';

const label = (content: string, color: string, paper: string, position: 'start' | 'center' | 'end', yAdjust = 0) => ({
  display: true,
  content,
  position,
  yAdjust,
  color,
  backgroundColor: withAlpha(paper, 0.9),
  font: { size: 11, weight: 'normal' as const },
  padding: 3,
});

const labelledFoldedTones = 6;

function foldedToneAnnotations(
  { screen, spectrum }: SpectrumModel,
  colors: ChartColors,
): Record<string, AnnotationOptions> {
  const folded = screen.tones
    .filter((tone) => isFoldedTone(tone) && tone.trueFrequencyHz !== undefined)
    .sort((a, b) => b.standsOutDb - a.standsOutDb)
    .slice(0, labelledFoldedTones);
  return Object.fromEntries(
    folded.map((tone, index) => {
      const trueHz = tone.trueFrequencyHz ?? 0;
      return [
        `folded${index}`,
        {
          type: 'line',
          xMin: tone.frequencyHz,
          xMax: tone.frequencyHz,
          borderColor: colors.folded,
          borderWidth: 1,
          borderDash: [3, 4],
          label: label(
            `belongs at ${formatFrequency(trueHz)} (zone ${zoneOf(trueHz, spectrum.sampleRateHz).number}) →`,
            colors.folded,
            colors.paper,
            'end',
            4 + index * 18,
          ),
        } satisfies AnnotationOptions,
      ];
    }),
  );
}

/** Folding frequency, guard band, clear-to frequency, protected stretch, contamination bound, and where folded tones belong. */
export function buildSpectrumAnnotations(model: SpectrumModel, colors: ChartColors): Record<string, AnnotationOptions> {
  const { spectrum, screen } = model;
  const annotations: Record<string, AnnotationOptions> = {
    folding: {
      type: 'line',
      xMin: spectrum.foldingFrequencyHz,
      xMax: spectrum.foldingFrequencyHz,
      borderColor: colors.ink,
      borderWidth: 2.5,
      label: label(`folding ${formatFrequency(spectrum.foldingFrequencyHz)}`, colors.ink, colors.paper, 'start'),
    },
  };
  if (screen.guardStartHz !== null) {
    annotations.guard = {
      type: 'box',
      xMin: screen.guardStartHz,
      xMax: spectrum.foldingFrequencyHz,
      backgroundColor: withAlpha(colors.caution, 0.1),
      borderColor: withAlpha(colors.caution, 0.5),
      borderWidth: 1,
      borderDash: [4, 4],
      drawTime: 'beforeDatasetsDraw',
      label: {
        display: true,
        content: 'guard band',
        drawTime: 'afterDatasetsDraw',
        position: { x: 'center', y: 'center' },
        color: colors.caution,
        padding: 3,
        font: { size: 11, weight: 'normal' },
      },
    };
  }
  if (screen.clearToHz !== null) {
    annotations.protectedStretch = {
      type: 'box',
      xMin: screen.bandOfInterestHz[0],
      xMax: screen.clearToHz,
      backgroundColor: withAlpha(colors.protected, 0.09),
      borderWidth: 0,
      drawTime: 'beforeDatasetsDraw',
    };
    annotations.clearTo = {
      type: 'line',
      xMin: screen.clearToHz,
      xMax: screen.clearToHz,
      borderColor: colors.protected,
      borderWidth: 2,
      borderDash: [8, 3],
      label: label(`clear to ${formatFrequency(screen.clearToHz)}`, colors.protected, colors.paper, 'start', -24),
    };
  }
  if (screen.contaminationBoundDb !== null) {
    annotations.bound = {
      type: 'line',
      yMin: screen.contaminationBoundDb,
      yMax: screen.contaminationBoundDb,
      borderColor: colors.caution,
      borderWidth: 1.5,
      borderDash: [1, 3],
      label: label('contamination bound', colors.caution, colors.paper, 'start'),
    };
  }
  return { ...annotations, ...foldedToneAnnotations(model, colors) };
}
