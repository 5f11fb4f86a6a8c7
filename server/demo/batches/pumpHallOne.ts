import type { DemoBatch, DemoCapture } from '../DemoBatch.js';
import { sum } from '../signals/alter.js';
import { encodeWav } from '../signals/encodeWav.js';
import { butterworth, fallingOrders, machineSignal } from '../signals/machine.js';
import { filteredNoise, whiteNoise } from '../signals/noise.js';
import type { SeededRandom } from '../signals/SeededRandom.js';

const sampleRateHz = 5120;
const durationS = 8;
const frames = sampleRateHz * durationS;
const speedHz = 24.6;

/** A pump behind a steep filter: nothing beyond 0.4 of the rate reaches the converter. */
function wellRecorded(random: SeededRandom, rms = 0.08): Float64Array {
  const orders = fallingOrders(40, 0.05, 0.6);
  const gainAt = butterworth(30, 1900);
  return sum(
    machineSignal({ sampleRateHz, durationS, speedHz, wanderShare: 0.003, orders, gainAt }, random),
    filteredNoise(frames, rms, 0.36, random),
    whiteNoise(frames, 2e-6, random),
  );
}

const good = (fileName: string, position: string, decision?: DemoCapture['decision']): DemoCapture => ({
  fileName,
  acquisition: { position },
  make: (random) => encodeWav([wellRecorded(random)], sampleRateHz),
  ...(decision ? { decision } : {}),
});

const accepted = { decision: 'accept', reason: 'Band edge protected, level as in the spring survey.' } as const;

/** The way it should be: every capture behind the logger's own filter, one of them short and one with a gentle filter. */
export const pumpHallOne: DemoBatch = {
  name: 'Pump hall 1, bearings',
  seed: 101,
  isComplete: true,
  acquisition: {
    sampleRateHz,
    highestFrequencyHz: 1500,
    nominalSpeedHz: speedHz,
    filter: { type: 'elliptic', order: 8, cornerHz: 1850, rippleDb: 0.1, stopbandDb: 80 },
    supplyHz: 50,
    logger: 'Logger M4',
    notes: 'Autumn survey, pumps at duty point.',
  },
  captures: [
    good('pump-1/drive-end.wav', 'Pump 1, drive end', accepted),
    good('pump-1/free-end.wav', 'Pump 1, free end', accepted),
    good('pump-2/drive-end.wav', 'Pump 2, drive end', accepted),
    good('pump-2/free-end.wav', 'Pump 2, free end'),
    good('pump-3/drive-end.wav', 'Pump 3, drive end'),
    {
      fileName: 'pump-3/both-ends.wav',
      acquisition: { position: 'Pump 3, both ends' },
      make: (random) => encodeWav([wellRecorded(random), wellRecorded(random, 0.05)], sampleRateHz),
    },
    {
      fileName: 'pump-4/drive-end.wav',
      acquisition: { position: 'Pump 4, drive end', filter: { type: 'butterworth', order: 2, cornerHz: 1200 } },
      make: (random) => {
        const orders = fallingOrders(40, 0.05, 0.6);
        const gainAt = butterworth(2, 1200);
        const tones = machineSignal({ sampleRateHz, durationS, speedHz, wanderShare: 0.003, orders, gainAt }, random);
        const noise = sum(filteredNoise(frames, 0.08, 0.2, random), whiteNoise(frames, 4e-4, random));
        return encodeWav([sum(tones, noise)], sampleRateHz);
      },
      decision: {
        decision: 'acceptTo',
        limitHz: 800,
        reason: 'Only the lower orders are needed here; the gentle filter does not protect more.',
      },
    },
    {
      fileName: 'pump-4/start-attempt.wav',
      acquisition: { position: 'Pump 4, drive end' },
      make: (random) => encodeWav([wellRecorded(random).slice(0, sampleRateHz / 4)], sampleRateHz),
      decision: { decision: 'exclude', reason: 'The pump tripped after a quarter of a second.' },
    },
  ],
};
