import type { DemoBatch, DemoCapture } from '../DemoBatch.js';
import { sum } from '../signals/alter.js';
import { encodeWav } from '../signals/encodeWav.js';
import { machineSignal } from '../signals/machine.js';
import { filteredNoise, whiteNoise } from '../signals/noise.js';

const sampleRateHz = 256;
const durationS = 90;
const frames = sampleRateHz * durationS;
const modes = [
  { order: 2.4, amplitude: 0.1 },
  { order: 6.1, amplitude: 0.05 },
  { order: 11.7, amplitude: 0.03 },
];

function span(fileName: string, position: string, pumpHz: number | null): DemoCapture {
  return {
    fileName,
    acquisition: { position },
    make: (random) => {
      const orders = pumpHz === null ? modes : [...modes, { order: pumpHz, amplitude: 0.06 }];
      return encodeWav(
        [
          sum(
            machineSignal({ sampleRateHz, durationS, speedHz: 1, wanderShare: 1e-4, orders }, random),
            filteredNoise(frames, 0.02, 0.34, random),
            whiteNoise(frames, 1e-6, random),
          ),
        ],
        sampleRateHz,
      );
    },
  };
}

/** The footbridge's accelerometers; beside the sluice a pump's line above half the rate gets in. */
export const footbridge: DemoBatch = {
  name: 'Footbridge, walking test',
  seed: 107,
  isComplete: true,
  acquisition: {
    sampleRateHz,
    highestFrequencyHz: 60,
    sources: [{ name: 'Sluice pump, blade passing', frequencyHz: 172.2 }],
    logger: 'Bridge node',
    unit: 'g',
  },
  captures: [
    span('span-1.wav', 'Span 1, middle', null),
    span('span-2.wav', 'Span 2, middle', null),
    span('span-3-beside-sluice.wav', 'Span 3, middle', 172.2),
  ],
};
