import { describe, expect, it } from 'vitest';
import { defaultThresholds } from '../../../shared/schemas/thresholds.js';
import { judgeCapture } from '../../../shared/screening/judgeCapture.js';
import { judgeChannel } from '../../../shared/screening/judgeChannel.js';
import { buildRecord } from '../../support/buildRecord.js';

const clear = judgeChannel(buildRecord(), defaultThresholds, {});
const silent = judgeChannel(buildRecord({ obstacles: ['silent'], profile: null, edge: null }), defaultThresholds, {});

describe('judgeCapture', () => {
  it('takes the gravest verdict, the highest score and the lowest clear-to frequency', () => {
    const limited = { ...clear, verdict: 'limited' as const, clearToHz: 200, foldScore: 0.4 };
    expect(judgeCapture([clear, limited])).toMatchObject({ verdict: 'limited', clearToHz: 200, foldScore: 0.4 });
  });

  it('has no clear-to frequency as soon as one channel has none', () => {
    const result = judgeCapture([clear, silent]);
    expect(result).toMatchObject({ verdict: 'unproven', clearToHz: null });
    expect(result.headline).toContain('no signal');
  });

  it('is unproven without channels', () => {
    expect(judgeCapture([])).toEqual({ verdict: 'unproven', foldScore: null, clearToHz: null, headline: null });
  });
});
