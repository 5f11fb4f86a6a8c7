import type { CsvLayout } from '../schemas/csvLayout.js';
import { isIsoStamp, parseCell } from './csvText.js';

type TimeUnit = CsvLayout['timeUnit'];

export interface TimeColumn {
  column: number | null;
  unit: TimeUnit;
  /** Row counters: neither time nor values. */
  indexColumns: number[];
}

const timeTitle =
  /^\s*(time|timestamp|t|zeit|elapsed|seconds?|secs?|date\s?time|datetime|date|uhrzeit)\b|_?time(_|$)|^time/i;
const indexTitle = /^\s*(index|idx|sample|samples|sample\s?(no|nr|number)\.?|no|nr|n|#|row)\s*$/i;
const earliestEpochS = 5e8;

function unitFrom(title: string, unit: string): TimeUnit | null {
  const named = unit.trim().toLowerCase();
  if (/^(ms|msec|milliseconds?)$/.test(named) || /(^|[_\s])ms$/i.test(title)) return 'ms';
  if (/^(us|µs|μs|usec|microseconds?)$/.test(named) || /(^|[_\s])(us|µs)$/i.test(title)) return 'us';
  if (/^(s|sec|seconds?)$/.test(named) || /(^|[_\s])s$/i.test(title)) return 's';
  return null;
}

const isRising = (values: number[]): boolean => {
  const rises = values.slice(1).filter((value, index) => value >= (values[index] ?? 0)).length;
  return values.length > 2 && rises >= 0.9 * (values.length - 1) && (values.at(-1) ?? 0) > (values[0] ?? 0);
};

/** Evenly spaced within a quarter of the median step: values of a signal are not. */
function isEven(values: number[]): boolean {
  const steps = values.slice(1).map((value, index) => value - (values[index] ?? 0));
  const median = [...steps].sort((a, b) => a - b)[Math.floor(steps.length / 2)] ?? 0;
  return median > 0 && steps.filter((step) => Math.abs(step - median) < 0.26 * median).length >= 0.8 * steps.length;
}

/** Numbers as large as today's seconds or milliseconds since 1970 are those. */
function unitOf(values: number[], title: string, unit: string): TimeUnit {
  const first = Math.abs(values[0] ?? 0);
  const named = unitFrom(title, unit);
  if (first > earliestEpochS * 1000) return 'epochMs';
  if (first > earliestEpochS && named !== 'us' && named !== 'ms') return 'epochS';
  return named ?? 's';
}

/** Finds the time column: an ISO column, one with a title that says so, or a first column that rises evenly. */
export function recogniseTimeColumn(
  rows: string[][],
  names: string[],
  units: string[],
  decimalSign: CsvLayout['decimalSign'],
): TimeColumn {
  const width = rows[0]?.length ?? 0;
  const columns = Array.from({ length: width }, (_, column) => rows.map((row) => row[column] ?? ''));
  const isoColumn = columns.findIndex((cells) => cells.every(isIsoStamp));
  const numbers = columns.map((cells) => cells.map((cell) => parseCell(cell, decimalSign) ?? Number.NaN));
  const isCounter = (column: number): boolean => {
    const values = numbers[column] ?? [];
    return indexTitle.test(names[column] ?? '') && values.every((value, row) => value === (values[0] ?? 0) + row);
  };
  const indexColumns = columns.map((_, column) => column).filter(isCounter);
  if (isoColumn >= 0) return { column: isoColumn, unit: 'iso8601', indexColumns };
  const titled = names.findIndex((name) => timeTitle.test(name));
  const hasTitles = names.some((name) => name !== '');
  const first = numbers[0] ?? [];
  const looksLikeTime = width > 1 && isRising(first) && isEven(first) && !indexColumns.includes(0);
  const column = titled >= 0 && width > 1 ? titled : looksLikeTime && (!hasTitles || titled < 0) ? 0 : null;
  if (column === null) return { column, unit: 's', indexColumns };
  return { column, unit: unitOf(numbers[column] ?? [], names[column] ?? '', units[column] ?? ''), indexColumns };
}
