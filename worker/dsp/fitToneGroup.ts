import { Matrix, solve } from 'ml-matrix';
import { blockResponse } from './blockResponse.js';
import { decayWeight } from './decayingTone.js';
import type { RefinedTone } from './RefinedTone.js';
import type { ToneDemodulator } from './ToneDemodulator.js';

/** Tones closer than this many 1/T are fitted together. */
export const closeBins = 6;
const largestGroup = 6;
const steps = 4;

/**
 * Gauss-Newton steps on amplitude (real, imaginary) and frequency of each group of close tones, jointly, against the
 * group's demodulated blocks; one is undone where it does not lower the residual. Changes the tones in place.
 */
export function fitToneGroup(demodulator: ToneDemodulator, tones: RefinedTone[]): void {
  const spanBins = (2 * Math.PI) / (demodulator.blocks * demodulator.blockFrames);
  const order = [...tones.keys()].sort((a, b) => omegaOf(demodulator, tones, a) - omegaOf(demodulator, tones, b));
  let group: number[] = [];
  for (const index of [...order, -1]) {
    const last = group[group.length - 1];
    const isClose =
      index >= 0 &&
      last !== undefined &&
      omegaOf(demodulator, tones, index) - omegaOf(demodulator, tones, last) < closeBins * spanBins;
    if (!isClose || group.length === largestGroup) {
      if (group.length > 1) for (let step = 0; step < steps; step++) stepGroup(demodulator, tones, group);
      group = [];
    }
    if (index >= 0) group.push(index);
  }
}

function omegaOf(demodulator: ToneDemodulator, tones: RefinedTone[], index: number): number {
  return (demodulator.omegas[index] as number) + (tones[index]?.delta ?? 0);
}

function stepGroup(demodulator: ToneDemodulator, tones: RefinedTone[], group: number[]): void {
  const { blocks, blockFrames, origin, omegas } = demodulator;
  const response = (index: number, seen: number, block: number) => {
    const offset = omegaOf(demodulator, tones, index) - (omegas[seen] as number);
    const { real, imaginary } = blockResponse(offset, block, blockFrames, origin);
    const weight = decayWeight((tones[index] as RefinedTone).decay, block, demodulator);
    return { real: weight * real, imaginary: weight * imaginary };
  };
  /** Adds sign × the group's tones to the blocks, as each member's demodulator sees them. */
  const addGroup = (blocksOfGroup: Float64Array, sign: number, includesOwn: boolean): Float64Array => {
    group.forEach((seen, place) => {
      for (let block = 0; block < blocks; block++) {
        const row = 2 * (place * blocks + block);
        for (const index of group) {
          if (index === seen && !includesOwn) continue;
          const { real: a, imaginary: b } = (tones[index] as RefinedTone).amplitude;
          const { real: c, imaginary: s } = response(index, seen, block);
          blocksOfGroup[row] = (blocksOfGroup[row] as number) + sign * (a * c - b * s);
          blocksOfGroup[row + 1] = (blocksOfGroup[row + 1] as number) + sign * (a * s + b * c);
        }
      }
    });
    return blocksOfGroup;
  };
  const observed = new Float64Array(group.length * blocks * 2);
  group.forEach((seen, place) => observed.set((tones[seen] as RefinedTone).residual, 2 * place * blocks));
  addGroup(observed, 1, false);
  const before = addGroup(Float64Array.from(observed), -1, true);
  const saved = group.map((index) => ({ ...(tones[index] as RefinedTone) }));
  const design = new Matrix(before.length, 3 * group.length);
  group.forEach((seen, place) => {
    for (let block = 0; block < blocks; block++) {
      const row = 2 * (place * blocks + block);
      const time = block * blockFrames + (blockFrames - 1) / 2 - origin;
      group.forEach((index, column) => {
        const { real: a, imaginary: b } = (tones[index] as RefinedTone).amplitude;
        const { real: c, imaginary: s } = response(index, seen, block);
        design.set(row, 3 * column, c);
        design.set(row + 1, 3 * column, s);
        design.set(row, 3 * column + 1, -s);
        design.set(row + 1, 3 * column + 1, c);
        design.set(row, 3 * column + 2, -time * (a * s + b * c));
        design.set(row + 1, 3 * column + 2, time * (a * c - b * s));
      });
    }
  });
  const step = solve(design, Matrix.columnVector([...before]), true).to1DArray();
  group.forEach((index, column) => {
    const tone = tones[index] as RefinedTone;
    tone.amplitude = {
      real: tone.amplitude.real + (step[3 * column] ?? 0),
      imaginary: tone.amplitude.imaginary + (step[3 * column + 1] ?? 0),
    };
    tone.delta += step[3 * column + 2] ?? 0;
  });
  const after = addGroup(Float64Array.from(observed), -1, true);
  if (!(power(after) < power(before))) {
    group.forEach((index, place) => Object.assign(tones[index] as RefinedTone, saved[place]));
  }
}

function power(values: Float64Array): number {
  return values.reduce((sum, value) => sum + value * value, 0);
}
