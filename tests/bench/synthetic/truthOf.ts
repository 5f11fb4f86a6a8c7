import FFT from 'fft.js';
import { plainWelch } from '../simple/plainWelch.js';
import { meanPower } from './drawing.js';

export interface FoldTruth {
  label: 'folded' | 'grey' | 'clean';
  foldRatioDb: number;
  foldRatioInnerDb: number;
  bandFoldDb: number[];
}

const [foldedDb, cleanDb, bands] = [-40, -70, 10] as const;
const leastDb = -120;

/**
 * Labels a capture from its parts: folded energy against the whole, noise included; "folded" counts only what lands below
 * 0.9·fs/2 (half-band filters leave the top tenth unprotected). Lengths: a power of two, all the same.
 */
export function truthOf(parts: { rightful: Float64Array; folded: Float64Array; noise: Float64Array }): FoldTruth {
  const total = meanPower(parts.rightful) + meanPower(parts.folded) + meanPower(parts.noise);
  const foldRatioDb = decibels(meanPower(parts.folded) / total);
  const foldRatioInnerDb = foldRatioDb + decibels(shareBelow(parts.folded, 0.9));
  return {
    label: foldRatioInnerDb > foldedDb ? 'folded' : foldRatioDb < cleanDb ? 'clean' : 'grey',
    foldRatioDb,
    foldRatioInnerDb,
    bandFoldDb: bandFoldDb(parts),
  };
}

/** Share of the energy below `share`·fs/2. */
function shareBelow(samples: Float64Array, share: number): number {
  const fft = new FFT(samples.length);
  const spectrum = fft.createComplexArray() as number[];
  fft.realTransform(
    spectrum,
    samples.map((value, n) => value * Math.sin((Math.PI * n) / samples.length) ** 2),
  );
  let [inner, all] = [0, 0];
  for (let bin = 0; bin <= samples.length / 2; bin++) {
    const power = (spectrum[2 * bin] as number) ** 2 + (spectrum[2 * bin + 1] as number) ** 2;
    all += power;
    if (bin < (share * samples.length) / 2) inner += power;
  }
  return all === 0 ? 1 : inner / all;
}

function bandFoldDb({ rightful, folded, noise }: Record<'rightful' | 'folded' | 'noise', Float64Array>): number[] {
  const length = Math.min(1024, rightful.length / 8);
  const [b, f, n] = [rightful, folded, noise].map((part) => plainWelch(part, 2, length)) as [
    Float64Array,
    Float64Array,
    Float64Array,
  ];
  return Array.from({ length: bands }, (_, band) => {
    let [inBand, all] = [0, 0];
    for (let bin = Math.floor((band * length) / 2 / bands) + 1; bin <= ((band + 1) * length) / 2 / bands; bin++) {
      inBand += f[bin] as number;
      all += (b[bin] as number) + (f[bin] as number) + (n[bin] as number);
    }
    return Math.max(leastDb, decibels(inBand / Math.max(all, 1e-30)));
  });
}

function decibels(ratio: number): number {
  return 10 * Math.log10(Math.max(ratio, 1e-30));
}
