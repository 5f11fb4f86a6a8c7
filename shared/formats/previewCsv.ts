import type { CsvLayout } from '../schemas/csvLayout.js';
import { decodeCsv, isCommentLine, splitCells, splitLines } from './csvText.js';

export interface CsvPreview {
  header: string[];
  rows: string[][];
}

const previewRows = 12;

/** The first rows of numbers as a layout reads them; a row that can't be split is one cell. */
export function previewCsv(firstBytes: Uint8Array, layout: CsvLayout): CsvPreview {
  const lines = splitLines(decodeCsv(firstBytes, layout.encoding)).slice(layout.skipLines);
  const rows = lines
    .filter((line) => line.trim() !== '' && !isCommentLine(line))
    .slice(0, previewRows)
    .map((line) => splitCells(line, layout.separator) ?? [line]);
  return { header: layout.columnNames, rows };
}
