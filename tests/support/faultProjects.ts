import type { DemoCapture } from '../../server/demo/DemoBatch.js';
import type { DemoProject } from '../../server/demo/demoProjects.js';
import { sum } from '../../server/demo/signals/alter.js';
import { encodeWav } from '../../server/demo/signals/encodeWav.js';
import { filteredNoise, whiteNoise } from '../../server/demo/signals/noise.js';

const sampleRateHz = 4000;
const frames = 20 * sampleRateHz;

const capture = (number: number): DemoCapture => ({
  fileName: `capture-${number}.wav`,
  make: (random) =>
    encodeWav([sum(filteredNoise(frames, 0.1, 0.35, random), whiteNoise(frames, 2e-6, random))], sampleRateHz),
});

/** One project with one closed batch of so many captures, and a file in it that can't be read. */
export const faultProjects = (captureCount: number): DemoProject[] => [
  {
    name: 'Fault project',
    description: '',
    members: {
      'ines@marram.example': ['analyst'],
      'tomas@marram.example': ['reviewer'],
      'yara@marram.example': ['qaManager'],
      'ove@marram.example': ['qaManager'],
    },
    uploaderEmail: 'ines@marram.example',
    thresholds: null,
    batches: [
      {
        name: 'Fault batch',
        seed: 900,
        isComplete: true,
        acquisition: { highestFrequencyHz: 1200 },
        captures: [
          ...Array.from({ length: captureCount }, (_, number) => capture(number)),
          { fileName: 'words.csv', make: () => Buffer.from('time,value\nno data\nbattery empty\n') },
        ],
      },
    ],
  },
];
