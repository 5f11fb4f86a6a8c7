import { describe, expect, it } from 'vitest';
import type { BeyondHalfMeasurement } from '../../../shared/screening/MeasurementRecord.js';
import { irregularReach } from '../../../worker/measure/irregularReach.js';
import { measureBeyondHalf } from '../../../worker/measure/measureBeyondHalf.js';
import { lowPass, seededNoise } from '../../support/seededNoise.js';
import { seededUniform } from '../../support/seededUniform.js';

const gridHz = 300;
const [shortest, longest] = [1, 5];

/** Picks 1 to 5 steps apart out of an evenly sampled signal: a mean rate of a third of the grid's. */
function picked(signal: Float64Array, seed = 5): { times: Float64Array; values: Float64Array } {
  const random = seededUniform(seed);
  const places: number[] = [];
  for (let n = 200; n < signal.length; n += shortest + Math.floor(random() * longest)) places.push(n);
  return {
    times: Float64Array.from(places, (n) => n / gridHz),
    values: Float64Array.from(places, (n) => signal[n] as number),
  };
}

function measure(signal: Float64Array): BeyondHalfMeasurement {
  const { times, values } = picked(signal);
  const power = values.reduce((sum, value) => sum + value * value, 0) / values.length;
  const search = irregularReach(times, { roundingStepS: 1e-6, sensorBandHz: null });
  return measureBeyondHalf(times, values, search, power) as BeyondHalfMeasurement;
}

describe('measureBeyondHalf', () => {
  const frames = 9000;
  // The mean rate is 100 Hz: half of it is a sixth of the grid's rate.
  const low = lowPass(seededNoise(frames, 1), 0.1);
  const band = (from: number, to: number, seed: number): Float64Array => {
    const noise = seededNoise(frames, seed);
    const [below, above] = [lowPass(noise, from), lowPass(noise, to)];
    return above.map((value, n) => value - (below[n] as number));
  };
  const powerOf = (values: Float64Array): number =>
    values.reduce((sum, value) => sum + value * value, 0) / values.length;

  it.each([-10, -20, -30])('finds %d dB of broadband content beyond half the mean rate', (wantedDb) => {
    const beyond = band(0.25, 0.33, 4);
    const gain = Math.sqrt((10 ** (wantedDb / 10) * powerOf(low)) / powerOf(beyond));
    const { beyondDb, heldOutLogRatio } = measure(low.map((value, n) => value + gain * (beyond[n] as number)));
    expect(Math.abs(beyondDb - wantedDb)).toBeLessThan(2.5);
    expect(heldOutLogRatio).toBeGreaterThan(9.2);
  });

  it('finds nothing above −60 dB in content that ends below half the mean rate', () => {
    const { beyondDb, flatDb, heldOutLogRatio } = measure(low);
    expect(beyondDb).toBeLessThan(-60);
    expect(flatDb).toBeLessThan(-55);
    expect(heldOutLogRatio).toBeLessThan(9.2);
  });

  it('takes white noise for what can not be told from the noise of a converter', () => {
    const { heldOutLogRatio } = measure(seededNoise(frames, 2));
    expect(heldOutLogRatio).toBeLessThan(9.2);
  });
});
