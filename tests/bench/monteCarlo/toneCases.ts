import { between } from '../synthetic/drawing.js';
import type { ModelTone } from './ToneModel.js';

export interface ToneCase {
  name: string;
  signalToNoiseDb: number;
  draw: (random: () => number) => ModelTone[];
}

export const caseFrames = 4096;
export const caseRateHz = 1024;

const binHz = caseRateHz / caseFrames;
const tone = (random: () => number, frequencyHz: number, decayS: number | null = null): ModelTone => ({
  frequencyHz,
  amplitude: 1,
  phase: between(random, 0, 2 * Math.PI),
  decayS,
});
const anywhere = (random: () => number): number => caseRateHz * between(random, 0.03, 0.47);
const pairOf =
  (spacingBins: number): ToneCase['draw'] =>
  (random) => {
    const low = anywhere(random);
    return [tone(random, low), tone(random, low + spacingBins * binHz)];
  };

/** What the tone estimator is held to: 4096 samples, the signal-to-noise ratio A²/(2σ²) of one sample. */
export const toneCases: readonly ToneCase[] = [
  { name: 'one tone, 20 dB', signalToNoiseDb: 20, draw: (random) => [tone(random, anywhere(random))] },
  { name: 'one tone, 40 dB', signalToNoiseDb: 40, draw: (random) => [tone(random, anywhere(random))] },
  { name: 'two tones 6 bins apart, 20 dB', signalToNoiseDb: 20, draw: pairOf(6) },
  { name: 'two tones 2.5 bins apart, 20 dB', signalToNoiseDb: 20, draw: pairOf(2.5) },
  {
    name: 'decaying tone, a third of the capture, 20 dB',
    signalToNoiseDb: 20,
    draw: (random) => [tone(random, anywhere(random), caseFrames / caseRateHz / 3)],
  },
];
