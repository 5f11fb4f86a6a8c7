import { formatFrequency } from '@/utils/formatFrequency';
import type { SpectrumModel } from './SpectrumModel';
import { isFoldedTone } from './toneFaces';

const told = 4;

/** The picture in words, for those who do not see it: what it shows, not what it is. */
export function describeSpectrum({ spectrum, screen }: Omit<SpectrumModel, 'isLogarithmic'>): string {
  const folded = screen.tones.filter(isFoldedTone);
  const parts = [
    `Spectral density up to the folding frequency of ${formatFrequency(spectrum.foldingFrequencyHz)}.`,
    screen.clearToHz === null
      ? 'No frequency is shown to be clear.'
      : `Clear up to ${formatFrequency(screen.clearToHz)} at ${screen.protectionDb} dB protection.`,
    `${screen.tones.length} tones stand out, ${folded.length} of them folded.`,
    ...folded.slice(0, told).map((tone) => {
      const belongs = tone.trueFrequencyHz === undefined ? '' : `, belongs at ${formatFrequency(tone.trueFrequencyHz)}`;
      return `Folded tone at ${formatFrequency(tone.frequencyHz)}, ${tone.levelDb.toFixed(1)} dB${belongs}.`;
    }),
  ];
  return parts.join(' ');
}
