import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { channelJudgementSchema } from '../../../shared/schemas/screening.js';
import { defaultThresholds } from '../../../shared/schemas/thresholds.js';
import { judgeChannel } from '../../../shared/screening/judgeChannel.js';
import { buildRecord, buildTone } from '../../support/buildRecord.js';

const judge = (
  record = buildRecord(),
  sheet: Parameters<typeof judgeChannel>[2] = {},
  thresholds = defaultThresholds,
) => judgeChannel(record, thresholds, sheet);

describe('judgeChannel', () => {
  it('calls a protected, undamaged channel clear over its band of interest', () => {
    const judgement = judge();
    expect(judgement.verdict).toBe('clear');
    expect(judgement.bandOfInterestHz).toEqual([0, 2000 / 2.56]);
    expect(judgement.clearToHz).toBeGreaterThan(2000 / 2.56);
    expect(channelJudgementSchema.parse(judgement)).toEqual(judgement);
  });

  it('calls it limited when the band of interest reaches beyond the clear-to frequency', () => {
    const judgement = judge(buildRecord(), { highestFrequencyHz: 950 });
    expect(judgement.verdict).toBe('limited');
    expect(judgement.clearToHz).toBeLessThan(900);
  });

  it('calls a band clear as a whole although its quiet stretches stand alone', () => {
    const record = buildRecord();
    if (record.profile === null) throw new Error('a measured record is expected');
    // A strong hump below 200 Hz over a floor that the edge shares.
    const hump = record.profile.meanDb.map((_, cell) => (cell < 102 ? -40 : -110));
    const quiet = { ...record, profile: { ...record.profile, meanDb: hump, tonelessDb: hump } };
    const judgement = judge(quiet);
    expect(judgement.clearToHz).toBeLessThan(230);
    expect(judgement.verdict).toBe('clear');
    expect(judgement.findings.find(({ kind }) => kind === 'clearTo')?.severity).toBe('note');
    expect(judge(quiet, {}, { ...defaultThresholds, requiredProtectionDb: 100 }).verdict).toBe('unproven');
  });

  it('calls a capture whose rate was raised limited, and bounds it by the edge of its first recording', () => {
    const record = buildRecord();
    if (record.edge === null) throw new Error('a measured record is expected');
    const raised = {
      factor: 2,
      by: 'held' as const,
      followingShare: 1,
      pivotHz: 500,
      contentToHz: 452,
      edgeDensityDb: -100,
    };
    const judgement = judge({ ...record, edge: { ...record.edge, densityDb: -41, raised } });
    expect(judgement.verdict).toBe('limited');
    expect(judgement.contaminationBoundDb).toBeCloseTo(-100 + 3.92, 0);
    expect(judgement.clearToHz).toBeLessThanOrEqual(500);
    const finding = judgement.findings.find(({ kind }) => kind === 'rateRaised');
    expect(finding).toMatchObject({ severity: 'limit', frequencyHz: 452, evidence: { factor: 2 } });
  });

  it('calls it unproven without a roll-off', () => {
    const record = buildRecord();
    if (record.profile === null || record.edge === null) throw new Error('a measured record is expected');
    const flat = record.profile.meanDb.map(() => -40);
    const judgement = judge({
      ...record,
      profile: { ...record.profile, meanDb: flat, tonelessDb: flat },
      edge: { ...record.edge, densityDb: -40, steepestFallDb: 0 },
    });
    expect(judgement.verdict).toBe('unproven');
    expect(judgement.clearToHz).toBeNull();
    expect(judgement.findings.map(({ kind }) => kind)).toContain('noRollOff');
  });

  it('puts folded before unproven', () => {
    const record = buildRecord({ durationS: 0.2, samples: 400, tones: [buildTone(700, { boundHz: 0.01 })] });
    const sheet = { sources: [{ name: 'tooth mesh', frequencyHz: 1300 }] };
    const judgement = judge({ ...record, durationS: 20, samples: 40_000 }, sheet, {
      ...defaultThresholds,
      minDurationS: 60,
    });
    expect(judgement.findings.map(({ kind }) => kind)).toContain('tooShort');
    expect(judgement.verdict).toBe('folded');
    expect(judgement.tones[0]).toMatchObject({
      explanation: 'foldedSource',
      trueFrequencyHz: 1300,
      explainedBy: 'tooth mesh',
    });
  });

  it('ends the clear stretch at a tone shown to be folded', () => {
    const record = buildRecord({ tones: [buildTone(300)] });
    expect(judge(record, { sources: [{ frequencyHz: 1700 }] }).clearToHz).toBeLessThanOrEqual(300);
    expect(judge(record).clearToHz).toBeGreaterThan(700);
  });

  it('explains harmonics and finds the members of their family that folded', () => {
    const speed = 37.31;
    const inBand = Array.from({ length: 26 }, (_, index) => buildTone((index + 1) * speed));
    const folded = [29, 31, 33, 37].map((k) => buildTone(2000 - k * speed, { levelDb: -50 }));
    const judgement = judge(buildRecord({ tones: [...inBand, ...folded] }));
    const shown = judgement.tones.filter(({ explanation }) => explanation === 'foldedHarmonic');
    expect(shown.map(({ trueFrequencyHz }) => Math.round((trueFrequencyHz ?? 0) / speed)).sort()).toEqual([
      29, 31, 33, 37,
    ]);
    expect(judgement.verdict).toBe('folded');
    expect(judge(buildRecord({ tones: inBand })).verdict).toBe('clear');
  });

  it('does not take unrelated partials for folded harmonics', () => {
    const partials = [41.3, 67.9, 101.7, 149.3, 211.1, 305.7, 419.9, 577.3, 701.9].map((hz) => buildTone(hz));
    expect(judge(buildRecord({ tones: partials })).verdict).toBe('clear');
  });

  it('shows a tone that moved between two rates as folded, and one that stayed as it was', () => {
    const companion = {
      name: 'second.wav',
      sampleRateHz: 2500,
      durationS: 10,
      tones: [buildTone(120), buildTone(1200)],
    };
    // 1300 Hz lands on 700 Hz at 2000 Hz and on 1200 Hz at 2500 Hz; 120 Hz stays.
    const judgement = judge(buildRecord({ tones: [buildTone(120), buildTone(700)], companion }));
    expect(judgement.tones[1]).toMatchObject({ explanation: 'movedBetweenRates', trueFrequencyHz: 1300 });
    expect(judgement.tones[0]?.explanation).toBe('unexplained');
    expect(judgement.verdict).toBe('folded');
  });

  it('says that a source at a multiple of fs/2 cannot be seen', () => {
    const { findings } = judge(buildRecord(), { sources: [{ name: 'chopper', frequencyHz: 3000 }] });
    expect(findings.find(({ kind }) => kind === 'sourceAtFold')).toMatchObject({
      frequencyHz: 1000,
      trueFrequencyHz: 3000,
    });
  });

  it('asks for the rate to be corrected when sheet and file disagree', () => {
    expect(judge(buildRecord(), { sampleRateHz: 2048 }).verdict).toBe('unproven');
    expect(judge(buildRecord(), { sampleRateHz: 2000 }).verdict).toBe('clear');
  });

  it('takes off what a stated filter attenuates beyond fs/2, and adds a resonance', () => {
    const filter = { type: 'butterworth' as const, order: 8, cornerHz: 500 };
    const plain = judge(buildRecord(), { highestFrequencyHz: 870 });
    const helped = judge(buildRecord(), { highestFrequencyHz: 870, filter });
    const resonant = judge(buildRecord(), { highestFrequencyHz: 870, sensorResonanceHz: 5000 });
    expect(helped.clearToHz ?? 0).toBeGreaterThan(plain.clearToHz ?? 0);
    expect(resonant.contaminationBoundDb ?? 0).toBeCloseTo((plain.contaminationBoundDb ?? 0) + 30, 9);
  });

  it('takes a noise floor stated in the sheet off the bound, by at most 7 dB', () => {
    const plain = judge(buildRecord()).contaminationBoundDb ?? 0;
    const helped = judge(buildRecord(), { noiseFloorDb: -120 }).contaminationBoundDb ?? 0;
    expect(plain - helped).toBeGreaterThan(5);
    expect(plain - helped).toBeLessThanOrEqual(7);
    expect(judge(buildRecord(), { noiseFloorDb: -170 }).contaminationBoundDb).toBeCloseTo(plain, 3);
  });

  it('never clears more when more protection is asked for', () => {
    fc.assert(
      fc.property(fc.integer({ min: 6, max: 119 }), (protection) => {
        const at = (requiredProtectionDb: number): number =>
          judge(buildRecord(), {}, { ...defaultThresholds, requiredProtectionDb }).clearToHz ?? 0;
        expect(at(protection + 1)).toBeLessThanOrEqual(at(protection));
      }),
    );
  });

  it('judges the same record always the same and leaves it untouched', () => {
    const record = buildRecord({ tones: [buildTone(700), buildTone(120)] });
    const before = JSON.stringify(record);
    expect(judge(record)).toEqual(judge(record));
    expect(JSON.stringify(record)).toBe(before);
  });
});
