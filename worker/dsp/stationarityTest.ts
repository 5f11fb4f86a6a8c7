import { bispectrumLength } from './BispectrumMeter.js';
import { chiSquareTail } from './chiSquareTail.js';

const stride = bispectrumLength + 2;
const epochs = 8;
const bands = 4;
const firstBin = 3;

/**
 * Whether the power in four bands stays the same over eight stretches of the capture: scatter of the stretches' means against
 * the scatter of the blocks within them (one-way analysis of variance, Fisher 1925; chi-square for many blocks). The
 * blocks' own scatter is measured, so that skewed noise and leaking windows don't look like change.
 * @param spectra interleaved, one block of 65 complex bins after the other; @param blocks at least 64
 * @returns the chance of so much change in stationary noise
 */
export function stationarityTest(spectra: Float64Array, blocks: number): number {
  const perEpoch = Math.floor(blocks / epochs);
  const perBand = Math.floor((bispectrumLength / 2 - 1 - firstBin) / bands);
  let least = 1;
  for (let band = 0; band < bands; band++) {
    const powers = blockPowers(spectra, epochs * perEpoch, firstBin + band * perBand, perBand);
    const mean = powers.reduce((sum, value) => sum + value, 0) / powers.length;
    let [between, within] = [0, 0];
    for (let epoch = 0; epoch < epochs; epoch++) {
      const part = powers.subarray(epoch * perEpoch, (epoch + 1) * perEpoch);
      const own = part.reduce((sum, value) => sum + value, 0) / perEpoch;
      between += perEpoch * (own - mean) ** 2;
      within += part.reduce((sum, value) => sum + (value - own) ** 2, 0);
    }
    const variance = within / (powers.length - epochs);
    least = Math.min(least, variance > 0 ? chiSquareTail(between / variance, epochs - 1) : 1);
  }
  // Bonferroni over the bands, which may hang together.
  return Math.min(1, bands * least);
}

function blockPowers(spectra: Float64Array, blocks: number, from: number, count: number): Float64Array {
  return Float64Array.from({ length: blocks }, (_, block) => {
    let power = 0;
    for (let bin = from; bin < from + count; bin++) {
      const place = block * stride + 2 * bin;
      power += (spectra[place] as number) ** 2 + (spectra[place + 1] as number) ** 2;
    }
    return power;
  });
}
