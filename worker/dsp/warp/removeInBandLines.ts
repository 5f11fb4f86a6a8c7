import type { SpeedLaw } from './SpeedLaw.js';
import type { TransformOf } from './transformOf.js';
import { binPowers, warpedLines } from './warpedLines.js';

const leastRatio = 12;
const firstBin = 3;
/** Bins on each side that belong to a line: its amplitude and phase may change slowly. */
const lineReach = 5;
const rounds = 3;

/**
 * Takes out of the samples what stands in lines below fs/2 at all times of the law, so that their smeared images don't lie
 * over what is folded. Warped time is the measure (each sample weighs its share of it), in which the lines are orthogonal;
 * a few rounds take what is left.
 * @param tapered samples that vanish at both ends
 */
export function removeInBandLines(tapered: Float64Array, law: SpeedLaw, transformOf: TransformOf): Float64Array {
  const { length, warped } = law;
  const shares = warped.map((share, n) => {
    const before = warped[n - 1] ?? share - ((warped[n + 1] ?? 1) - share);
    const after = warped[n + 1] ?? 1;
    return (after - before) / 2;
  });
  let fastest = 0;
  shares.forEach((share) => (fastest = Math.max(fastest, share * length)));
  const to = Math.floor(length / 2 / fastest) - lineReach;
  if (to <= firstBin) return tapered;
  const transform = transformOf(to + lineReach);
  let rest = tapered;
  for (let round = 0; round < rounds; round++) {
    const spectrum = transform.forward(
      warped,
      rest.map((value, n) => value * (shares[n] as number)),
    );
    const lines = warpedLines(binPowers(spectrum), firstBin, to, leastRatio);
    if (lines.length === 0) return rest;
    const kept = new Float64Array(spectrum.length);
    for (const { bin } of lines) {
      for (let k = Math.max(1, bin - lineReach); k <= bin + lineReach; k++) {
        kept[2 * k] = 2 * (spectrum[2 * k] as number);
        kept[2 * k + 1] = 2 * (spectrum[2 * k + 1] as number);
      }
    }
    const lineSignal = transform.backward(warped, kept);
    rest = rest.map((value, n) => value - (lineSignal[n] as number));
  }
  return rest;
}
