import { describe, expect, it } from 'vitest';
import { defaultThresholds } from '../../../shared/schemas/thresholds.js';
import { judgeChannel } from '../../../shared/screening/judgeChannel.js';
import { judgeLockedSources } from '../../../shared/screening/judgeLockedSources.js';
import { buildRecord, buildTone } from '../../support/buildRecord.js';

/** 10 s at 2000 Hz with all harmonics of 50 Hz up to fs/2, falling by 1 dB each. */
const supply = buildRecord({
  tones: Array.from({ length: 19 }, (_, index) => buildTone(50 * (index + 1), { levelDb: -20 - index })),
});
const look = (record: typeof supply, sheet: Parameters<typeof judgeLockedSources>[2]) =>
  judgeLockedSources(record, defaultThresholds, sheet);

describe('judgeLockedSources', () => {
  it('says that harmonics of a rate-locked supply hide behind its in-band harmonics', () => {
    const [finding] = look(supply, { supplyHz: 50 });
    expect(finding).toMatchObject({
      kind: 'ambiguousFold',
      severity: 'limit',
      frequencyHz: 950,
      trueFrequencyHz: 1050,
    });
    expect(judgeChannel(supply, defaultThresholds, { supplyHz: 50 }).verdict).toBe('limited');
  });

  it('says nothing where the rate is no multiple, the harmonics have died down, or a stated filter stops them', () => {
    expect(look(supply, { supplyHz: 50.37 })).toEqual([]);
    expect(look({ ...supply, tones: supply.tones.slice(0, 6) }, { supplyHz: 50 })).toEqual([]);
    const filter = { type: 'butterworth' as const, order: 8, cornerHz: 400 };
    expect(look(supply, { supplyHz: 50, filter: { ...filter, cornerHz: 1500 } })).toHaveLength(1);
    expect(look(supply, { supplyHz: 50, filter })).toEqual([]);
  });

  it('names a stated source that lands on another one', () => {
    const record = buildRecord({ tones: [buildTone(300)] });
    const sources = [
      { name: 'fan', frequencyHz: 300 },
      { name: 'tooth mesh', frequencyHz: 1700 },
    ];
    expect(look(record, { sources })[0]?.text).toContain('tooth mesh');
    expect(look(record, { sources: sources.slice(0, 1) })).toEqual([]);
  });

  it('leaves it to the companion where there is one', () => {
    const companion = { name: 'b.wav', sampleRateHz: 2500, durationS: 10, tones: [] };
    expect(
      look({ ...supply, companion: companion as unknown as NonNullable<typeof supply.companion> }, { supplyHz: 50 }),
    ).toEqual([]);
  });
});
