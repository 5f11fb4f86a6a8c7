import type { DemoBatch } from '../DemoBatch.js';
import { dropSamples, sum } from '../signals/alter.js';
import { encodeWav } from '../signals/encodeWav.js';
import { fallingOrders, machineSignal } from '../signals/machine.js';
import { filteredNoise, whiteNoise } from '../signals/noise.js';
import type { SeededRandom } from '../signals/SeededRandom.js';

const sampleRateHz = 2048;
const durationS = 12;
const frames = sampleRateHz * durationS;

interface Shaft {
  speedHz: number;
  orderCount: number;
  wanderShare: number;
}

/** Orders up to far above half the rate, and no filter in front of the converter. */
const unfiltered = ({ speedHz, orderCount, wanderShare }: Shaft, random: SeededRandom): Float64Array =>
  sum(
    machineSignal(
      { sampleRateHz, durationS, speedHz, wanderShare, orders: fallingOrders(orderCount, 0.12, 0.45) },
      random,
    ),
    filteredNoise(frames, 0.01, 0.3, random),
    whiteNoise(frames, 1e-4, random),
  );

/** A recording at eight times the rate, of which every eighth sample was kept. */
function decimated(random: SeededRandom): Float64Array {
  const fastHz = 8 * sampleRateHz;
  const speedHz = 31.7;
  const shaft = machineSignal(
    { sampleRateHz: fastHz, durationS, speedHz, orders: fallingOrders(90, 0.1, 0.4) },
    random,
  );
  const noise = filteredNoise(shaft.length, 0.05, 0.3, random);
  return dropSamples(sum(shaft, noise), 8);
}

const retake = { decision: 'retake', reason: 'Orders of the shaft fold. Record again with the filter in.' } as const;

/** After the change of loggers: the filter modules stayed in the van. */
export const pumpHallTwo: DemoBatch = {
  name: 'Pump hall 2, after the change of loggers',
  seed: 102,
  isComplete: true,
  acquisition: {
    sampleRateHz,
    highestFrequencyHz: 800,
    filter: { type: 'none' },
    supplyHz: 50,
    logger: 'Logger K2',
  },
  captures: [
    {
      fileName: 'pump-5/drive-end.wav',
      acquisition: { position: 'Pump 5, drive end', nominalSpeedHz: 24.8 },
      make: (random) =>
        encodeWav([unfiltered({ speedHz: 24.8, orderCount: 70, wanderShare: 0.002 }, random)], sampleRateHz),
      decision: retake,
    },
    {
      fileName: 'pump-5/free-end.wav',
      acquisition: { position: 'Pump 5, free end', nominalSpeedHz: 24.8 },
      make: (random) =>
        encodeWav([unfiltered({ speedHz: 24.8, orderCount: 60, wanderShare: 0.004 }, random)], sampleRateHz),
      decision: retake,
    },
    {
      fileName: 'pump-6/drive-end.wav',
      acquisition: { position: 'Pump 6, drive end', nominalSpeedHz: 47.3 },
      make: (random) =>
        encodeWav([unfiltered({ speedHz: 47.3, orderCount: 40, wanderShare: 0 }, random)], sampleRateHz),
    },
    {
      fileName: 'pump-6/gearbox.wav',
      acquisition: {
        position: 'Pump 6, gearbox',
        nominalSpeedHz: 19.4,
        sources: [{ name: 'Tooth mesh, 61 teeth', frequencyHz: 61 * 19.4 }],
      },
      make: (random) => {
        const mesh = [{ order: 61, amplitude: 0.2 }, { order: 122, amplitude: 0.08 }, ...fallingOrders(6, 0.1)];
        const machine = { sampleRateHz, durationS, speedHz: 19.4, orders: mesh };
        const noise = sum(filteredNoise(frames, 0.02, 0.3, random), whiteNoise(frames, 1e-4, random));
        return encodeWav([sum(machineSignal(machine, random), noise)], sampleRateHz);
      },
    },
    {
      fileName: 'pump-7/every-eighth-sample.wav',
      acquisition: { position: 'Pump 7, drive end', nominalSpeedHz: 31.7, notes: 'Rate reduced on the logger.' },
      make: (random) => encodeWav([decimated(random)], sampleRateHz),
    },
    {
      fileName: 'pump-8/broadband.wav',
      acquisition: { position: 'Pump 8, suction pipe' },
      make: (random) => encodeWav([whiteNoise(frames, 0.15, random)], sampleRateHz),
    },
    {
      fileName: 'pump-8/filter-in.wav',
      acquisition: { position: 'Pump 8, suction pipe', filter: { type: 'unknown' } },
      make: (random) =>
        encodeWav([sum(filteredNoise(frames, 0.12, 0.4, random), whiteNoise(frames, 2e-6, random))], sampleRateHz),
    },
  ],
};
