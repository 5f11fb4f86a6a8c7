import type { FoldedBand, FoldedZone } from '../../shared/screening/MeasurementRecord.js';
import type { ZoneCells } from './ZoneCells.js';

const bands = 10;
/** Sub-bands of a band have transfers of their own: filters turn the phase across a band. */
const mostSubBands = 4;
const leastBinsOfSubBand = 4;
/** An input of which less than this share is left beside the lower zones can't be told from them. */
const leastOwnShare = 0.02;

/**
 * Multiple coherence of a slow capture with what the companion carries in each zone (conditioned spectra, Bendat & Piersol
 * 2010, ch. 7): zone 1 is taken out first, then each higher zone, folded to this capture's rate, accounts for a part of what
 * is left. Cells are weighted to equal level over time and frequency, so that a few strong ones don't speak for all.
 * Bands are tenths of 0 … fs/2; powers in dB of the total.
 */
export function foldedCoherence(cells: ZoneCells): FoldedBand[] {
  const { segments, ownBins, otherBins, ours, stepHz, coveredS } = cells;
  const half = ownBins - 1;
  const zones = Math.floor((otherBins - 1) / half);
  const powers = new Float64Array(ownBins);
  for (let k = 0; k < segments; k++) {
    for (let b = 1; b < half; b++) {
      const at = 2 * (k * ownBins + b);
      powers[b] = (powers[b] as number) + (ours[at] as number) ** 2 + (ours[at + 1] as number) ** 2;
    }
  }
  const total = powers.reduce((sum, power) => sum + power, 0);
  return Array.from({ length: bands }, (_, band): FoldedBand => {
    const from = Math.max(1, Math.round((band * half) / bands));
    const to = Math.min(half - 1, Math.round(((band + 1) * half) / bands) - 1);
    const count = Math.max(1, Math.min(mostSubBands, Math.floor((to - from + 1) / leastBinsOfSubBand)));
    const sums = Array.from({ length: zones }, () => ({
      explained: 0,
      before: 0,
      power: 0,
      chance: 0,
      inputs: 0,
      cells: 0,
    }));
    for (let part = 0; part < count; part++) {
      const first = from + Math.floor((part * (to - from + 1)) / count);
      const last = from + Math.floor(((part + 1) * (to - from + 1)) / count) - 1;
      regress(cells, first, last, powers, sums, coveredS * (last - first + 1) * stepHz);
    }
    const bandPower = powers.subarray(from, to + 1).reduce((sum, power) => sum + power, 0);
    return {
      fromHz: (band * half * stepHz) / bands,
      toHz: ((band + 1) * half * stepHz) / bands,
      powerDb: toDb(bandPower / Math.max(total, 1e-300)),
      zones: sums.map(({ explained, before, power, chance, inputs, cells: independent }, index): FoldedZone => ({
        zone: index + 1,
        coherence: before > 0 ? Math.min(1, explained / before) : 0,
        independent: Math.round(independent),
        inputs,
        powerDb: toDb(power / Math.max(total, 1e-300)),
        chanceDb: toDb(chance / Math.max(total, 1e-300)),
      })),
    };
  });
}

interface ZoneSum {
  explained: number;
  before: number;
  power: number;
  chance: number;
  inputs: number;
  cells: number;
}

/** One sub-band: each zone's input, less what the lower ones explain of it, against what they leave of this capture. */
function regress(
  { segments, ownBins, otherBins, ours, theirs }: ZoneCells,
  first: number,
  last: number,
  powers: Float64Array,
  sums: ZoneSum[],
  independentCells: number,
): void {
  const width = last - first + 1;
  const residual = new Float64Array(2 * segments * width);
  const weights = new Float64Array(segments * width);
  const raw = (source: Float64Array, rowBins: number, k: number, bin: number): [number, number] => [
    source[2 * (k * rowBins + bin)] as number,
    source[2 * (k * rowBins + bin) + 1] as number,
  ];
  for (let k = 0; k < segments; k++) {
    let level = 0;
    for (let b = first; b <= last; b++) {
      const [x, y] = raw(ours, ownBins, k, b);
      level += (x * x + y * y) / Math.max(powers[b] as number, 1e-300);
    }
    for (let b = first; b <= last; b++) {
      const weight = 1 / Math.sqrt(Math.max(level * (powers[b] as number), 1e-300));
      const [x, y] = raw(ours, ownBins, k, b);
      const at = k * width + b - first;
      weights[at] = weight;
      residual[2 * at] = weight * x;
      residual[2 * at + 1] = weight * y;
    }
  }
  if (powerOf(residual) === 0) return;
  const done: { input: Float64Array; power: number }[] = [];
  sums.forEach((sum, index) => {
    const zone = index + 1;
    const input = new Float64Array(residual.length);
    let rawPower = 0;
    for (let k = 0; k < segments; k++) {
      for (let b = first; b <= last; b++) {
        const isMirrored = zone % 2 === 0;
        const bin = isMirrored ? zone * (ownBins - 1) - b : (zone - 1) * (ownBins - 1) + b;
        const [x, y] = raw(theirs, otherBins, k, bin);
        const at = k * width + b - first;
        input[2 * at] = (weights[at] as number) * x;
        input[2 * at + 1] = (weights[at] as number) * (isMirrored ? -y : y);
        rawPower += x * x + y * y;
      }
    }
    const before = powerOf(input);
    for (const lower of done) takeOut(input, lower.input, lower.power);
    const own = powerOf(input);
    const residualPower = powerOf(residual);
    if (!(own > leastOwnShare * before) || residualPower === 0) return;
    const speaking = independentCells * evenness(input, residual, width, segments);
    const [real, imaginary] = inner(input, residual);
    const explained = (real * real + imaginary * imaginary) / own;
    takeOut(residual, input, own);
    done.push({ input, power: own });
    sum.explained += explained;
    sum.before += residualPower;
    sum.inputs += 1;
    sum.cells += speaking;
    sum.chance += (residualPower / Math.max(speaking, 1) / own) * rawPower;
    // What chance alone explains is taken off before the power is stated.
    const transfer = Math.max(0, explained - residualPower / Math.max(speaking, 1)) / own;
    sum.power += transfer * rawPower;
  });
}

/**
 * Share of the cells that speak for themselves when chance is judged. Where strong cells of the input meet strong cells of the
 * residual, few products carry the sum; lines, finally, repeat from segment to segment and speak once
 * (Bartlett 1935: (1 − ρ₁ρ₂)/(1 + ρ₁ρ₂)).
 */
function evenness(input: Float64Array, residual: Float64Array, width: number, segments: number): number {
  let [sum, squares] = [0, 0];
  for (let n = 0; n < input.length; n += 2) {
    const product =
      ((input[n] as number) ** 2 + (input[n + 1] as number) ** 2) *
      ((residual[n] as number) ** 2 + (residual[n + 1] as number) ** 2);
    sum += product;
    squares += product * product;
  }
  if (sum === 0) return 0;
  const cells = width * segments;
  const variance = (powerOf(input) * powerOf(residual)) / (cells * sum);
  // Independent Gaussian cells have Σp²/(Σp)² = 4 over their number.
  const spread = Math.min(1, (4 * sum * sum) / (cells * squares));
  const repeats = repetition(input, width, segments) * repetition(residual, width, segments);
  return (Math.min(1, variance) * spread * (1 - repeats)) / (1 + repeats);
}

/** Segments two apart share no samples: 0 … 1, how far one foretells the other, each bin with a phase step of its own. */
function repetition(values: Float64Array, width: number, segments: number): number {
  const power = powerOf(values);
  if (power === 0) return 0;
  let sum = 0;
  for (let b = 0; b < width; b++) {
    let [real, imaginary] = [0, 0];
    for (let k = 0; k + 2 < segments; k++) {
      const at = 2 * (k * width + b);
      const later = at + 4 * width;
      const [x, y, u, v] = [values[at], values[at + 1], values[later], values[later + 1]] as [
        number,
        number,
        number,
        number,
      ];
      real += x * u + y * v;
      imaginary += x * v - y * u;
    }
    sum += Math.hypot(real, imaginary);
  }
  return Math.min(1, sum / power);
}

function powerOf(values: Float64Array): number {
  let sum = 0;
  for (const value of values) sum += value * value;
  return sum;
}

/** Σ conj(a)·b of interleaved complex values. */
function inner(a: Float64Array, b: Float64Array): [number, number] {
  let [real, imaginary] = [0, 0];
  for (let n = 0; n < a.length; n += 2) {
    const [ar, ai, br, bi] = [a[n] as number, a[n + 1] as number, b[n] as number, b[n + 1] as number];
    real += ar * br + ai * bi;
    imaginary += ar * bi - ai * br;
  }
  return [real, imaginary];
}

/** Takes out of `target` what `input` explains of it. */
function takeOut(target: Float64Array, input: Float64Array, power: number): void {
  const [real, imaginary] = inner(input, target);
  const [c, s] = [real / power, imaginary / power];
  for (let n = 0; n < target.length; n += 2) {
    const [x, y] = [input[n] as number, input[n + 1] as number];
    target[n] = (target[n] as number) - (x * c - y * s);
    target[n + 1] = (target[n + 1] as number) - (x * s + y * c);
  }
}

const toDb = (ratio: number): number => 10 * Math.log10(Math.max(ratio, 1e-20));
