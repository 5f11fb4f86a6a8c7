import { CaptureError } from '../../shared/formats/CaptureError.js';
import { isCommentLine, parseCell, parseIsoStamp, splitCells } from '../../shared/formats/csvText.js';
import type { CsvLayout } from '../../shared/schemas/csvLayout.js';

const secondsPerUnit = { s: 1, ms: 1e-3, us: 1e-6, epochS: 1, epochMs: 1e-3 } as const;

/** Turns lines into a time and values, strictly: what is no plain number is an error with its line and column. */
export class CsvRowParser {
  /** Cells that hold no value (empty, NaN, inf): read as NaN. */
  missingCells = 0;
  readonly values: Float64Array;
  timeS = Number.NaN;
  private width: number | null = null;

  constructor(private readonly layout: CsvLayout) {
    this.values = new Float64Array(layout.valueColumns.length);
  }

  /**
   * @returns false for a line that holds no row (blank, comment, above the first row)
   * @throws CaptureError QUOTE, RAGGED, NON_NUMERIC, NON_FINITE, TIME_FORMAT
   */
  parse(line: string, lineNumber: number): boolean {
    if (lineNumber <= this.layout.skipLines || line.trim() === '' || isCommentLine(line)) return false;
    const cells = splitCells(line, this.layout.separator);
    if (!cells) {
      throw new CaptureError('QUOTE', `Line ${lineNumber}: a quote is opened and not closed.`, { line: lineNumber });
    }
    this.width ??= cells.length;
    if (cells.length !== this.width) {
      throw new CaptureError(
        'RAGGED',
        `Line ${lineNumber} has ${cells.length} cells where the others have ${this.width}. Repair or remove the line.`,
        { line: lineNumber },
      );
    }
    this.layout.valueColumns.forEach((column, index) => {
      this.values[index] = this.number(cells[column] ?? '', lineNumber, column);
    });
    if (this.layout.timeColumn !== null) this.timeS = this.time(cells[this.layout.timeColumn] ?? '', lineNumber);
    return true;
  }

  private number(cell: string, line: number, column: number): number {
    const value = parseCell(cell, this.layout.decimalSign);
    if (value === undefined) {
      throw new CaptureError(
        'NON_NUMERIC',
        `Line ${line}, column ${column + 1}: "${cell.trim().slice(0, 40)}" is no plain number. Correct the cell or the layout.`,
        { line, column: column + 1 },
      );
    }
    if (Math.abs(value) === Infinity) {
      throw new CaptureError('NON_FINITE', `Line ${line}, column ${column + 1}: the number is too large to be held.`, {
        line,
        column: column + 1,
      });
    }
    if (Number.isNaN(value)) this.missingCells += 1;
    return value;
  }

  private time(cell: string, line: number): number {
    const { timeUnit, timeColumn } = this.layout;
    const value =
      timeUnit === 'iso8601'
        ? parseIsoStamp(cell)
        : this.number(cell, line, timeColumn ?? 0) * secondsPerUnit[timeUnit];
    if (Number.isNaN(value)) {
      throw new CaptureError(
        'TIME_FORMAT',
        `Line ${line}: "${cell.trim().slice(0, 40)}" is no time that can be read.`,
        {
          line,
        },
      );
    }
    return value;
  }
}
