const fastestMs = 1_000;
const slowestMs = 15_000;
const growth = 1.4;

/**
 * Pause before asking again: short at first, longer the longer nothing changed. vue-query pauses polling by itself while
 * the tab is hidden.
 * @param unchanged answers in a row that were the same
 */
export function pollInterval(unchanged: number): number {
  return Math.min(slowestMs, fastestMs * growth ** unchanged);
}
