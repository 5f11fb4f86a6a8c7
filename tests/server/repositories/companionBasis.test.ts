import { describe, expect, it } from 'vitest';
import { companionBasis } from '../../../server/repositories/companionBasis.js';
import type { CsvLayout } from '../../../shared/schemas/csvLayout.js';

const csvLayout: CsvLayout = {
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
const companion = { id: 'one', sha256: 'ab', sheet: { sampleRateHz: 1280 }, csvLayout };
const basis = companionBasis(companion);

describe('companionBasis', () => {
  it.each([
    { sha256: 'cd' },
    { id: 'two' },
    { sheet: {} },
    { sheet: { sampleRateHz: 1280, scale: 2 } },
    { csvLayout: null },
    { csvLayout: { ...csvLayout, timeUnit: 'ms' as const } },
  ])('changes with what a comparison reads: %j', (change) => {
    expect(companionBasis({ ...companion, ...change })).not.toBe(basis);
  });

  it('stays with the companion’s notes and the order of its layout', () => {
    const reordered = Object.fromEntries(Object.entries(csvLayout).reverse()) as CsvLayout;
    expect(companionBasis({ ...companion, csvLayout: reordered })).toBe(basis);
    expect(companionBasis({ ...companion, sheet: { sampleRateHz: 1280, notes: 'gain checked' } })).toBe(basis);
  });
});
