import { describe, expect, it } from 'vitest';
import type { CsvLayout } from '../../../shared/schemas/csvLayout.js';
import { needsNewMeasurement } from '../../../shared/screening/needsNewMeasurement.js';

const layout: CsvLayout = {
  encoding: 'utf-8',
  separator: ',',
  decimalSign: '.',
  skipLines: 1,
  columnNames: ['t', 'a'],
  timeColumn: 0,
  timeUnit: 's',
  valueColumns: [1],
  units: ['g'],
  sampleRateHz: null,
};
const before = { sheet: { sampleRateHz: 6000, highestFrequencyHz: 400 }, csvLayout: layout };

describe('needsNewMeasurement', () => {
  it.each([
    [{ sampleRateHz: 12_000, highestFrequencyHz: 400 }],
    [{ highestFrequencyHz: 400 }],
    [{ ...before.sheet, scale: 2 }],
    [{ ...before.sheet, unit: 'g' }],
    [{ ...before.sheet, companion: 'pump-2.wav' }],
  ])('is so for the sheet %j', (sheet) => {
    expect(needsNewMeasurement(before, { sheet, csvLayout: layout })).toBe(true);
  });

  it.each([
    [{ ...before.sheet, highestFrequencyHz: 900 }],
    [{ ...before.sheet, filter: { type: 'butterworth' as const, order: 8, cornerHz: 400 } }],
    [{ ...before.sheet, supplyHz: 50, notes: 'gain checked' }],
  ])('is not so for what only the judge reads: %j', (sheet) => {
    expect(needsNewMeasurement(before, { sheet, csvLayout: layout })).toBe(false);
  });

  it('sees another layout, whatever the order of its names', () => {
    const reordered = Object.fromEntries(Object.entries(layout).reverse()) as CsvLayout;
    expect(needsNewMeasurement(before, { ...before, csvLayout: reordered })).toBe(false);
    expect(needsNewMeasurement(before, { ...before, csvLayout: { ...layout, timeUnit: 'ms' } })).toBe(true);
    expect(needsNewMeasurement(before, { ...before, csvLayout: null })).toBe(true);
  });
});
