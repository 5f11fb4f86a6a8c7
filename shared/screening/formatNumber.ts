/** A frequency for a sentence: five significant digits, kHz from 10 kHz on. */
export function formatHz(frequencyHz: number): string {
  return frequencyHz >= 10_000 ? `${significant(frequencyHz / 1000)} kHz` : `${significant(frequencyHz)} Hz`;
}

export function formatDb(levelDb: number): string {
  return `${levelDb.toFixed(1)} dB`;
}

/** Smaller shares and chances are not told apart: none of them is exactly nothing. */
const leastPercent = 0.01;

export function formatPercent(share: number): string {
  const percent = 100 * share;
  if (percent < leastPercent) return `less than ${leastPercent} %`;
  return `${percent >= 10 ? percent.toFixed(0) : percent >= 0.1 ? percent.toFixed(1) : percent.toPrecision(1)} %`;
}

export function formatSeconds(seconds: number): string {
  if (seconds > 0 && seconds < 1e-3) return `${significant(1e6 * seconds)} µs`;
  return seconds > 0 && seconds < 1 ? `${significant(1000 * seconds)} ms` : `${significant(seconds)} s`;
}

function significant(value: number): string {
  return String(Number(value.toPrecision(5)));
}
