import { describe, expect, it } from 'vitest';
import { defaultThresholds } from '../../../shared/schemas/thresholds.js';
import type { FoldEvidence } from '../../../shared/screening/FoldEvidence.js';
import { isFoldedTone } from '../../../shared/screening/FoldEvidence.js';
import { judgeTones } from '../../../shared/screening/judgeTones.js';
import { measureCapture } from '../../../worker/measure/measureCapture.js';
import { memorySource } from '../../support/memorySource.js';
import { seededNoise } from '../../support/seededNoise.js';

const fs = 2000;
const count = 16_000;

interface Line {
  frequencyHz: number;
  amplitude: number;
  decayPerS?: number;
}

function judge(lines: Line[], options: { clipAt?: number; fs?: number; wander?: number } = {}): FoldEvidence {
  const rateHz = options.fs ?? fs;
  // A speed that swings slowly: all lines in proportion.
  const timeAt = (n: number): number => {
    const t = n / rateHz;
    return t + ((options.wander ?? 0) * Math.sin(2 * Math.PI * 0.21 * t + 1)) / (2 * Math.PI * 0.21);
  };
  const samples = seededNoise(count, 5).map((value, n) => {
    let sum = 1e-3 * value;
    lines.forEach(({ frequencyHz, amplitude, decayPerS }, index) => {
      const level = decayPerS === undefined ? amplitude : amplitude * Math.exp((-decayPerS * n) / rateHz);
      sum += level * Math.cos(2 * Math.PI * frequencyHz * timeAt(n) + index * index);
    });
    return options.clipAt === undefined ? sum : Math.max(-options.clipAt, Math.min(options.clipAt, sum));
  });
  const record = measureCapture(memorySource([samples], rateHz), {})[0]?.record;
  if (record === undefined) throw new Error('nothing measured');
  return judgeTones(record, defaultThresholds, {});
}

const harmonics = (fundamentalHz: number, last: number, step = 1): Line[] =>
  Array.from({ length: Math.ceil(last / step) }, (_, index) => ({
    frequencyHz: (1 + index * step) * fundamentalHz,
    amplitude: 0.5 / (1 + index * step),
  }));

const foldedTones = ({ tones }: FoldEvidence) => tones.filter(isFoldedTone);

describe('judgeTones', () => {
  // 42 × 24.13 Hz = 1013.46 Hz lands on 2000 − 1013.46 = 986.54 Hz.
  it('finds the folded members of a steady family at their true frequencies', () => {
    const evidence = judge(harmonics(24.13, 70));
    const tone = foldedTones(evidence).find(({ frequencyHz }) => Math.abs(frequencyHz - 986.54) < 0.05);
    expect(tone?.trueFrequencyHz).toBeCloseTo(1013.46, 1);
    expect(evidence.findings.some(({ kind, severity }) => kind === 'foldedTone' && severity === 'fold')).toBe(true);
  });

  it('finds them where the speed swings, by place and by the way they wander', () => {
    const evidence = judge(harmonics(24.13, 70), { wander: 1e-4 });
    expect(foldedTones(evidence).length).toBeGreaterThan(5);
    expect(foldedTones(evidence).every(({ trueFrequencyHz }) => (trueFrequencyHz ?? 0) > fs / 2)).toBe(true);
  });

  const lookAlikes: [string, () => FoldEvidence][] = [
    ['a supply with odd harmonics that wanders', () => judge(harmonics(50.02, 23, 2), { fs: 6400, wander: 2e-4 })],
    ['harmonics that end right below fs/2', () => judge(harmonics(24.13, 41))],
    ['two machines', () => judge([...harmonics(24.13, 30), ...harmonics(37.91, 24)], { wander: 1e-4 })],
    [
      'a carrier with side-bands at the shaft',
      () =>
        judge([
          ...harmonics(24.13, 12),
          ...Array.from({ length: 9 }, (_, j) => ({ frequencyHz: 613.7 + (j - 4) * 24.13, amplitude: 0.05 })),
        ]),
    ],
    [
      'spurs of a converter at fs/4 and fs/3',
      () =>
        judge([
          ...harmonics(24.13, 12),
          { frequencyHz: fs / 4, amplitude: 0.02 },
          { frequencyHz: fs / 3, amplitude: 0.02 },
        ]),
    ],
    [
      'a stiff string',
      () =>
        judge(
          Array.from({ length: 19 }, (_, n) => ({
            frequencyHz: 45.3 * (n + 1) * Math.sqrt(1 + 4e-4 * (n + 1) ** 2),
            amplitude: 0.3 / (n + 1),
            decayPerS: 0.2,
          })),
        ),
    ],
    [
      'a bell',
      () =>
        judge(
          Array.from({ length: 8 }, (_, n) => ({ frequencyHz: 61 * (n + 1) ** 1.3, amplitude: 0.1, decayPerS: 0.4 })),
        ),
    ],
  ];
  it.each(lookAlikes)('does not call %s folded', (_, made) => {
    const { findings, shownConfidence } = made();
    expect(findings.filter(({ kind, severity }) => kind === 'foldedTone' && severity === 'fold')).toEqual([]);
    expect(shownConfidence).toBe(0);
  });

  it('does not hold the folded harmonics of a clipped tone against the source', () => {
    const evidence = judge([{ frequencyHz: 88.31, amplitude: 1.4 }], { clipAt: 1 });
    expect(foldedTones(evidence)).toEqual([]);
    const finding = evidence.findings.find(({ kind }) => kind === 'clippingHarmonics');
    expect(finding?.severity).toBe('limit');
    // 13 × 88.31 Hz = 1148.03 Hz lands on 851.97 Hz.
    const tone = evidence.tones.find(({ frequencyHz }) => Math.abs(frequencyHz - 851.97) < 0.05);
    expect(tone?.explainedBy).toMatch(/^clipping: 13 × 88\.3/);
  });
});
