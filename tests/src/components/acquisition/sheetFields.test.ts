import type { AcquisitionSheet } from '@shared/schemas/acquisitionSheet.js';
import { describe, expect, it } from 'vitest';
import { parseDraft, toDraft } from '@/components/acquisition/sheetFields';

const sheet: AcquisitionSheet = {
  sampleRateHz: 2048,
  filter: { type: 'butterworth', order: 4, cornerHz: 800 },
  sources: [{ name: 'supply', frequencyHz: 50 }, { frequencyHz: 24.8 }],
  unit: 'g',
  noiseFloorDb: -110,
};

describe('sheetFields', () => {
  it('reads back what it wrote, with what the form does not show', () => {
    expect(parseDraft(toDraft(sheet), sheet)).toEqual({ sheet, problems: {} });
  });

  it('shows pair label and companion, and takes one away that was emptied', () => {
    const draft = toDraft({ pair: 'A', companion: 'fast.wav' });
    expect(draft).toMatchObject({ pair: 'A', companion: 'fast.wav' });
    expect(parseDraft({ ...draft, pair: '' }, { pair: 'A', companion: 'fast.wav' }).sheet).toEqual({
      companion: 'fast.wav',
    });
  });

  it('takes a decimal comma', () => {
    expect(parseDraft({ ...toDraft({}), sampleRateHz: '25,6', sources: '24,8; 50' }).sheet).toEqual({
      sampleRateHz: 25.6,
      sources: [{ frequencyHz: 24.8 }, { frequencyHz: 50 }],
    });
  });

  it('reads an empty form as an empty sheet', () => expect(parseDraft(toDraft({})).sheet).toEqual({}));

  it('names the fields that are wrong', () => {
    const parsed = parseDraft({ ...toDraft({}), sampleRateHz: 'fast', filterType: 'butterworth', filterOrder: '99' });
    expect(parsed.sheet).toBeNull();
    expect(Object.keys(parsed.problems).sort()).toEqual(['filterOrder', 'sampleRateHz']);
  });
});
