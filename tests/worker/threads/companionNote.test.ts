import { describe, expect, it } from 'vitest';
import { companionNote } from '../../../worker/threads/companionNote.js';
import { buildMeasurementRecord } from '../../support/factories/buildScreening.js';

const companion = { name: 'fast.wav', sampleRateHz: 1280, durationS: 12, tones: [] };
const warning = { code: 'COMPANION_MISSING', message: 'The companion has the same rate.' };

describe('companionNote', () => {
  it('is none where one channel was compared', () => {
    const records = [buildMeasurementRecord({ warnings: [warning] }), buildMeasurementRecord({ companion })];
    expect(companionNote(records)).toBeNull();
  });

  it('is what the comparison itself said', () => {
    expect(companionNote([buildMeasurementRecord({ warnings: [warning] })])).toBe(warning.message);
  });

  it('names what is needed where the capture itself can’t be compared', () => {
    expect(companionNote([buildMeasurementRecord()])).toContain('known sampling rate and regular time stamps');
  });
});
