import type { DemoBatch, DemoCapture } from '../DemoBatch.js';
import { dropSamples, sum } from '../signals/alter.js';
import { encodeWav } from '../signals/encodeWav.js';
import { machineSignal } from '../signals/machine.js';
import { filteredNoise, whiteNoise } from '../signals/noise.js';
import { SeededRandom } from '../signals/SeededRandom.js';

const durationS = 12;

interface Source {
  frequencyHz: number;
  amplitude: number;
}

interface Event {
  seed: number;
  /** A multiple of both rates. */
  eventRateHz: number;
  sources: readonly Source[];
}

/** What happens at the machine, the same for both loggers: its lines, and a rumble that dies away below either fs/2. */
function makeEvent({ seed, eventRateHz, sources }: Event): Float64Array {
  const random = new SeededRandom(seed);
  const orders = sources.map(({ frequencyHz, amplitude }) => ({ order: frequencyHz, amplitude }));
  return sum(
    machineSignal({ sampleRateHz: eventRateHz, durationS, speedHz: 1, orders }, random),
    filteredNoise(eventRateHz * durationS, 0.02, 150 / eventRateHz, random),
  );
}

/** The event as a logger without a filter takes it: what lies above half the lower rate moves between the two. */
function atRate(sampleRateHz: number, event: Event, random: SeededRandom): Float64Array {
  const taken = dropSamples(makeEvent(event), event.eventRateHz / sampleRateHz);
  return sum(taken, whiteNoise(taken.length, 1e-4, random));
}

function pair(name: string, position: string, rates: readonly [number, number], event: Event): DemoCapture[] {
  const fileOf = (rateHz: number): string => `${name}/at-${rateHz}-hz.wav`;
  return rates.map((sampleRateHz, index) => ({
    fileName: fileOf(sampleRateHz),
    acquisition: { sampleRateHz, position, pair: name, companion: fileOf(rates[1 - index] ?? sampleRateHz) },
    make: (random) => encodeWav([atRate(sampleRateHz, event, random)], sampleRateHz),
  }));
}

/** Pairs of captures of the same event at two rates, made to find out which lines stay where they are. */
export const twoRates: DemoBatch = {
  name: 'Gearbox, pairs at two rates',
  seed: 103,
  isComplete: true,
  acquisition: { highestFrequencyHz: 400, filter: { type: 'none' }, logger: 'Logger K2' },
  captures: [
    ...pair('gearbox-a', 'Gearbox A, output shaft', [1000, 1280], {
      seed: 1031,
      eventRateHz: 32_000,
      sources: [
        { frequencyHz: 118.4, amplitude: 0.2 },
        { frequencyHz: 236.8, amplitude: 0.1 },
        { frequencyHz: 734.2, amplitude: 0.12 },
      ],
    }),
    ...pair('gearbox-b', 'Gearbox B, output shaft', [1000, 1280], {
      seed: 1032,
      eventRateHz: 32_000,
      sources: [
        { frequencyHz: 97.1, amplitude: 0.2 },
        { frequencyHz: 194.2, amplitude: 0.1 },
        { frequencyHz: 291.3, amplitude: 0.05 },
      ],
    }),
    ...pair('gearbox-c', 'Gearbox C, input shaft', [1024, 1600], {
      seed: 1033,
      eventRateHz: 25_600,
      sources: [
        { frequencyHz: 143.7, amplitude: 0.15 },
        { frequencyHz: 862.4, amplitude: 0.15 },
      ],
    }),
  ],
};
