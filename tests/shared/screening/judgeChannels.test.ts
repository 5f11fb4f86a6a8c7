import { describe, expect, it } from 'vitest';
import { defaultThresholds } from '../../../shared/schemas/thresholds.js';
import { judgeChannel } from '../../../shared/screening/judgeChannel.js';
import { judgeChannels } from '../../../shared/screening/judgeChannels.js';
import { buildRecord, buildTone } from '../../support/buildRecord.js';

const sheet = {};
const speedHz = 37.31;
/** Shows the harmonics 29, 31, 33 and 37 folded, by the family it also holds in band. */
const first = buildRecord({
  tones: [
    ...Array.from({ length: 26 }, (_, index) => buildTone((index + 1) * speedHz)),
    ...[29, 31, 33, 37].map((k) => buildTone(2000 - k * speedHz, { levelDb: -50 })),
  ],
});
const judge = (...records: (typeof first)[]) => judgeChannels(records, defaultThresholds, sheet);

describe('judgeChannels', () => {
  it('takes a tone that is shown to be folded in one channel for folded in the others', () => {
    const second = buildRecord({ channel: 1, tones: [buildTone(2000 - 31 * speedHz, { levelDb: -35 })] });
    expect(judgeChannel(second, defaultThresholds, sheet).verdict).toBe('clear');
    const judged = judge(first, second)[1];
    expect(judged?.verdict).toBe('folded');
    expect(judged?.tones[0]).toMatchObject({ explanation: 'foldedHarmonic', explainedBy: 'channel 1' });
    expect(judged?.tones[0]?.trueFrequencyHz).toBeCloseTo(31 * speedHz, 1);
    expect(judged?.findings[0]).toMatchObject({ kind: 'foldedInOtherChannel', severity: 'fold' });
    expect(judged?.clearToHz).toBeLessThanOrEqual(2000 - 31 * speedHz);
  });

  it('leaves a channel alone whose tones stand elsewhere, or only by chance at the same place', () => {
    const elsewhere = buildRecord({ channel: 1, tones: [buildTone(412.7)] });
    const crowded = buildRecord({
      channel: 1,
      tones: [buildTone(2000 - 31 * speedHz, { wanderHz: 3, peaksPerHz: 0.5 })],
    });
    expect(judge(first, elsewhere)[1]?.verdict).toBe('clear');
    expect(judge(first, crowded)[1]?.verdict).toBe('clear');
  });

  it('does not depend on the order of the channels', () => {
    const second = buildRecord({ channel: 1, tones: [buildTone(2000 - 31 * speedHz)] });
    const [a, b] = [judge(first, second), judge(second, first)];
    expect([a[1]?.verdict, a[0]?.verdict]).toEqual([b[0]?.verdict, b[1]?.verdict]);
  });

  it('shows that the bound does not hold where folded tones stand over a clean edge', () => {
    const kinds = judge(first)[0]?.findings.map(({ kind }) => kind);
    expect(kinds).toContain('methodsDisagree');
    expect(judge(buildRecord())[0]?.findings.map(({ kind }) => kind)).not.toContain('methodsDisagree');
  });
});
