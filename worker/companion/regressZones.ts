import { cellEvenness } from './cellEvenness.js';
import { inner, powerOf, takeOut } from './complexSums.js';
import type { ZoneCells } from './ZoneCells.js';

/** An input of which less than this share is left beside the lower zones can't be told from them. */
const leastOwnShare = 0.02;

export interface ZoneSum {
  explained: number;
  before: number;
  power: number;
  chance: number;
  inputs: number;
  cells: number;
}

/** One sub-band: each zone's input, less what the lower ones explain of it, against what they leave of this capture. */
export function regressZones(
  { segments, ownBins, otherBins, ours, theirs }: ZoneCells,
  first: number,
  last: number,
  powers: Float64Array,
  levels: Float64Array,
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
    for (let b = first; b <= last; b++) {
      const weight = 1 / Math.sqrt(Math.max((levels[k] as number) * (powers[b] as number), 1e-300));
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
    const { variance, tail } = cellEvenness(input, residual, width, segments);
    const speaking = Math.max(1, independentCells * variance);
    const [real, imaginary] = inner(input, residual);
    const explained = (real * real + imaginary * imaginary) / own;
    takeOut(residual, input, own);
    done.push({ input, power: own });
    sum.explained += explained;
    sum.before += residualPower;
    sum.inputs += 1;
    sum.cells += independentCells * tail;
    sum.chance += (residualPower / speaking / own) * rawPower;
    // What chance alone explains is taken off before the power is stated.
    const transfer = Math.max(0, explained - residualPower / speaking) / own;
    sum.power += transfer * rawPower;
  });
}
