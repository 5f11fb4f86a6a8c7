import { describe, expect, it } from 'vitest';
import { defaultThresholds } from '../../../shared/schemas/thresholds.js';
import { foldScore } from '../../../shared/screening/foldScore.js';
import { judgeIrregular } from '../../../shared/screening/judgeIrregular.js';
import type {
  BeyondHalfMeasurement,
  IrregularMeasurement,
  IrregularTone,
} from '../../../shared/screening/MeasurementRecord.js';
import { normalProbability } from '../../../shared/screening/normalProbability.js';

const tone = (frequencyHz: number, changes: Partial<IrregularTone> = {}): IrregularTone => ({
  frequencyHz,
  uncertaintyHz: 1e-4,
  levelDb: -10,
  standsOutDb: 30,
  logFalseAlarm: -500,
  heldOutGainDb: 3,
  rivalHz: 12,
  rivalLogRatio: 300,
  ...changes,
});
const quiet: BeyondHalfMeasurement = { toHz: 300, beyondDb: -90, errorDb: -92, flatDb: -90, heldOutLogRatio: -5 };
const measured = (tones: IrregularTone[], beyond: BeyondHalfMeasurement | null = quiet): IrregularMeasurement => ({
  meanRateHz: 100,
  reachHz: 300,
  limitedBy: 'grid',
  tones,
  totalDb: -5,
  beyond,
});
const judge = (measurement: IrregularMeasurement, sheet = {}): ReturnType<typeof judgeIrregular> =>
  judgeIrregular(measurement, defaultThresholds, sheet);
const scoreOf = (measurement: IrregularMeasurement): number => {
  const { logRatio, shownConfidence } = judge(measurement);
  return foldScore(null, logRatio, shownConfidence)?.score ?? Number.NaN;
};
const kinds = (measurement: IrregularMeasurement): string[] =>
  judge(measurement).findings.map(({ kind, severity }) => `${kind}:${severity}`);

describe('judgeIrregular', () => {
  it('counts a tone beyond half the mean rate as folded, at its true frequency, and leaves those in band', () => {
    const { tones, findings, shownConfidence } = judge(measured([tone(12), tone(71)]));
    expect(tones.map(({ explanation }) => explanation)).toEqual(['unexplained', 'foldedSource']);
    expect(tones[1]).toMatchObject({ frequencyHz: 71, trueFrequencyHz: 71 });
    expect(tones[1]?.explainedBy).toContain('beyond half the mean rate');
    expect(findings[0]).toMatchObject({ kind: 'foldedTone', severity: 'fold', frequencyHz: 71 });
    expect(shownConfidence).toBeGreaterThan(0.99);
    expect(scoreOf(measured([tone(12), tone(71)]))).toBeGreaterThan(0.99);
  });

  it('names the source of the sheet', () => {
    const { tones } = judge(measured([tone(12), tone(71)]), {
      sources: [{ name: 'pump', frequencyHz: 71 }, { frequencyHz: 12 }],
    });
    expect(tones.map(({ explanation }) => explanation)).toEqual(['knownSource', 'foldedSource']);
    expect(tones[1]?.explainedBy).toBe('source pump (71 Hz)');
  });

  it('does not count a tone that may as well be one in band, and says which', () => {
    const open = measured([tone(71, { rivalHz: 29, rivalLogRatio: 0.5 })]);
    expect(judge(open).tones[0]).toMatchObject({ explanation: 'unexplained', candidatesHz: [29, 71] });
    expect(kinds(open)).toEqual(['irregularStamps:unproven']);
    const either = measured([tone(71, { rivalHz: 129, rivalLogRatio: 0.5 })]);
    expect(judge(either).tones[0]).toMatchObject({ explanation: 'foldedSource', candidatesHz: [71, 129] });
  });

  it('counts neither what noise may give nor what may lie at half the mean rate', () => {
    expect(kinds(measured([tone(71, { logFalseAlarm: -1 })]))).toEqual(['irregularStamps:unproven']);
    expect(kinds(measured([tone(50.0002)]))).toEqual(['irregularStamps:unproven']);
    expect(kinds(measured([tone(50.0002, { uncertaintyHz: 1e-6 })]))).toContain('foldedTone:fold');
  });

  it('only notes a tone far below the protection asked for', () => {
    expect(kinds(measured([tone(71, { levelDb: -75 })]))).toContain('foldedTone:note');
    expect(scoreOf(measured([tone(71, { levelDb: -75 })]))).toBeLessThan(0.05);
  });

  it('shows broadband content that held-out stretches confirm', () => {
    const broad = { ...quiet, beyondDb: -20, errorDb: -33, heldOutLogRatio: 40 };
    expect(kinds(measured([], broad))).toContain('foldedShare:fold');
    expect(scoreOf(measured([], broad))).toBeGreaterThan(0.99);
    expect(kinds(measured([], { ...broad, beyondDb: -46, errorDb: -60 }))).toContain('foldedShare:note');
    for (const change of [{ heldOutLogRatio: 8 }, { errorDb: -24 }]) {
      expect(kinds(measured([], { ...broad, ...change }))).toEqual(['irregularStamps:unproven']);
    }
  });

  it('scores lower the less is left possible beyond half the mean rate', () => {
    const [none, hidden, unknown] = [quiet, { ...quiet, flatDb: -15 }, null].map((beyond) =>
      scoreOf(measured([tone(12)], beyond)),
    ) as [number, number, number];
    expect(none).toBeLessThan(0.01);
    expect(hidden).toBeGreaterThan(none);
    expect(hidden).toBeLessThan(0.15);
    expect(unknown).toBeCloseTo(hidden, 2);
  });

  it('says how far it reaches, why, and what is left possible', () => {
    const { findings } = judge(measured([tone(12)]));
    expect(findings[0]?.text).toContain('300 Hz, where all intervals are multiples of one step');
    // What was seen, what is the same everywhere, and twice the error.
    const mostDb = 10 * Math.log10(10 ** -9 + 10 ** -9 + 2 * 10 ** -9.2);
    expect(findings[0]?.evidence['mostBeyondHalfDb']).toBeCloseTo(mostDb, 6);
  });

  it('judges records from before the share was measured', () => {
    const { rivalHz: _rival, rivalLogRatio: _ratio, ...older } = tone(71);
    const { tones, shownConfidence } = judge({
      meanRateHz: 100,
      reachHz: 300,
      limitedBy: 'budget',
      tones: [tone(12), older],
    });
    expect(tones[1]?.explanation).toBe('foldedSource');
    expect(shownConfidence).toBeGreaterThan(0.99);
  });
});

describe('normalProbability', () => {
  // Source: Abramowitz & Stegun 1964, table 26.1.
  it.each([
    [0, 0.5],
    [1, 0.8413447],
    [-1.96, 0.0249979],
    [3, 0.9986501],
  ])('is the tabulated value at %d', (z, probability) => {
    expect(normalProbability(z)).toBeCloseTo(probability, 6);
  });
});
