import type { DemoBatch, DemoCapture } from '../DemoBatch.js';
import { sum } from '../signals/alter.js';
import { encodeWav } from '../signals/encodeWav.js';
import { machineSignal } from '../signals/machine.js';
import { filteredNoise, whiteNoise } from '../signals/noise.js';

const durationS = 20;
const supplyHz = 50.02;

const oddOrders = (count: number) =>
  Array.from({ length: count }, (_, index) => {
    const order = 2 * index + 1;
    return { order, amplitude: 0.5 / order };
  });

function switchboard(fileName: string, sampleRateHz: number, orderCount: number, position: string): DemoCapture {
  return {
    fileName,
    acquisition: { sampleRateHz, position },
    make: (random) => {
      const frames = sampleRateHz * durationS;
      const machine = { sampleRateHz, durationS, speedHz: supplyHz, wanderShare: 2e-4, orders: oddOrders(orderCount) };
      const noise = sum(filteredNoise(frames, 3e-3, 0.3, random), whiteNoise(frames, 2e-5, random));
      return encodeWav([sum(machineSignal(machine, random), noise)], sampleRateHz);
    },
  };
}

/** Supply voltage at the switchboards; the drives' harmonics reach far beyond half the rate of the slow loggers. */
export const supplyVoltage: DemoBatch = {
  name: 'Switchboards, supply voltage',
  seed: 106,
  isComplete: true,
  acquisition: {
    highestFrequencyHz: 450,
    supplyHz: 50,
    filter: { type: 'unknown' },
    logger: 'Supply logger',
    unit: 'V',
  },
  captures: [
    switchboard('board-1-fast.wav', 6400, 10, 'Board 1'),
    switchboard('board-1-slow.wav', 1210, 25, 'Board 1'),
    switchboard('board-2-slow.wav', 1210, 20, 'Board 2'),
    switchboard('board-3-fast.wav', 6400, 9, 'Board 3'),
  ],
};
