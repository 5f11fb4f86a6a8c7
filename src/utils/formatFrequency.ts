/** `1.07 kHz`, `310.5 Hz`: four significant digits, the unit that keeps the number between 1 and 1000. */
export function formatFrequency(frequencyHz: number | null | undefined): string {
  if (frequencyHz === null || frequencyHz === undefined || !Number.isFinite(frequencyHz)) return '–';
  const magnitude = Math.abs(frequencyHz);
  if (magnitude >= 1e6) return `${trim(frequencyHz / 1e6)} MHz`;
  if (magnitude >= 10_000) return `${trim(frequencyHz / 1e3)} kHz`;
  return `${trim(frequencyHz)} Hz`;
}

const trim = (value: number): string => String(Number(value.toPrecision(5)));
