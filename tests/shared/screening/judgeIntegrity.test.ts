import { describe, expect, it } from 'vitest';
import { defaultThresholds } from '../../../shared/schemas/thresholds.js';
import { judgeIntegrity } from '../../../shared/screening/judgeIntegrity.js';
import { buildRecord } from '../../support/buildRecord.js';

const base = buildRecord().integrity;
const stamps = { irregular: false, jitterShare: 0, missingShare: 0, gaps: [], repeatedCount: 0, roundingStepS: 1e-6 };
const kinds = (
  record: Parameters<typeof judgeIntegrity>[0],
  sheet: Parameters<typeof judgeIntegrity>[2] = {},
  thresholds = defaultThresholds,
): Record<string, string> =>
  Object.fromEntries(judgeIntegrity(record, thresholds, sheet).map(({ kind, severity }) => [kind, severity]));

describe('judgeIntegrity', () => {
  it('finds nothing in an undamaged recording', () => {
    expect(kinds(buildRecord({ timeStamps: stamps }))).toEqual({});
  });

  it('stops a statement on clipping above the limit and limits it below', () => {
    const clipped = (clippedShare: number) =>
      buildRecord({ integrity: { ...base, clippedCount: 20, clippedRuns: 4, clippedShare } });
    expect(kinds(clipped(1e-3))).toEqual({ clipping: 'unproven' });
    expect(kinds(clipped(1e-5))).toEqual({ clipping: 'limit' });
  });

  it('only notes damage that the spectra could leave out', () => {
    const damaged = {
      ...base,
      clippedCount: 20,
      clippedRuns: 4,
      clippedShare: 1e-3,
      dropoutCount: 2,
      missingShare: 0.02,
    };
    expect(kinds(buildRecord({ integrity: damaged }))).toEqual({ clipping: 'unproven', dropout: 'unproven' });
    expect(kinds(buildRecord({ integrity: damaged, damageLeftOut: true }))).toEqual({
      clipping: 'note',
      dropout: 'note',
    });
  });

  it('takes a scatter of the stamps that their rounding explains for no jitter', () => {
    const rounded = { ...stamps, jitterShare: 0.03, roundingStepS: 5e-5 };
    expect(kinds(buildRecord({ timeStamps: rounded }))).toEqual({ timeStampJitter: 'note' });
    expect(kinds(buildRecord({ timeStamps: { ...rounded, jitterShare: 0.2 } }))).toEqual({ timeStampJitter: 'limit' });
  });

  it('reports missing rows once, as a gap and not as values that are no numbers', () => {
    const gap = { ...stamps, missingShare: 0.005, gaps: [{ fromS: 1, toS: 1.05 }] };
    expect(kinds(buildRecord({ timeStamps: gap, integrity: { ...base, notFiniteCount: 100 } }))).toEqual({
      timeStampGap: 'unproven',
    });
    expect(kinds(buildRecord({ timeStamps: gap, integrity: { ...base, notFiniteCount: 130 } }))).toEqual({
      timeStampGap: 'unproven',
      notFinite: 'unproven',
    });
  });

  it('notes repeated and scattered stamps', () => {
    expect(kinds(buildRecord({ timeStamps: { ...stamps, repeatedCount: 3, jitterShare: 0.02 } }))).toEqual({
      timeStampRepeated: 'note',
      timeStampJitter: 'limit',
    });
  });

  it('limits on dropouts, coarse steps and a truncated file, and notes an offset', () => {
    const integrity = {
      ...base,
      dropoutCount: 2,
      missingShare: 5e-4,
      stepsPerDeviation: 3,
      quantum: 0.1,
      offsetShare: 0.5,
    };
    const warnings = [{ code: 'WAV_TRUNCATED', message: 'The file ends early.' }];
    expect(kinds(buildRecord({ integrity, warnings }))).toEqual({
      dropout: 'limit',
      coarseSteps: 'limit',
      truncatedFile: 'limit',
      offset: 'note',
    });
  });

  it('notes pauses, and calls a capture too short of which they leave too little signal', () => {
    const pauses = [{ fromS: 0, toS: 2 }];
    expect(kinds(buildRecord({ integrity: { ...base, pauseCount: 1, pauseShare: 0.2, pauses } }))).toEqual({
      silent: 'note',
    });
    const asked = { ...defaultThresholds, minDurationS: 0.5 };
    expect(kinds(buildRecord({ integrity: { ...base, pauseCount: 1, pauseShare: 0.97, pauses } }), {}, asked)).toEqual({
      tooShort: 'unproven',
      silent: 'note',
    });
  });

  it('says when the companion named in the sheet was not at hand', () => {
    expect(kinds(buildRecord(), { companion: 'b.wav' })).toEqual({ companionMissing: 'note' });
    const companion = { name: 'b.wav', sampleRateHz: 2500, durationS: 10, tones: [] };
    expect(kinds(buildRecord({ companion }), { companion: 'b.wav' })).toEqual({});
  });
});
