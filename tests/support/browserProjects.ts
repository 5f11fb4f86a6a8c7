import type { DemoProject } from '../../server/demo/demoProjects.js';
import { nightWatch } from '../../server/demo/batches/nightWatch.js';
import { pumpHallOne } from '../../server/demo/batches/pumpHallOne.js';
import { pumpHallTwo } from '../../server/demo/batches/pumpHallTwo.js';
import type { DemoBatch } from '../../server/demo/DemoBatch.js';

const reduced = (batch: DemoBatch, fileNames: string[]): DemoBatch => ({
  ...batch,
  captures: batch.captures.filter(({ fileName }) => fileNames.includes(fileName)),
});

/** A part of the demo that shows every verdict and a failed file, and is screened within seconds. */
export const browserProjects: DemoProject[] = [
  {
    name: 'Ferrow Quay, pump halls',
    description: 'Autumn survey of the drainage pumps.',
    members: {
      'ines@marram.example': ['analyst'],
      'tomas@marram.example': ['reviewer'],
      'yara@marram.example': ['qaManager'],
      'ove@marram.example': ['analyst', 'reviewer', 'qaManager'],
    },
    uploaderEmail: 'ines@marram.example',
    thresholds: null,
    batches: [
      reduced(pumpHallOne, ['pump-1/drive-end.wav', 'pump-4/drive-end.wav', 'pump-4/start-attempt.wav']),
      reduced(pumpHallTwo, ['pump-6/drive-end.wav', 'pump-6/gearbox.wav']),
      reduced(nightWatch, ['floor-1.csv', 'floor-8-words.csv']),
    ],
  },
  {
    name: 'Somebody else’s project',
    description: 'Nobody of the survey but the administrator may know of it.',
    members: { 'ove@marram.example': ['analyst'] },
    uploaderEmail: 'ove@marram.example',
    thresholds: null,
    batches: [],
  },
];
