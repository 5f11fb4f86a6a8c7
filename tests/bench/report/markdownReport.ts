import type { ReportTable } from './ReportTable.js';

/** The same tables for the documents; a heading each, one level below the page's own. */
export function markdownReport(tables: readonly ReportTable[]): string {
  return tables
    .map(({ title, columns, rows, notes }) => {
      const line = (cells: string[]): string => `| ${cells.map(escaped).join(' | ')} |`;
      const table = [line(columns), line(columns.map(() => '---')), ...rows.map(line)].join('\n');
      return [`## ${title}`, table, ...notes].join('\n\n');
    })
    .join('\n\n')
    .concat('\n');
}

function escaped(cell: string): string {
  return cell.replaceAll('|', '\\|').replaceAll('\n', ' ');
}
