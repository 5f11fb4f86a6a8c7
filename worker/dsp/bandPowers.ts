import type { BandCovariance } from './BandCovariance.js';

export interface BandPowers {
  powers: Float64Array;
  /** Power of white noise beside the bands. */
  white: number;
  /** Degrees of freedom that each band's power rests on. */
  freedom: Float64Array;
}

/** Rounding of the arithmetic as a share of the power, so that steep spectra stay positive definite. */
const roundingShare = 1e-12;
const mostStretching = 5;

/**
 * Powers of frequency bands from samples at any times: maximum likelihood of structured covariances (Burg, Luenberger &
 * Wenger 1982) for a Gaussian signal, by the multiplicative steps of Snyder, O'Sullivan & Miller (1989):
 * power ← power·(aᵀ·C·a)/trace(R⁻¹·C) with R the model's covariance, C the band's and a = R⁻¹·values. There is no window, so strong
 * bands don't leak into weak ones as they do in a periodogram of uneven samples.
 * @param bands which of the covariances take part; the others are taken as empty
 */
export function bandPowers(stretches: BandCovariance[], bands: number[], iterations: number): BandPowers {
  const all = stretches[0]?.pairs.length ?? 0;
  const total = meanPower(stretches);
  const powers = new Float64Array(all);
  bands.forEach((b) => (powers[b] = total / bands.length));
  const model: BandPowers = { powers, white: total / 4, freedom: new Float64Array(all) };
  const lastRatios = new Float64Array(all + 1);
  const stretching = new Float64Array(all + 1).fill(1);
  for (let iteration = 0; iteration < iterations; iteration++) {
    const seen = new Float64Array(all + 1);
    const expected = new Float64Array(all + 1);
    for (const stretch of stretches) gather(stretch, model, bands, roundingShare * total, seen, expected);
    for (const b of [...bands, all]) {
      const before = b === all ? model.white : (powers[b] as number);
      const ratio = (seen[b] as number) / Math.max(expected[b] as number, 1e-300);
      // Steps that keep their direction are lengthened (as in Riedmiller & Braun 1993); the point of rest stays the same.
      const isSteady = (ratio - 1) * (lastRatios[b] as number) > 0;
      stretching[b] = isSteady ? Math.min(mostStretching, 1.5 * (stretching[b] as number)) : 1;
      lastRatios[b] = ratio - 1;
      const next = before * ratio ** (stretching[b] as number);
      if (b === all) model.white = next;
      else {
        model.freedom[b] = before * (expected[b] as number);
        powers[b] = next;
      }
    }
  }
  return model;
}

/**
 * Natural logarithm of one stretch's likelihood under the model, up to a constant.
 * @param blurPower white noise added to the model: differences far below it don't count
 */
export function logLikelihood(stretch: BandCovariance, model: BandPowers, bands: number[], blurPower: number): number {
  const { factor, logDeterminant } = factorise(stretch, model, bands, blurPower);
  const white = forward(factor, stretch.values);
  return -0.5 * white.reduce((energy, value) => energy + value * value, 0) - 0.5 * logDeterminant;
}

function meanPower(stretches: BandCovariance[]): number {
  let [sum, count] = [0, 0];
  for (const { values } of stretches) {
    for (const value of values) sum += value * value;
    count += values.length;
  }
  return sum / Math.max(1, count);
}

/** Adds one stretch's aᵀ·C·a and trace(R⁻¹·C) for every band; the last entry is the white noise's. */
function gather(
  stretch: BandCovariance,
  model: BandPowers,
  bands: number[],
  rounding: number,
  seen: Float64Array,
  expected: Float64Array,
): void {
  const size = stretch.values.length;
  const { factor } = factorise(stretch, model, bands, rounding);
  const inverse = invertFactor(factor, size);
  const solved = new Float64Array(size);
  const white = forward(factor, stretch.values);
  const pairCount = (size * (size + 1)) / 2;
  const outer = new Float64Array(pairCount);
  const precision = new Float64Array(pairCount);
  // R⁻¹ = L⁻ᵀ·L⁻¹, a = L⁻ᵀ·(L⁻¹·values); rows of L⁻¹ are in packed order.
  for (let k = 0, row = 0; k < size; row += ++k) {
    for (let i = 0, pair = 0; i <= k; i++) {
      const weight = inverse[row + i] as number;
      solved[i] = (solved[i] as number) + weight * (white[k] as number);
      for (let j = 0; j <= i; j++, pair++) {
        precision[pair] = (precision[pair] as number) + weight * (inverse[row + j] as number);
      }
    }
  }
  const last = seen.length - 1;
  for (let i = 0, pair = 0; i < size; i++) {
    for (let j = 0; j <= i; j++, pair++) {
      const times = i === j ? 1 : 2;
      outer[pair] = times * (solved[i] as number) * (solved[j] as number);
      if (i === j) {
        seen[last] = (seen[last] as number) + (outer[pair] as number);
        expected[last] = (expected[last] as number) + (precision[pair] as number);
      }
      precision[pair] = times * (precision[pair] as number);
    }
  }
  for (const b of bands) {
    const covariance = stretch.pairs[b] as Float64Array;
    let [quadratic, trace] = [0, 0];
    for (let pair = 0; pair < pairCount; pair++) {
      const entry = covariance[pair] as number;
      quadratic += (outer[pair] as number) * entry;
      trace += (precision[pair] as number) * entry;
    }
    seen[b] = (seen[b] as number) + quadratic;
    expected[b] = (expected[b] as number) + trace;
  }
}

/** Cholesky factor of the model's covariance, packed by rows. */
function factorise(
  { values, pairs }: BandCovariance,
  model: BandPowers,
  bands: number[],
  rounding: number,
): { factor: Float64Array; logDeterminant: number } {
  const size = values.length;
  const factor = new Float64Array((size * (size + 1)) / 2);
  for (const b of bands) {
    const power = model.powers[b] as number;
    const covariance = pairs[b] as Float64Array;
    for (let pair = 0; pair < factor.length; pair++) {
      factor[pair] = (factor[pair] as number) + power * (covariance[pair] as number);
    }
  }
  let logDeterminant = 0;
  for (let i = 0, row = 0; i < size; row += ++i) {
    for (let j = 0, other = 0; j <= i; other += ++j) {
      let sum = (factor[row + j] as number) + (i === j ? model.white + rounding : 0);
      for (let k = 0; k < j; k++) sum -= (factor[row + k] as number) * (factor[other + k] as number);
      if (i === j) {
        const pivot = Math.max(sum, rounding);
        logDeterminant += Math.log(pivot);
        factor[row + i] = Math.sqrt(pivot);
      } else factor[row + j] = sum / (factor[other + j] as number);
    }
  }
  return { factor, logDeterminant };
}

function forward(factor: Float64Array, values: Float64Array): Float64Array {
  const solved = values.slice();
  for (let i = 0, row = 0; i < solved.length; row += ++i) {
    let sum = solved[i] as number;
    for (let k = 0; k < i; k++) sum -= (factor[row + k] as number) * (solved[k] as number);
    solved[i] = sum / (factor[row + i] as number);
  }
  return solved;
}

/** Inverse of the packed lower triangle, packed. */
function invertFactor(factor: Float64Array, size: number): Float64Array {
  const inverse = new Float64Array(factor.length);
  for (let i = 0, row = 0; i < size; row += ++i) {
    const pivot = 1 / (factor[row + i] as number);
    for (let k = 0, other = 0; k < i; other += ++k) {
      const weight = (factor[row + k] as number) * pivot;
      for (let j = 0; j <= k; j++)
        inverse[row + j] = (inverse[row + j] as number) - weight * (inverse[other + j] as number);
    }
    inverse[row + i] = pivot;
  }
  return inverse;
}
