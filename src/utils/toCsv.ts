/** Text that a spreadsheet would run as a formula, also in its full-width forms. */
const startsFormula = /^[=+\-@\t\r\n\uFF1D\uFF0B\uFF0D\uFF20]/;

function cell(value: string | number | null): string {
  if (value === null) return '';
  // Real numbers stay numbers, negative ones too: only text can be a formula.
  if (typeof value === 'number') return Number.isFinite(value) ? String(value) : '';
  const safe = startsFormula.test(value) ? `'${value}` : value;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

/** RFC 4180, safe to open in a spreadsheet. */
export const toCsv = (rows: (string | number | null)[][]): string =>
  rows.map((row) => row.map(cell).join(',')).join('\r\n');
