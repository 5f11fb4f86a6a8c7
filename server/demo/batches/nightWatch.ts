import type { DemoBatch } from '../DemoBatch.js';
import { encodeCsv, evenTimes } from '../signals/encodeCsv.js';
import { sum } from '../signals/alter.js';
import { machineSignal } from '../signals/machine.js';
import { filteredNoise, whiteNoise } from '../signals/noise.js';
import type { SeededRandom } from '../signals/SeededRandom.js';

const sampleRateHz = 200;
const durationS = 60;
const frames = sampleRateHz * durationS;
const columns = ['time [s]', 'vibration [m/s²]'];

function floorVibration(random: SeededRandom): Float64Array {
  const orders = [
    { order: 8.2, amplitude: 0.6 },
    { order: 24.6, amplitude: 0.2 },
  ];
  return sum(
    machineSignal({ sampleRateHz, durationS, speedHz: 1, orders }, random),
    filteredNoise(frames, 0.25, 0.3, random),
    whiteNoise(frames, 2e-5, random),
  );
}

/** A tone of 131 Hz read at random moments: irregular stamps show it where it really is. */
function atRandomMoments(random: SeededRandom): Buffer {
  const timesS = evenTimes(6000, 100).map((timeS) => timeS + random.between(0, 0.008));
  const values = timesS.map((timeS) => Math.sin(2 * Math.PI * 131 * timeS) + 0.2 * random.gaussian());
  return encodeCsv({ columns, timesS, channels: [values] });
}

const jittered = (share: number, random: SeededRandom): Float64Array =>
  evenTimes(frames, sampleRateHz).map((timeS) => timeS + (share / sampleRateHz) * random.gaussian());

/** Exports of the floor sensors as they come: separators, decimal commas, gaps, and files that can't be read. */
export const nightWatch: DemoBatch = {
  name: 'Night watch, exported tables',
  seed: 104,
  isComplete: true,
  acquisition: { highestFrequencyHz: 40, logger: 'Floor sensor', unit: 'm/s²' },
  captures: [
    {
      fileName: 'floor-1.csv',
      acquisition: { position: 'Floor, north' },
      make: (random) =>
        encodeCsv({ columns, timesS: evenTimes(frames, sampleRateHz), channels: [floorVibration(random)] }),
      decision: { decision: 'accept', reason: 'Quiet night, band edge protected.' },
    },
    {
      fileName: 'floor-2-decimal-comma.csv',
      acquisition: { position: 'Floor, east' },
      make: (random) =>
        encodeCsv({
          columns,
          timesS: evenTimes(frames, sampleRateHz),
          channels: [floorVibration(random)],
          separator: ';',
          decimalSign: ',',
          preamble: ['Floor sensor export', 'Sensor 2'],
        }),
    },
    {
      fileName: 'floor-3-jitter.csv',
      acquisition: { position: 'Floor, south' },
      make: (random) => encodeCsv({ columns, timesS: jittered(0.08, random), channels: [floorVibration(random)] }),
    },
    {
      fileName: 'floor-4-gaps.csv',
      acquisition: { position: 'Floor, west' },
      make: (random) => {
        const isKept = (n: number): boolean => !(n > 3000 && n < 3400) && !(n > 9000 && n < 9100);
        const keep = (samples: Float64Array): Float64Array => samples.filter((_, n) => isKept(n));
        return encodeCsv({
          columns,
          timesS: keep(evenTimes(frames, sampleRateHz)),
          channels: [keep(floorVibration(random))],
        });
      },
    },
    {
      fileName: 'floor-5-repeated-stamps.csv',
      acquisition: { position: 'Floor, stairs' },
      make: (random) => {
        const timesS = evenTimes(frames, sampleRateHz);
        for (const row of [700, 701, 5200, 8000]) timesS[row] = timesS[row - 1] ?? 0;
        return encodeCsv({ columns, timesS, channels: [floorVibration(random)] });
      },
    },
    {
      fileName: 'floor-6-random-moments.csv',
      acquisition: { position: 'Floor, switch room', notes: 'Read whenever the bus was free.' },
      make: atRandomMoments,
    },
    {
      fileName: 'floor-7-cut-off.csv',
      acquisition: { position: 'Floor, loft' },
      make: (random) => {
        const whole = encodeCsv({
          columns,
          timesS: evenTimes(4000, sampleRateHz),
          channels: [floorVibration(random)],
        });
        return Buffer.from(whole.toString('utf8').replace('\n5.000000,', '\n5.000000,sensor lost,'));
      },
    },
    {
      fileName: 'floor-8-words.csv',
      acquisition: { position: 'Floor, cellar' },
      make: () => Buffer.from('time [s],vibration [m/s²]\nno data recorded\nbattery empty\n'),
    },
    {
      fileName: 'floor-9-no-rate.csv',
      acquisition: { position: 'Floor, gate' },
      make: (random) =>
        Buffer.from(
          `vibration [m/s²]\n${Array.from(floorVibration(random), (value) => value.toFixed(6)).join('\n')}\n`,
        ),
    },
  ],
};
