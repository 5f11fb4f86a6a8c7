import { describe, expect, it } from 'vitest';
import { previewCsv } from '../../../shared/formats/previewCsv.js';
import { recogniseCsvLayout } from '../../../shared/formats/recogniseCsvLayout.js';
import { csvLayoutSchema } from '../../../shared/schemas/csvLayout.js';

const utf8 = (text: string): Uint8Array => new TextEncoder().encode(text);
const rows = (line: (row: number) => string, count = 30): string =>
  Array.from({ length: count }, (_, row) => line(row)).join('\n');

describe('recogniseCsvLayout', () => {
  it('finds header, units in brackets, time column and value columns', () => {
    const layout = recogniseCsvLayout(
      utf8(`time [ms],ax [m/s²],ay [m/s²]\n${rows((row) => `${row},${Math.sin(row)},2.5`)}`),
    );
    expect(layout).toMatchObject({
      encoding: 'utf-8',
      separator: ',',
      decimalSign: '.',
      skipLines: 1,
      columnNames: ['time', 'ax', 'ay'],
      timeColumn: 0,
      timeUnit: 'ms',
      valueColumns: [1, 2],
      units: ['m/s²', 'm/s²'],
    });
    expect(csvLayoutSchema.safeParse(layout).success).toBe(true);
  });

  it('finds semicolons with decimal commas, and semicolons with points', () => {
    expect(recogniseCsvLayout(utf8(rows((row) => `0,${row + 10};1,5`)))).toMatchObject({
      separator: ';',
      decimalSign: ',',
    });
    expect(recogniseCsvLayout(utf8(rows((row) => `0.${row + 10};1.5`)))).toMatchObject({
      separator: ';',
      decimalSign: '.',
    });
  });

  it.each(['\t', ' '] as const)('finds the separator %j', (separator) => {
    const layout = recogniseCsvLayout(utf8(rows((row) => [row / 1000, 1.5, -2].join(separator))));
    expect(layout).toMatchObject({ separator, timeColumn: 0, valueColumns: [1, 2] });
  });

  it('reads the rate of a preamble where there is no time column', () => {
    const layout = recogniseCsvLayout(utf8(`# fs = 2.048 kHz\nvalue\n${rows((row) => String(Math.cos(row)))}`));
    expect(layout).toMatchObject({ timeColumn: null, sampleRateHz: 2048, skipLines: 2, columnNames: ['value'] });
  });

  it('knows no rate for bare values', () => {
    expect(recogniseCsvLayout(utf8(rows((row) => String(Math.cos(row)))))).toMatchObject({
      timeColumn: null,
      sampleRateHz: null,
      valueColumns: [0],
    });
  });

  it('takes a row of units below the names', () => {
    const layout = recogniseCsvLayout(utf8(`t,a\ns,g\n${rows((row) => `${row / 100},${Math.sin(row)}`)}`));
    expect(layout).toMatchObject({ skipLines: 2, columnNames: ['t', 'a'], timeColumn: 0, units: ['g'] });
  });

  it('reads ISO 8601 stamps, and leaves row counters out of the values', () => {
    const layout = recogniseCsvLayout(
      utf8(`sample,stamp,a\n${rows((row) => `${row},2026-03-01T10:00:${String(row).padStart(2, '0')}Z,${row % 3}`)}`),
    );
    expect(layout).toMatchObject({ timeColumn: 1, timeUnit: 'iso8601', valueColumns: [2] });
  });

  it.each([
    ['utf-16le', [0xff, 0xfe], (code: number) => [code & 255, code >> 8]],
    ['utf-16be', [0xfe, 0xff], (code: number) => [code >> 8, code & 255]],
  ] as const)('reads %s by its byte-order mark', (encoding, mark, pair) => {
    const text = `t,a\n${rows((row) => `${row / 100},1.5`)}`;
    const bytes = Uint8Array.from([...mark, ...[...text].flatMap((character) => pair(character.charCodeAt(0)))]);
    expect(recogniseCsvLayout(bytes)).toMatchObject({ encoding, timeColumn: 0, columnNames: ['t', 'a'] });
  });

  it('refuses text without numbers, with the twin that has them accepted', () => {
    expect(() => recogniseCsvLayout(utf8('name,place\nEva,Ferrow Quay\n'))).toThrowError(
      expect.objectContaining({ code: 'NON_NUMERIC' }) as Error,
    );
    expect(recogniseCsvLayout(utf8('name,place\n1,2\n')).valueColumns.length).toBeGreaterThan(0);
  });
});

describe('previewCsv', () => {
  it('shows the first rows as the layout splits them, without comments', () => {
    const bytes = utf8(`t,a\n0,"1"\n# range changed\n0.1,2\n${rows((row) => `${(row + 2) / 10},3`)}`);
    const preview = previewCsv(bytes, recogniseCsvLayout(bytes));
    expect(preview.header).toEqual(['t', 'a']);
    expect(preview.rows.slice(0, 2)).toEqual([
      ['0', '1'],
      ['0.1', '2'],
    ]);
    expect(preview.rows).toHaveLength(12);
  });
});
