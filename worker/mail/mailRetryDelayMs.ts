const firstDelayMs = 15_000;
const longestDelayMs = 60 * 60_000;

/** Exponential back-off: 15 s, 30 s, 60 s … up to an hour; `attempts` counts those already made. */
export function mailRetryDelayMs(attempts: number): number {
  return Math.min(longestDelayMs, firstDelayMs * 2 ** Math.max(0, attempts - 1));
}
