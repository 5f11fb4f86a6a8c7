import { describe, expect, it } from 'vitest';
import { evidenceLabel, evidenceValue } from '@/components/findings/evidenceText';

describe('evidenceText', () => {
  it('splits a name into words and its unit', () => {
    expect(evidenceLabel('contaminationBoundDb')).toBe('contamination bound (dB)');
    expect(evidenceLabel('trueFrequencyHz')).toBe('true frequency (Hz)');
    expect(evidenceLabel('method')).toBe('method');
  });

  it('shortens numbers and says yes and no', () => {
    expect([evidenceValue(1 / 3), evidenceValue(true), evidenceValue(false), evidenceValue('x')]).toEqual([
      '0.333333',
      'yes',
      'no',
      'x',
    ]);
  });
});
