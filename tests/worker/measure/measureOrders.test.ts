import { describe, expect, it } from 'vitest';
import { defaultThresholds } from '../../../shared/schemas/thresholds.js';
import type { FoldEvidence } from '../../../shared/screening/FoldEvidence.js';
import { judgeOrders } from '../../../shared/screening/judgeOrders.js';
import { measureCapture } from '../../../worker/measure/measureCapture.js';
import { measureOrders } from '../../../worker/measure/measureOrders.js';
import { seededRandom } from '../../../worker/dsp/seededRandom.js';
import { buildRecord } from '../../support/buildRecord.js';
import { memorySource } from '../../support/memorySource.js';
import { seededNoise } from '../../support/seededNoise.js';
import { shaftOrders, turningLines, type TurningLine } from '../../support/turningMachine.js';

const sampleRateHz = 2000;
const length = 16_384;
/** Below this share of the rate everything stays in band. */
const inBand = 0.46;

function judge(samples: Float64Array): FoldEvidence {
  const orders = measureOrders(samples, { sampleRateHz, highestHz: 1.5 * sampleRateHz, fromS: 0 });
  const power = samples.reduce((sum, value) => sum + value * value, 0) / samples.length;
  const level = {
    mean: 0,
    rms: Math.sqrt(power),
    minimum: -1,
    maximum: 1,
    powerDb: 10 * Math.log10(power),
    kurtosis: 3,
  };
  return judgeOrders(
    buildRecord({ sampleRateHz, level, orders: orders === null ? null : [orders] }),
    defaultThresholds,
    {},
  );
}

describe('measureOrders', () => {
  it('finds the folded orders of a shaft whose speed drifts by 3 %, with their true frequencies and numbers', () => {
    const fundamental = 0.012;
    const { tones, findings } = judge(
      turningLines(
        length,
        shaftOrders(fundamental, (tau) => 1 + 0.015 * tau, 70),
        20,
      ),
    );
    expect(findings.map(({ kind }) => kind)).toEqual(['foldedOrder']);
    expect(findings[0]).toMatchObject({ severity: 'fold', evidence: { fundamentalHz: expect.closeTo(24, 1) } });
    expect(tones.length).toBeGreaterThan(15);
    // Nearer to the fold an order is folded for a part of the time only, and its middle lies elsewhere.
    const whole = tones.filter(
      (tone) => tone.confidence > 0.95 && (tone.trueFrequencyHz ?? 0) > 1.04 * (sampleRateHz / 2),
    );
    expect(whole.length).toBeGreaterThan(15);
    for (const tone of whole) {
      const order = Math.round((tone.trueFrequencyHz ?? 0) / (fundamental * sampleRateHz));
      expect(tone.trueFrequencyHz).toBeGreaterThan(sampleRateHz / 2);
      expect(Math.abs((tone.trueFrequencyHz ?? 0) - order * fundamental * sampleRateHz)).toBeLessThan(1.5);
      expect(tone.frequencyHz).toBeCloseTo(sampleRateHz - (tone.trueFrequencyHz ?? 0), 6);
    }
  });

  it.each([
    ['wanders by 0.3 %', (tau: number) => 1 + 0.003 * Math.sin(5 * tau + 1)],
    ['swings by 5 %', (tau: number) => 1 + 0.05 * Math.sin(5 * tau + 1)],
    ['runs up threefold', (tau: number) => 1 + 0.5 * tau],
    ['coasts down', (tau: number) => Math.exp(-0.4 * tau)],
  ])('finds folded orders when the speed %s', (_, speed) => {
    const { findings } = judge(turningLines(length, shaftOrders(0.0125, speed, 66), 25, 2));
    expect(findings.map(({ kind, severity }) => [kind, severity])).toContainEqual(['foldedOrder', 'fold']);
  });

  it('says nothing of the same machine behind a filter, or of a steady one', () => {
    const drifting = shaftOrders(0.0125, (tau) => 1 + 0.015 * tau, 66, inBand);
    expect(judge(turningLines(length, drifting, 25)).findings).toEqual([]);
    const steady = shaftOrders(0.0125, () => 1, 66);
    expect(judge(turningLines(length, steady, 25)).findings).toEqual([]);
  });

  it.each([
    ['linear', (tau: number) => 0.15 + 0.3 * (tau + 1)],
    ['logarithmic', (tau: number) => 0.1 * 7 ** ((tau + 1) / 2)],
  ])('finds a %s sweep that runs through half the rate and is reflected', (_, frequency) => {
    const { findings } = judge(turningLines(length, [{ frequency }], 10));
    expect(findings).toMatchObject([{ kind: 'reflectedSweep', severity: 'fold' }]);
    expect(findings[0]?.trueFrequencyHz).toBeGreaterThan(sampleRateHz / 2);
  });

  const still = (share: number): TurningLine => ({ frequency: () => share });
  it.each<[string, TurningLine[]]>([
    ['a falling sweep', [{ frequency: (tau) => 0.26 - 0.2 * tau }]],
    ['crossing sweeps', [{ frequency: (tau) => 0.25 + 0.15 * tau }, { frequency: (tau) => 0.25 - 0.17 * tau }]],
    ['a sweep that turns round below the fold', [{ frequency: (tau) => 0.44 - 0.3 * Math.abs(tau) }]],
    [
      'two machines',
      [
        ...shaftOrders(0.011, (tau) => 1 + 0.06 * tau, 60, inBand),
        ...shaftOrders(0.017, (tau) => 1 - 0.1 * tau, 60, inBand),
      ],
    ],
    ['a passing source', shaftOrders(0.03, (tau) => 1 - (0.3 * tau) / Math.sqrt(1 + 16 * tau * tau), 20, inBand)],
    [
      'a machine beside mains',
      [...shaftOrders(0.011, (tau) => 1 + 0.06 * tau, 60, inBand), ...[1, 3, 5, 7].map((k) => still(0.025 * k))],
    ],
    [
      'a moving carrier with side-bands',
      [-0.012, 0, 0.012].map((side) => ({
        frequency: (tau: number) => 0.2 + side + 0.03 * tau,
      })),
    ],
    [
      'a struck bell',
      [1, 1.18, 1.51, 2, 2.51, 3.01, 4.17, 5.43].map((ratio) => ({
        frequency: () => 0.05 * ratio,
        amplitude: (tau: number) => Math.exp(-3 * (tau + 1)),
      })),
    ],
    ['a tone right below the fold', [still(0.496), still(0.05)]],
  ])('calls nothing folded in %s', (_, lines) => {
    expect(judge(turningLines(length, lines, 30, 5)).findings).toEqual([]);
  });

  it('raises no false alarm in 24 captures of noise and of machines that stay in band', () => {
    const random = seededRandom(11);
    for (let trial = 0; trial < 12; trial++) {
      expect(judge(seededNoise(4096, 100 + trial)).findings).toEqual([]);
      const [depth, pace, phase] = [0.05 * random(), 2 + 8 * random(), 6 * random()];
      const speed = (tau: number): number => 1 + depth * Math.sin(pace * tau + phase);
      const samples = turningLines(4096, shaftOrders(0.015 + 0.02 * random(), speed, 60, inBand), 40 * random(), trial);
      expect(judge(samples).findings).toEqual([]);
    }
  });

  it('does not depend on the unit', () => {
    const samples = turningLines(
      8192,
      shaftOrders(0.0125, (tau) => 1 + 0.03 * tau, 66),
      20,
    );
    const kinds = (scale: number): string[] =>
      judge(samples.map((value) => scale * value)).findings.map(({ kind }) => kind);
    expect(kinds(1000)).toEqual(kinds(1));
    expect(kinds(1)).toEqual(['foldedOrder']);
  });

  it('takes the speed from a pulse channel of the same capture', () => {
    const speed = (tau: number): number => 1 + 0.02 * tau;
    let turns = 0.3;
    const pulses = Float64Array.from({ length }, (_, n) => {
      turns += 0.0125 * speed((2 * n) / length - 1);
      return turns - Math.floor(turns) < 0.15 ? 1 : 0;
    });
    const vibration = turningLines(length, shaftOrders(0.0125, speed, 66), 20);
    const measured = measureCapture(memorySource([vibration, pulses], sampleRateHz), {});
    const [law] = measured[0]?.record.orders?.[0]?.laws ?? [];
    expect(law?.mode).toBe('speedChannel');
    expect(law?.pulseHz).toBeCloseTo(25, 0);
    expect(law?.lines.length).toBeGreaterThan(10);
    expect(measured[1]?.record.orders).toEqual([]);
  });

  it('looks no higher than the sensor reaches, and not at all below half the rate', () => {
    const samples = turningLines(
      8192,
      shaftOrders(0.0125, (tau) => 1 + 0.03 * tau, 66),
      20,
    );
    const highest = (sensorBandHz: number): number | undefined =>
      measureCapture(memorySource([samples], sampleRateHz), { sensorBandHz })[0]?.record.orders?.[0]?.highestHz;
    expect(highest(1400)).toBe(1400);
    expect(highest(900)).toBeUndefined();
  });
});
