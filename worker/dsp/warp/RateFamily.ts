import { lawFromWarped, linearLaw, type SpeedLaw } from './SpeedLaw.js';

/** Speed laws of one shape and one parameter, τ = −1 … 1 over the stretch, mean speed 1. */
export interface RateFamily {
  largest: number;
  /** d(ln s)/dτ. */
  slopeAt: (rate: number, tau: number) => number;
  speedAt: (rate: number, tau: number) => number;
  /** The parameter from a relative slope at τ, and how much an error grows on the way; null outside the family. */
  rateFrom: (slope: number, tau: number) => { rate: number; stretch: number } | null;
  lawOf: (rate: number, length: number) => SpeedLaw;
}

/** Even change: s = 1 + ρ·τ. */
export const evenChange: RateFamily = {
  largest: 0.96,
  slopeAt: (rate, tau) => rate / (1 + rate * tau),
  speedAt: (rate, tau) => 1 + rate * tau,
  rateFrom: (slope, tau) => {
    const bottom = 1 - slope * tau;
    return bottom > 0.02 ? { rate: slope / bottom, stretch: 1 / (bottom * bottom) } : null;
  },
  lawOf: linearLaw,
};

/** Change in proportion, as in a logarithmic sweep or a coast-down: s = r/sinh(r)·exp(r·τ). */
export const proportionalChange: RateFamily = {
  largest: 3,
  slopeAt: (rate) => rate,
  speedAt: (rate, tau) => (rate === 0 ? 1 : (rate / Math.sinh(rate)) * Math.exp(rate * tau)),
  rateFrom: (slope) => ({ rate: slope, stretch: 1 }),
  lawOf: (rate, length) =>
    Math.abs(rate) < 1e-6
      ? linearLaw(0, length)
      : lawFromWarped(
          Float64Array.from({ length }, (_, n) => Math.expm1((2 * rate * n) / length) / Math.expm1(2 * rate)),
        ),
};
