import { parse } from 'csv-parse/sync';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parseCell, parseIsoStamp, splitCells } from '../../../shared/formats/csvText.js';

describe('parseCell', () => {
  it('gives exactly what Number() gives for every finite number, also with a decimal comma', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        expect(parseCell(` ${value} `, '.')).toBe(Number(String(value)));
        expect(parseCell(String(value).replace('.', ','), ',')).toBe(Number(String(value)));
      }),
    );
  });

  it.each(['0x1F', '1.5abc', '1,234.5', 'OVERLOAD', '1_000', '95%', '0b1', '1e'])('takes %s for no number', (cell) => {
    expect(parseCell(cell, '.')).toBeUndefined();
  });

  it('takes no thousands separator for a decimal point', () => {
    expect(parseCell('1.234', ',')).toBeUndefined();
    expect(parseCell('1,234', ',')).toBe(1.234);
  });

  it.each(['', ' ', 'NaN', 'inf', '-Infinity', 'n/a'])('reads %j as missing, never as 0', (cell) => {
    expect(parseCell(cell, '.')).toBeNaN();
  });
});

describe('splitCells', () => {
  // Outside check: the parser of the csv-parse package.
  it('splits a line as an independent parser does', () => {
    const cell = fc.string({ unit: fc.constantFrom('a', '1', '.', ',', '"', ' ', '-') });
    fc.assert(
      fc.property(fc.array(cell, { minLength: 1, maxLength: 6 }), (cells) => {
        const line = cells.map((text) => `"${text.replaceAll('"', '""')}"`).join(',');
        expect(splitCells(line, ',')).toEqual(parse(line)[0]);
      }),
    );
  });

  it('reports a quote that is not closed', () => {
    expect(splitCells('1,"2', ',')).toBeNull();
    expect(splitCells('1,"2"', ',')).toEqual(['1', '2']);
  });
});

describe('parseIsoStamp', () => {
  it('keeps the decimals and the offset', () => {
    expect(parseIsoStamp('1970-01-01T00:00:10.25Z')).toBe(10.25);
    expect(parseIsoStamp('1970-01-01 01:00:10+01:00')).toBe(10);
  });
});
