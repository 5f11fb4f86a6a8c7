import type { CsvLayout } from '../schemas/csvLayout.js';

export type CsvEncoding = CsvLayout['encoding'];

/** Encoding by byte-order mark; else UTF-8 where the bytes are valid UTF-8; else Latin-1. */
export function recogniseEncoding(firstBytes: Uint8Array): CsvEncoding {
  if (firstBytes[0] === 0xff && firstBytes[1] === 0xfe) return 'utf-16le';
  if (firstBytes[0] === 0xfe && firstBytes[1] === 0xff) return 'utf-16be';
  try {
    // `stream` tolerates a character cut off at the end of the prefix.
    new TextDecoder('utf-8', { fatal: true }).decode(firstBytes, { stream: true });
    return 'utf-8';
  } catch {
    return 'latin1';
  }
}

export const decodeCsv = (bytes: Uint8Array, encoding: CsvEncoding): string => new TextDecoder(encoding).decode(bytes);

export const splitLines = (text: string): string[] => text.split(/\r\n|\n|\r/);

/** Comment lines say something about the capture but hold no row. */
export const isCommentLine = (line: string): boolean => /^\s*[#%]/.test(line);

/**
 * Cells of one line (RFC 4180 quotes; a run of blanks counts as one separator where the separator is a blank).
 * @returns null where a quote is opened and not closed
 */
export function splitCells(line: string, separator: CsvLayout['separator']): string[] | null {
  if (separator === '') return [line.trim()];
  if (separator === ' ') return line.trim().split(/\s+/);
  if (!line.includes('"')) return line.split(separator);
  const cells: string[] = [];
  let cell = '';
  let isQuoted = false;
  for (let at = 0; at < line.length; at += 1) {
    const character = line.charAt(at);
    if (isQuoted && character === '"' && line[at + 1] === '"') {
      cell += '"';
      at += 1;
    } else if (character === '"') isQuoted = !isQuoted;
    else if (character === separator && !isQuoted) {
      cells.push(cell);
      cell = '';
    } else cell += character;
  }
  return isQuoted ? null : [...cells, cell];
}

const plainNumber = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i;
const missingWord = /^(nan|-?inf|\+inf|-?infinity|n\/?a|null|-|--)$/i;

/**
 * Number of a cell: exactly what `Number()` gives for a plain decimal number; NaN for an empty cell or one of the words
 * loggers write for "no value"; undefined for anything else (hexadecimal, thousands separators, text).
 */
export function parseCell(cell: string, decimalSign: CsvLayout['decimalSign']): number | undefined {
  const trimmed = cell.trim();
  if (trimmed === '' || missingWord.test(trimmed)) return Number.NaN;
  // Where the comma is the decimal sign a point can only separate thousands: 1.234 is not 1,234 thousandths.
  if (decimalSign === ',' && trimmed.includes('.')) return undefined;
  const text = decimalSign === ',' ? trimmed.replace(',', '.') : trimmed;
  return plainNumber.test(text) ? Number(text) : undefined;
}

const isoStamp = /^\d{4}-\d{2}-\d{2}[T ]\d{2}:\d{2}(:\d{2}([.,]\d+)?)?(Z|[+-]\d{2}:?\d{2})?$/;

export const isIsoStamp = (cell: string): boolean => isoStamp.test(cell.trim());

/** Seconds since 1970 of an ISO 8601 stamp, with all its decimals; a stamp without an offset is taken as UTC. */
export function parseIsoStamp(cell: string): number {
  const match = /^(.*?:\d{2})(?:[.,](\d+))?(Z|[+-]\d{2}:?\d{2})?$/.exec(cell.trim());
  if (!match) return Number.NaN;
  const [, whole = '', decimals = '', offset = 'Z'] = match;
  const withSeconds = /T\d{2}:\d{2}$/.test(whole.replace(' ', 'T')) ? `${whole}:00` : whole;
  const wholeMs = Date.parse(`${withSeconds.replace(' ', 'T')}${offset}`);
  return wholeMs / 1000 + (decimals ? Number(`0.${decimals}`) : 0);
}
