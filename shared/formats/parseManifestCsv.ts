import { acquisitionSheetSchema, type AcquisitionSheet } from '../schemas/acquisitionSheet.js';
import { parseCell, splitCells, splitLines } from './csvText.js';

export interface Manifest {
  byFile: Record<string, AcquisitionSheet>;
  problems: { line: number; message: string }[];
}

const numericColumns = ['sampleRateHz', 'highestFrequencyHz', 'nominalSpeedHz', 'scale'] as const;
const textColumns = ['companion', 'unit', 'logger', 'position', 'pair'] as const;
const filterColumns = ['filterType', 'filterOrder', 'filterCornerHz'] as const;
export const manifestColumns = ['file', ...numericColumns, ...filterColumns, 'sources', ...textColumns] as const;
type ManifestColumn = (typeof manifestColumns)[number];

type Cells = Partial<Record<ManifestColumn, string>>;

/** Plain decimal numbers only; everything else becomes NaN, which the schema reports. */
const numberOf = (cell = ''): number => parseCell(cell, '.') ?? Number.NaN;

/** The cells of one row as an unchecked sheet; empty cells leave their field out. */
function sheetOf(cells: Cells): Record<string, unknown> {
  const filled = (column: ManifestColumn): boolean => (cells[column] ?? '') !== '';
  const numbers = numericColumns.filter(filled).map((column) => [column, numberOf(cells[column])]);
  const texts = textColumns.filter(filled).map((column) => [column, cells[column]]);
  const filter = filterColumns.some(filled)
    ? {
        filter: {
          type: cells.filterType === undefined || cells.filterType === '' ? 'unknown' : cells.filterType,
          ...(filled('filterOrder') ? { order: numberOf(cells.filterOrder) } : {}),
          ...(filled('filterCornerHz') ? { cornerHz: numberOf(cells.filterCornerHz) } : {}),
        },
      }
    : {};
  const sources = filled('sources')
    ? {
        sources: (cells.sources ?? '')
          .trim()
          .split(/\s+/)
          .map((value) => ({ frequencyHz: numberOf(value) })),
      }
    : {};
  return { ...Object.fromEntries([...numbers, ...texts]), ...filter, ...sources };
}

/**
 * Reads a manifest: one row a file, columns in any order, `file` required, everything else may be empty.
 * A wrong row is reported by line and left out; the others are kept.
 */
export function parseManifestCsv(text: string): Manifest {
  const lines = splitLines(text.replace(/^\uFEFF/, ''));
  const separator = (lines[0] ?? '').includes(';') ? ';' : ',';
  const header = (splitCells(lines[0] ?? '', separator) ?? []).map((cell) => cell.trim());
  const manifest: Manifest = { byFile: {}, problems: [] };
  const report = (line: number, message: string): number => manifest.problems.push({ line, message });
  if (!header.includes('file')) {
    report(1, `The first line must name the columns, with "file" among them: ${manifestColumns.join(', ')}.`);
    return manifest;
  }
  const unknown = header.filter((name) => !(manifestColumns as readonly string[]).includes(name));
  if (unknown.length > 0) report(1, `Unknown columns were ignored: ${unknown.join(', ')}.`);
  for (const [index, line] of lines.entries()) {
    if (index === 0 || line.trim() === '') continue;
    const values = splitCells(line, separator);
    if (!values || values.length > header.length) {
      report(
        index + 1,
        values ? `The row has ${values.length} cells, the header ${header.length}.` : 'A quote is not closed.',
      );
      continue;
    }
    const cells: Cells = Object.fromEntries(header.map((name, column) => [name, (values[column] ?? '').trim()]));
    const file = cells.file ?? '';
    if (file === '') {
      report(index + 1, 'The column "file" is empty.');
      continue;
    }
    if (Object.hasOwn(manifest.byFile, file)) {
      report(index + 1, `"${file}" stands in the manifest twice; the first row is used.`);
      continue;
    }
    const parsed = acquisitionSheetSchema.safeParse(sheetOf(cells));
    if (parsed.success) manifest.byFile[file] = parsed.data;
    else report(index + 1, parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`).join('; '));
  }
  return manifest;
}
