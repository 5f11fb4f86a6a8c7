/**
 * Expected calibration error: mean distance between stated and seen share over bins of (nearly) equal counts
 * (Naeini, Cooper & Hauskrecht 2015). It is never 0 on finite data: see calibrationAtShare for the correction.
 * @param scores stated probabilities
 * @param outcomes 1 where it happened, 0 where not; same length
 */
export function calibrationError(scores: ArrayLike<number>, outcomes: ArrayLike<number>, bins = 10): number {
  const order = Array.from({ length: scores.length }, (_, index) => index).sort(
    (a, b) => (scores[a] as number) - (scores[b] as number),
  );
  return errorInOrder(order, scores, outcomes, bins);
}

/** The same with the order by rising score already known. */
export function errorInOrder(
  order: readonly number[],
  scores: ArrayLike<number>,
  outcomes: ArrayLike<number>,
  bins: number,
): number {
  let sum = 0;
  for (let bin = 0; bin < bins; bin++) {
    const from = Math.round((bin * order.length) / bins);
    const to = Math.round(((bin + 1) * order.length) / bins);
    let difference = 0;
    for (let n = from; n < to; n++)
      difference += (scores[order[n] as number] as number) - (outcomes[order[n] as number] as number);
    sum += Math.abs(difference);
  }
  return order.length === 0 ? Number.NaN : sum / order.length;
}
