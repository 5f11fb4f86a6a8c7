/**
 * Chance that unrelated Gaussian signals show a squared (multiple) coherence this high:
 * P(R ≥ r) = Σ_{i<q} C(n−1, i)·r^i·(1−r)^(n−1−i). For one input this is (1−r)^(n−1), so that the level passed with chance P is
 * 1 − P^(1/(n−1)) (Carter, Knapp & Nuttall 1973; Halliday et al. 1995).
 * @param coherence squared coherence, 0 … 1
 * @param independent independent averages behind it
 * @param inputs transfers fitted
 */
export function coherenceChance(coherence: number, independent: number, inputs = 1): number {
  const n = Math.round(independent);
  if (inputs < 1 || n <= inputs) return 1;
  if (coherence >= 1) return 0;
  const rest = Math.log1p(-coherence);
  let logTerm = (n - 1) * rest;
  let sum = 0;
  for (let i = 0; i < inputs; i++) {
    sum += Math.exp(logTerm);
    logTerm += Math.log((n - 1 - i) / (i + 1)) + Math.log(Math.max(coherence, 1e-300)) - rest;
  }
  return Math.min(1, sum);
}
