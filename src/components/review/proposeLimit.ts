/** The clear-to frequency rounded down to two significant digits: never above what was shown. */
export function proposeLimit(clearToHz: number | null): string {
  if (clearToHz === null || !(clearToHz > 0)) return '';
  const step = 10 ** (Math.floor(Math.log10(clearToHz)) - 1);
  return String(Number((Math.floor(clearToHz / step + 1e-9) * step).toPrecision(6)));
}
