/** Area under the ROC curve: the chance that a positive scores above a negative, ties counting half. */
export function rocArea(positives: number[], negatives: number[]): number {
  if (positives.length === 0 || negatives.length === 0) return Number.NaN;
  let sum = 0;
  for (const p of positives) for (const n of negatives) sum += p > n ? 1 : p === n ? 0.5 : 0;
  return sum / (positives.length * negatives.length);
}

/** Share of positives above the threshold that lets at most `falseAlarms` of the negatives through. */
export function foundAt(positives: number[], negatives: number[], falseAlarms: number): number {
  const sorted = [...negatives].sort((a, b) => b - a);
  const threshold = sorted[Math.floor(falseAlarms * sorted.length)] ?? Number.NEGATIVE_INFINITY;
  return positives.filter((score) => score > threshold).length / positives.length;
}

/** Wilson's 95 % interval of a share, as text with the counts. */
export function shareText(count: number, total: number): string {
  if (total === 0) return 'none';
  const z = 1.96;
  const p = count / total;
  const centre = (p + (z * z) / (2 * total)) / (1 + (z * z) / total);
  const half = (z * Math.sqrt((p * (1 - p)) / total + (z * z) / (4 * total * total))) / (1 + (z * z) / total);
  const percent = (share: number): string => (100 * share).toFixed(1);
  return `${percent(p)} % (${count} of ${total}; 95 %: ${percent(Math.max(0, centre - half))} to ${percent(Math.min(1, centre + half))})`;
}
