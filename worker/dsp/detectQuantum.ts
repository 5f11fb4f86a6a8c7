/**
 * The step between neighbouring codes that a recording really uses: the least difference between distinct values, if all
 * differences are whole multiples of it within rounding. Text written with a fixed number of significant digits has no
 * single step; then the finest step that the largest values obey is no quantum and the answer is null.
 * @param values some thousands of samples, spread over the capture
 */
export function detectQuantum(values: ArrayLike<number>): number | null {
  const sorted = Float64Array.from(values).sort();
  const steps: number[] = [];
  const scale = Math.max(Math.abs(sorted[0] ?? 0), Math.abs(sorted[sorted.length - 1] ?? 0));
  const least = scale * 2 ** -40;
  for (let n = 1; n < sorted.length; n++) {
    const step = (sorted[n] as number) - (sorted[n - 1] as number);
    if (step > least) steps.push(step);
  }
  if (steps.length < 4) return null;
  let quantum = steps.reduce((a, b) => Math.min(a, b), Infinity);
  // Euclid on reals: a remainder that is neither near 0 nor near the step shows a finer common step.
  for (const step of steps) {
    let [a, b] = [step, quantum];
    while (b > 1e-3 * quantum && b > least) {
      const remainder = a - b * Math.round(a / b);
      [a, b] = [b, Math.abs(remainder) < 0.02 * quantum ? 0 : Math.abs(remainder)];
    }
    quantum = Math.min(quantum, a);
    if (quantum < scale * 2 ** -30) return null;
  }
  const counts = steps.reduce((sum, step) => sum + Math.round(step / quantum), 0);
  const total = (sorted[sorted.length - 1] as number) - (sorted[0] as number);
  const refined = total / counts;
  return Math.abs(refined / quantum - 1) < 0.05 ? refined : quantum;
}
