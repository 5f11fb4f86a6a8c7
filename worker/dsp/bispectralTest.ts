import { type BispectrumCell, bispectrumLength } from './BispectrumMeter.js';
import { chiSquareTail } from './chiSquareTail.js';
import { seededRandom } from './seededRandom.js';

const stride = bispectrumLength + 2;
const surrogates = 16;
/** Bins this far below the strongest hold the window's leakage, which hangs together by itself. */
const leastPowerShare = 1e-5;
const leastCells = 12;

export interface BispectralTest {
  /** Mean of 2P|y|² over the cells; 2 where the bispectrum is zero. */
  statistic: number;
  cells: number;
  /** Chance of so much in stationary noise without a bispectrum in these cells. */
  chance: number;
}

/**
 * Tests whether the bispectrum differs from zero anywhere in the given cells (Hinich 1982; outer triangle: Hinich & Wolinsky
 * 1988). y(j,k) is the mean over P blocks of X_j·X_k·conj(X_l) (inner, l = j + k) or X_j·X_k·X_l (outer, j + k + l = N),
 * over the square root of the product of the three mean powers; 2P|y|² is chi-square with two degrees of freedom where
 * the bispectrum vanishes. Cells that share a bin depend on each other and the tail is heavier, so the sum is scaled by
 * surrogates with the same magnitudes and random phases, which keep everything but the triple relation.
 * @param spectra interleaved, one block of 65 complex bins after the other; @param blocks P, at least 64
 * @returns null where too few cells hold power
 */
export function bispectralTest(
  spectra: Float64Array,
  blocks: number,
  cells: BispectrumCell[],
  triangle: 'inner' | 'outer',
): BispectralTest | null {
  const power = meanPowers(spectra, blocks);
  const least = leastPowerShare * power.reduce((highest, value) => Math.max(highest, value), 0);
  const used = cells.filter(({ j, k, l }) => [j, k, l].every((bin) => (power[bin] as number) > least));
  if (used.length < leastCells) return null;
  const sign = triangle === 'inner' ? -1 : 1;
  const seen = cellSum(spectra, blocks, used, power, sign);
  const random = seededRandom(used.length);
  let [sum, square] = [0, 0];
  for (let turn = 0; turn < surrogates; turn++) {
    const value = cellSum(randomPhases(spectra, blocks, random), blocks, used, power, sign);
    sum += value;
    square += value * value;
  }
  const mean = sum / surrogates;
  const observed = (square - sum * mean) / (surrogates - 1);
  // Never less than independent cells would show; and the mean itself is known from as many surrogates only.
  const variance = Math.max(observed, (mean * mean) / used.length) * (1 + 1 / surrogates);
  // A scaled chi-square with the surrogates' mean and variance (Satterthwaite 1946).
  const degrees = (2 * mean * mean) / variance;
  return { statistic: seen / used.length, cells: used.length, chance: chiSquareTail((seen * degrees) / mean, degrees) };
}

function meanPowers(spectra: Float64Array, blocks: number): Float64Array {
  const power = new Float64Array(bispectrumLength / 2 + 1);
  for (let block = 0; block < blocks; block++) {
    for (let bin = 0; bin < power.length; bin++) {
      const place = block * stride + 2 * bin;
      const squared = (spectra[place] as number) ** 2 + (spectra[place + 1] as number) ** 2;
      power[bin] = (power[bin] as number) + squared / blocks;
    }
  }
  return power;
}

function randomPhases(spectra: Float64Array, blocks: number, random: () => number): Float64Array {
  const turned = new Float64Array(blocks * stride);
  for (let place = 0; place < turned.length; place += 2) {
    const angle = 2 * Math.PI * random();
    const [c, s] = [Math.cos(angle), Math.sin(angle)];
    const [real, imaginary] = [spectra[place] as number, spectra[place + 1] as number];
    turned[place] = real * c - imaginary * s;
    turned[place + 1] = real * s + imaginary * c;
  }
  return turned;
}

function cellSum(
  spectra: Float64Array,
  blocks: number,
  cells: BispectrumCell[],
  power: Float64Array,
  sign: 1 | -1,
): number {
  let total = 0;
  for (const { j, k, l } of cells) {
    let [real, imaginary] = [0, 0];
    for (let block = 0; block < blocks; block++) {
      const first = block * stride;
      const [a, b] = [spectra[first + 2 * j] as number, spectra[first + 2 * j + 1] as number];
      const [c, d] = [spectra[first + 2 * k] as number, spectra[first + 2 * k + 1] as number];
      const [e, f] = [spectra[first + 2 * l] as number, sign * (spectra[first + 2 * l + 1] as number)];
      const [g, h] = [a * c - b * d, a * d + b * c];
      real += g * e - h * f;
      imaginary += g * f + h * e;
    }
    const scale = blocks * (power[j] as number) * (power[k] as number) * (power[l] as number);
    total += (2 * (real * real + imaginary * imaginary)) / scale;
  }
  return total;
}
