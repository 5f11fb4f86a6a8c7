import { createRealFft } from '../dsp/createRealFft.js';
import { hannWindow } from '../dsp/hannWindow.js';
import { runningMedian } from '../dsp/runningMedian.js';
import type { PickedTone } from './pickTones.js';

/** Height over the running median of one periodogram: by chance in 3 of 10^8 bins. */
const leastRatio = 25;
const mostCloseTones = 40;
/** Nearer than this many 1/T to a known tone the residual is that tone's own misfit. */
const leastDistanceBins = 1.8;

/**
 * Tones that hide beside known ones: lines of the whole capture's residual (known tones taken out) that the fine spectrum
 * could not separate. Only within the reach of a known tone's main lobe there, and only where the residual at
 * that tone itself is lower, so that the skirts of a tone that wanders or decays are not taken for neighbours.
 * @param residual samples less the known tones; @param fineHz resolution of the fine spectrum
 */
export function pickCloseTones(
  residual: Float64Array,
  known: PickedTone[],
  sampleRateHz: number,
  fineHz: number,
): PickedTone[] {
  const count = residual.length;
  const window = hannWindow(count);
  const size = 2 ** Math.ceil(Math.log2(count));
  const padded = new Float64Array(size);
  let sumSquares = 0;
  for (let n = 0; n < count; n++) {
    const weight = window[n] as number;
    padded[n] = (residual[n] as number) * weight;
    sumSquares += weight * weight;
  }
  const spectrum = createRealFft(size).transform(padded);
  const density = Float64Array.from({ length: size / 2 + 1 }, (_, bin) => {
    const power = (spectrum[2 * bin] as number) ** 2 + (spectrum[2 * bin + 1] as number) ** 2;
    return (2 * power) / (sampleRateHz * sumSquares);
  });
  const gridHz = sampleRateHz / size;
  const binHz = sampleRateHz / count;
  const floor = runningMedian(density, 64);
  const found: PickedTone[] = [];
  for (const host of known) {
    const highest = (fromHz: number, toHz: number): number => {
      let best = Math.max(1, Math.ceil(fromHz / gridHz));
      const last = Math.min(density.length - 2, Math.floor(toHz / gridHz));
      for (let bin = best; bin <= last; bin++) if ((density[bin] as number) > (density[best] as number)) best = bin;
      return best;
    };
    const own = highest(host.frequencyHz - leastDistanceBins * binHz, host.frequencyHz + leastDistanceBins * binHz);
    for (const side of [-1, 1]) {
      const [near, far] = [host.frequencyHz + side * leastDistanceBins * binHz, host.frequencyHz + side * 4 * fineHz];
      const bin = highest(Math.min(near, far), Math.max(near, far));
      const value = density[bin] as number;
      const isPeak = value > (density[bin - 1] as number) && value > (density[bin + 1] as number);
      if (!isPeak || value < leastRatio * (floor[bin] as number) || value < 2 * (density[own] as number)) continue;
      const frequencyHz = bin * gridHz;
      const all = [...known, ...found];
      if (all.some((other) => Math.abs(other.frequencyHz - frequencyHz) < leastDistanceBins * binHz)) continue;
      const power = value * 1.5 * binHz;
      const level = Math.min(host.floor, (floor[bin] as number) / Math.LN2);
      found.push({
        frequencyHz,
        power,
        widthHz: 0,
        floor: level,
        ratio: power / (1.5 * fineHz * level),
        peaksPerHz: host.peaksPerHz,
      });
    }
  }
  return found.sort((a, b) => b.power - a.power).slice(0, mostCloseTones);
}
