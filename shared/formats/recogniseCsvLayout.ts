import type { CsvLayout } from '../schemas/csvLayout.js';
import { CaptureError } from './CaptureError.js';
import {
  decodeCsv,
  isCommentLine,
  isIsoStamp,
  parseCell,
  recogniseEncoding,
  splitCells,
  splitLines,
} from './csvText.js';
import { recogniseTimeColumn } from './recogniseTimeColumn.js';

const examinedLines = 400;
const highestColumnCount = 1024;
const highestChannelCount = 64;

type Dialect = Pick<CsvLayout, 'separator' | 'decimalSign'>;
const dialects: Dialect[] = [
  { separator: ';', decimalSign: ',' },
  { separator: ';', decimalSign: '.' },
  { separator: '\t', decimalSign: '.' },
  { separator: '\t', decimalSign: ',' },
  { separator: ',', decimalSign: '.' },
  { separator: ' ', decimalSign: '.' },
  { separator: ' ', decimalSign: ',' },
  { separator: '', decimalSign: '.' },
  { separator: '', decimalSign: ',' },
];

const isDataCell = (cell: string, decimalSign: CsvLayout['decimalSign']): boolean =>
  isIsoStamp(cell) || parseCell(cell, decimalSign) !== undefined;

/** Cells of a row of numbers, or null where the line is none in this dialect. */
function dataCells(line: string, { separator, decimalSign }: Dialect): string[] | null {
  const cells = splitCells(line, separator);
  if (!cells || !cells.every((cell) => isDataCell(cell, decimalSign))) return null;
  return cells.some((cell) => cell.trim() !== '') ? cells : null;
}

interface Reading {
  dialect: Dialect;
  rows: string[][];
  firstRowLine: number;
}

/** How a dialect reads the lines: rows of numbers from the first one on, all of the width most of them have. */
function readWith(dialect: Dialect, lines: string[]): Reading | null {
  const numbered = lines.map((line, index) => ({
    index,
    cells: isCommentLine(line) ? null : dataCells(line, dialect),
  }));
  const rows = numbered.filter((entry): entry is { index: number; cells: string[] } => entry.cells !== null);
  const first = rows[0];
  if (!first) return null;
  return { dialect, rows: rows.map((row) => row.cells), firstRowLine: first.index };
}

/** More lines read as numbers win; then more columns. Ties keep the order of `dialects`. */
function isBetter(a: Reading, b: Reading | null): boolean {
  if (!b) return true;
  const columns = (reading: Reading): number => reading.rows[0]?.length ?? 0;
  return a.rows.length !== b.rows.length ? a.rows.length > b.rows.length : columns(a) > columns(b);
}

/** Rate named in a preamble: `fs = 2048 Hz`, `sample_rate_hz: 51200`, `Sampling rate,12.8 kHz`. */
export function findPreambleRate(preamble: string[]): number | null {
  for (const line of preamble) {
    const match =
      /(?:sampl\w*[\s_-]*(?:rate|freq\w*)|abtastrate|\brate|\bfs)(?:[\s_-]*\(?\[?(k?hz)\)?\]?)?\s*[:=,;\t ]\s*([\d.]+(?:e[+-]?\d+)?)\s*(k?hz)?/i.exec(
        line,
      );
    const value = match?.[2] === undefined ? Number.NaN : Number(match[2]);
    if (!(value > 0)) continue;
    const unit = (match?.[3] ?? match?.[1] ?? 'hz').toLowerCase();
    return unit === 'khz' ? value * 1000 : value;
  }
  return null;
}

/** `vibration [m/s²]` -> name and unit. */
function splitUnit(title: string): { name: string; unit: string } {
  const match = /^(.*?)\s*[[(]([^\])]{1,24})[\])]\s*$/.exec(title.trim());
  return match ? { name: match[1] ?? '', unit: match[2] ?? '' } : { name: title.trim(), unit: '' };
}

/** Header and units row: the last text rows of the right width above the numbers. */
function readHeader(above: string[], { separator }: Dialect, width: number): { names: string[]; units: string[] } {
  const textRows = above
    .filter((line) => line.trim() !== '' && !isCommentLine(line))
    .map((line) => splitCells(line, separator))
    .filter((cells): cells is string[] => cells?.length === width);
  const last = textRows.at(-1);
  const before = textRows.at(-2);
  const titles = before && last ? before : last;
  if (!titles)
    return { names: Array.from({ length: width }, () => ''), units: Array.from({ length: width }, () => '') };
  const parts = titles.map(splitUnit);
  const unitRow = before && last ? last.map((cell) => cell.trim().replace(/^[[(]|[\])]$/g, '')) : null;
  return { names: parts.map(({ name }) => name), units: parts.map(({ unit }, index) => unitRow?.[index] ?? unit) };
}

/**
 * How a CSV capture is to be read, from its first bytes: encoding, separator, decimal sign, lines above the numbers,
 * column names and units, time column. What it gets wrong a person can correct.
 * @throws CaptureError where no rows of numbers are found
 */
export function recogniseCsvLayout(firstBytes: Uint8Array): CsvLayout {
  if (firstBytes.length === 0)
    throw new CaptureError('EMPTY_FILE', 'The file is empty (0 bytes). Copy it from the logger again.');
  const encoding = recogniseEncoding(firstBytes);
  const allLines = splitLines(decodeCsv(firstBytes, encoding));
  // The last line of a prefix may be cut; of a short file it is what follows the final newline.
  const lines =
    allLines.length > 1
      ? allLines.slice(0, -1).concat(allLines.length <= examinedLines ? (allLines.at(-1) ?? '') : [])
      : allLines;
  const examined = lines.slice(0, examinedLines);
  let best: Reading | null = null;
  for (const dialect of dialects) {
    const reading = readWith(dialect, examined);
    if (reading && isBetter(reading, best)) best = reading;
  }
  if (!best) {
    throw new CaptureError(
      'NON_NUMERIC',
      'No rows of numbers were found. Export the capture as CSV with one row per sample.',
      { line: 1 },
    );
  }
  return layoutOf(best, examined, encoding);
}

function layoutOf(
  { dialect, rows, firstRowLine }: Reading,
  lines: string[],
  encoding: CsvLayout['encoding'],
): CsvLayout {
  const above = lines.slice(0, firstRowLine);
  const width = rows[0]?.length ?? 1;
  if (width > highestColumnCount) {
    throw new CaptureError(
      'BAD_CHANNELS',
      `The file has ${width} columns; up to ${highestChannelCount} channels can be screened. Split it.`,
    );
  }
  // A separator at the end of every line makes an empty last column.
  const filled = Array.from({ length: width }, (_, column) => rows.some((row) => (row[column] ?? '').trim() !== ''));
  const { names, units } = readHeader(above, dialect, width);
  const time = recogniseTimeColumn(rows, names, units, dialect.decimalSign);
  const valueColumns = filled.flatMap((isFilled, column) =>
    isFilled && column !== time.column && !time.indexColumns.includes(column) ? [column] : [],
  );
  if (valueColumns.length === 0) {
    throw new CaptureError(
      'NO_VALUES',
      'Beside the time column no column of values was found. Export at least one channel.',
    );
  }
  if (valueColumns.length > highestChannelCount) {
    throw new CaptureError(
      'BAD_CHANNELS',
      `The file has ${valueColumns.length} channels; up to ${highestChannelCount} can be screened. Split it.`,
    );
  }
  return {
    encoding,
    ...dialect,
    skipLines: firstRowLine,
    columnNames: names.map((name) => name.slice(0, 255)),
    timeColumn: time.column,
    timeUnit: time.unit,
    valueColumns,
    units: valueColumns.map((column) => (units[column] ?? '').slice(0, 24)),
    sampleRateHz: findPreambleRate(above),
  };
}
