/**
 * What a decay does to a tone over `frames` samples, its amplitude being 1 in the middle: the mean square of the envelope, and
 * how much worse the frequency is known than for a steady tone of the same power. Fisher information of a damped tone, complex
 * amplitude unknown: var(ω) = σ²/(2·Σ w·(t−t̄)²) with w = exp(−2·decay·t) (Kay 1993, chapter 3); steady: Σ(t−t̄)² = N³/12.
 */
export function decayEnvelope(decay: number, frames: number): { meanSquare: number; boundFactor: number } {
  const x = decay * frames;
  if (Math.abs(x) < 1e-3) return { meanSquare: 1, boundFactor: 1 };
  // Moments of exp(−2x·u) over u = −1/2 … 1/2, in closed form by k = 2x.
  const k = 2 * x;
  const [upper, lower] = [Math.exp(k / 2), Math.exp(-k / 2)];
  const zeroth = (upper - lower) / k;
  const first = -((upper + lower) / (2 * k)) + (upper - lower) / (k * k);
  const second = (upper - lower) / (4 * k) - (upper + lower) / (k * k) + (2 * (upper - lower)) / (k * k * k);
  const variance = second / zeroth - (first / zeroth) ** 2;
  return { meanSquare: zeroth, boundFactor: Math.sqrt(1 / 12 / variance) };
}
