import { describe, expect, it } from 'vitest';
import type { IrregularMeasurement } from '../../../shared/screening/MeasurementRecord.js';
import { createIrregularMeter } from '../../../worker/measure/measureIrregular.js';
import { seededNoise } from '../../support/seededNoise.js';
import { unevenKinds, unevenStamps } from '../../support/unevenStamps.js';

const rateHz = 100;
const samples = 1500;
type Line = [hz: number, amplitude: number, phase: number];
const inBand: Line[] = [
  [12.3, 1, 0.3],
  [37.77, 0.7, 1],
];
const beyond: Line = [71.7, 0.5, 2];

const tonesAt = (times: Float64Array, lines: Line[], noise: number, seed = 3): Float64Array =>
  seededNoise(times.length, seed).map((value, n) =>
    lines.reduce(
      (sum, [hz, amplitude, phase]) => sum + amplitude * Math.cos(2 * Math.PI * hz * (times[n] as number) + phase),
      noise * value,
    ),
  );
const measure = (times: Float64Array, values: Float64Array, sensorBandHz: number | null = null): IrregularMeasurement =>
  createIrregularMeter(times, { roundingStepS: 1e-7, sensorBandHz })(values);
const hertz = ({ tones }: IrregularMeasurement): number[] =>
  tones.map(({ frequencyHz }) => Number(frequencyHz.toFixed(2))).sort((a, b) => a - b);

describe('createIrregularMeter', () => {
  it.each(unevenKinds)('recovers true frequencies from %s, and none that is not there', (kind) => {
    const times = unevenStamps(kind, samples, rateHz);
    const folded = measure(times, tonesAt(times, [...inBand, beyond], 0.1));
    expect(hertz(folded)).toEqual([12.3, 37.77, 71.7]);
    folded.tones.forEach(({ frequencyHz, uncertaintyHz }) => {
      const trueHz = [12.3, 37.77, 71.7].find((hz) => Math.abs(hz - frequencyHz) < 0.01) ?? Number.NaN;
      expect(Math.abs(frequencyHz - trueHz)).toBeLessThan(4 * uncertaintyHz);
      expect(uncertaintyHz).toBeLessThan(1e-3);
    });
    expect(hertz(measure(times, tonesAt(times, inBand, 0.1)))).toEqual([12.3, 37.77]);
    expect(measure(times, tonesAt(times, [], 1)).tones).toEqual([]);
  });

  it('reaches to the half rate of the grid that lies under missing rows and bursts, and no further', () => {
    for (const kind of ['missing', 'evenBursts'] as const) {
      const times = unevenStamps(kind, samples, rateHz);
      const least = times.reduce(
        (smallest, time, n) => (n === 0 ? smallest : Math.min(smallest, time - (times[n - 1] as number))),
        Number.POSITIVE_INFINITY,
      );
      const { reachHz, limitedBy } = measure(times, tonesAt(times, inBand, 0.1));
      expect(limitedBy).toBe('grid');
      expect(reachHz * 2 * least).toBeCloseTo(1, 2);
    }
  });

  it('reaches no further than the sensor', () => {
    const times = unevenStamps('poisson', samples, rateHz);
    expect(measure(times, tonesAt(times, inBand, 0.1), 60)).toMatchObject({ reachHz: 60, limitedBy: 'sensorBand' });
  });

  it('finds the same whenever the capture begins and whatever its unit', () => {
    const times = unevenStamps('largeJitter', samples, rateHz);
    const values = tonesAt(times, [...inBand, beyond], 0.1);
    const one = measure(times, values);
    const other = measure(
      times.map((time) => time + 4096),
      values.map((value) => 1024 * value + 3072),
    );
    expect(other.tones).toHaveLength(3);
    other.tones.forEach((tone, index) => {
      const twin = one.tones[index];
      expect(tone.frequencyHz).toBeCloseTo(twin?.frequencyHz ?? Number.NaN, 6);
      expect(tone.levelDb - 20 * Math.log10(1024)).toBeCloseTo(twin?.levelDb ?? Number.NaN, 4);
      expect(tone.logFalseAlarm / (twin?.logFalseAlarm ?? Number.NaN)).toBeCloseTo(1, 4);
    });
    expect(other.beyond?.beyondDb).toBeCloseTo(one.beyond?.beyondDb ?? Number.NaN, 1);
  });

  // Source: Kay 1993, eq. 3.41, for the samples used: var(f) ≥ 12·fs²/(4π²·η·N·(N²−1)).
  it('is as exact as the Cramér-Rao bound allows, and says so', () => {
    const errors: number[] = [];
    const stated: number[] = [];
    const noise = 0.3;
    for (let run = 0; run < 12; run++) {
      const times = unevenStamps('largeJitter', 400, rateHz, 11 + run);
      const found = measure(times, tonesAt(times, [[71.7, 1, run]], noise, 200 + run)).tones;
      expect(found).toHaveLength(1);
      errors.push((found[0]?.frequencyHz ?? 0) - 71.7);
      stated.push(found[0]?.uncertaintyHz ?? 0);
    }
    const boundHz = Math.sqrt((12 * rateHz ** 2) / (4 * Math.PI ** 2 * (1 / (2 * noise ** 2)) * 400 * (400 ** 2 - 1)));
    const rmsHz = Math.sqrt(errors.reduce((sum, error) => sum + error * error, 0) / errors.length);
    expect(rmsHz / boundHz).toBeGreaterThan(0.6);
    expect(rmsHz / boundHz).toBeLessThan(1.5);
    expect(stated.reduce((sum, value) => sum + value, 0) / stated.length / boundHz).toBeCloseTo(1, 0);
  });

  it('names what else a tone may be where the stamps leave it open', () => {
    const times = unevenStamps('smallJitter', 300, rateHz);
    const even = times.map((_, n) => n / rateHz + (n % 7 === 3 ? 4e-5 : 0));
    const [tone] = measure(even, tonesAt(even, [[12.3, 1, 0]], 0.3)).tones;
    expect(tone?.rivalLogRatio).toBeLessThan(3);
    const [clear] = measure(times, tonesAt(times, [[12.3, 1, 0]], 0.1)).tones;
    expect(clear?.rivalLogRatio).toBeGreaterThan(10);
  });

  it('measures nothing in silence and in a handful of samples', () => {
    const times = unevenStamps('poisson', 200, rateHz);
    expect(measure(times, new Float64Array(200).fill(3))).toMatchObject({ tones: [], beyond: null });
    expect(measure(times.slice(0, 20), seededNoise(20)).tones).toEqual([]);
  });
});
