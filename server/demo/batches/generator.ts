import type { DemoBatch } from '../DemoBatch.js';
import { overdriven, scaled, sum, withDropouts } from '../signals/alter.js';
import { encodeWav } from '../signals/encodeWav.js';
import { fallingOrders, machineSignal } from '../signals/machine.js';
import { filteredNoise, whiteNoise } from '../signals/noise.js';
import type { SeededRandom } from '../signals/SeededRandom.js';

const sampleRateHz = 8192;
const durationS = 6;
const frames = sampleRateHz * durationS;
const speedHz = 25;

const loadTest = (random: SeededRandom): Float64Array =>
  sum(
    machineSignal(
      {
        sampleRateHz,
        durationS,
        speedHz,
        wanderShare: 0.001,
        orders: fallingOrders(60, 0.08, 0.5),
        gainAt: (frequencyHz) => (frequencyHz < 2600 ? 1 : 0),
      },
      random,
    ),
    filteredNoise(frames, 0.06, 0.36, random),
    whiteNoise(frames, 2e-6, random),
  );

const withOffset = (samples: Float64Array, offset: number): Float64Array => samples.map((value) => value + offset);

function withoutHeaderLength(file: Buffer): Buffer {
  return file.subarray(0, Math.floor(file.length * 0.6));
}

/** The load test of the standby generator: levels set too high, cables loose, a card pulled out too early. */
export const generator: DemoBatch = {
  name: 'Standby generator, load test',
  seed: 105,
  isComplete: true,
  acquisition: {
    sampleRateHz,
    highestFrequencyHz: 2000,
    nominalSpeedHz: speedHz,
    filter: { type: 'elliptic', order: 8, cornerHz: 2950, rippleDb: 0.1, stopbandDb: 80 },
    supplyHz: 50,
    logger: 'Logger M4',
  },
  captures: [
    {
      fileName: 'quarter-load.wav',
      acquisition: { position: 'Generator frame' },
      make: (random) => encodeWav([loadTest(random)], sampleRateHz),
    },
    {
      fileName: 'half-load.wav',
      acquisition: { position: 'Generator frame' },
      make: (random) => encodeWav([withOffset(loadTest(random), 0.2)], sampleRateHz),
      decision: { decision: 'accept', reason: 'The offset of the sensor does no harm here.' },
    },
    {
      fileName: 'full-load-clipped.wav',
      acquisition: { position: 'Generator frame' },
      make: (random) => encodeWav([overdriven(loadTest(random), 6)], sampleRateHz, '16'),
      decision: { decision: 'retake', reason: 'Clipped. Set the range one step higher and record again.' },
    },
    {
      fileName: 'full-load-dropouts.wav',
      acquisition: { position: 'Generator foot' },
      make: (random) => encodeWav([withDropouts(loadTest(random), 9, 400, random)], sampleRateHz),
    },
    {
      fileName: 'idle-coarse-steps.wav',
      acquisition: { position: 'Generator foot' },
      make: (random) => encodeWav([scaled(loadTest(random), 3e-4)], sampleRateHz, '16'),
    },
    {
      fileName: 'cable-off.wav',
      acquisition: { position: 'Exhaust' },
      make: () => encodeWav([new Float64Array(frames)], sampleRateHz),
      decision: { decision: 'exclude', reason: 'The cable was off.' },
    },
    {
      fileName: 'wrong-rate-on-sheet.wav',
      acquisition: { position: 'Exhaust flange', sampleRateHz: 4096 },
      make: (random) => encodeWav([loadTest(random)], sampleRateHz),
    },
    {
      fileName: 'card-pulled-out.wav',
      acquisition: { position: 'Radiator' },
      make: (random) => withoutHeaderLength(encodeWav([loadTest(random)], sampleRateHz)),
    },
    {
      fileName: 'header-only.wav',
      acquisition: { position: 'Radiator' },
      make: () => encodeWav([new Float64Array(0)], sampleRateHz),
    },
  ],
};
