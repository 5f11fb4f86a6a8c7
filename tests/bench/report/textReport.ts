import type { ReportTable } from './ReportTable.js';

/** Tables for the terminal: columns padded, a blank line between tables. */
export function textReport(tables: readonly ReportTable[]): string {
  return tables
    .map(({ title, columns, rows, notes }) => {
      const widths = columns.map((name, column) =>
        Math.max(name.length, ...rows.map((row) => (row[column] ?? '').length)),
      );
      const line = (cells: string[]): string =>
        `  ${cells.map((cell, column) => cell.padEnd(widths[column] ?? 0)).join('  ')}`.trimEnd();
      return [title, line(columns), ...rows.map(line), ...notes.map((note) => `  ${note}`)].join('\n');
    })
    .join('\n\n');
}
