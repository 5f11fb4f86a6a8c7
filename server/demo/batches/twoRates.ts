import type { DemoBatch, DemoCapture } from '../DemoBatch.js';
import { sum } from '../signals/alter.js';
import { encodeWav } from '../signals/encodeWav.js';
import { machineSignal } from '../signals/machine.js';
import { filteredNoise, whiteNoise } from '../signals/noise.js';
import type { SeededRandom } from '../signals/SeededRandom.js';

const durationS = 12;

interface Source {
  frequencyHz: number;
  amplitude: number;
}

/** The same event at one of two rates: what lies above half the lower one moves between them. */
function atRate(sampleRateHz: number, sources: readonly Source[], random: SeededRandom): Float64Array {
  const frames = sampleRateHz * durationS;
  const orders = sources.map(({ frequencyHz, amplitude }) => ({ order: frequencyHz, amplitude }));
  return sum(
    machineSignal({ sampleRateHz, durationS, speedHz: 1, orders }, random),
    filteredNoise(frames, 0.02, 0.3, random),
    whiteNoise(frames, 1e-4, random),
  );
}

function pair(
  name: string,
  position: string,
  rates: readonly [number, number],
  sources: readonly Source[],
): DemoCapture[] {
  const fileOf = (rateHz: number): string => `${name}/at-${rateHz}-hz.wav`;
  return rates.map((sampleRateHz, index) => ({
    fileName: fileOf(sampleRateHz),
    acquisition: { sampleRateHz, position, pair: name, companion: fileOf(rates[1 - index] ?? sampleRateHz) },
    make: (random) => encodeWav([atRate(sampleRateHz, sources, random)], sampleRateHz),
  }));
}

/** Pairs of captures of the same event at two rates, made to find out which lines stay where they are. */
export const twoRates: DemoBatch = {
  name: 'Gearbox, pairs at two rates',
  seed: 103,
  isComplete: true,
  acquisition: { highestFrequencyHz: 400, filter: { type: 'none' }, logger: 'Logger K2' },
  captures: [
    ...pair(
      'gearbox-a',
      'Gearbox A, output shaft',
      [1000, 1280],
      [
        { frequencyHz: 118.4, amplitude: 0.2 },
        { frequencyHz: 236.8, amplitude: 0.1 },
        { frequencyHz: 734.2, amplitude: 0.12 },
      ],
    ),
    ...pair(
      'gearbox-b',
      'Gearbox B, output shaft',
      [1000, 1280],
      [
        { frequencyHz: 97.1, amplitude: 0.2 },
        { frequencyHz: 194.2, amplitude: 0.1 },
        { frequencyHz: 291.3, amplitude: 0.05 },
      ],
    ),
    ...pair(
      'gearbox-c',
      'Gearbox C, input shaft',
      [1024, 1600],
      [
        { frequencyHz: 143.7, amplitude: 0.15 },
        { frequencyHz: 881.3, amplitude: 0.15 },
      ],
    ),
  ],
};
