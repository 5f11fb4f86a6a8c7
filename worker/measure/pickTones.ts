import { findPeaks } from '../dsp/findPeaks.js';
import { runningMedian } from '../dsp/runningMedian.js';
import type { SpectrumMeter } from './SpectrumMeter.js';

export interface PickedTone {
  frequencyHz: number;
  /** Power under the peak, linear. */
  power: number;
  /** Spread of the peak's power about its centre, Hz. */
  widthHz: number;
  floor: number;
  ratio: number;
  peaksPerHz: number;
}

/** Lowest stand-out kept in a record, 6 dB: thresholds choose among these. */
const leastRatio = 4;
const mostTones = 80;

/** Tones of the fine spectrum: peaks over a running median, strongest first. */
export function pickTones(meter: SpectrumMeter): PickedTone[] {
  const { segments, resolutionHz, binCount } = meter.fine;
  if (segments < 3) return [];
  const mean = meter.fineSum.map((value) => value / segments);
  const floor = runningMedian(mean, Math.min(48, Math.floor(binCount / 8)));
  const peaks = findPeaks(mean, floor, { leastRatio, separationBins: 3, firstBin: 3, limit: mostTones });
  return peaks.map(({ bin, ratio, floor: level }) => {
    let [power, moment, second] = [0, 0, 0];
    for (let near = Math.max(1, bin - 2); near <= Math.min(binCount - 1, bin + 2); near++) {
      const above = Math.max(0, (mean[near] as number) - level);
      power += above;
      moment += above * near;
      second += above * near * near;
    }
    const centre = power > 0 ? moment / power : bin;
    const reach = 0.05 * (binCount - 1);
    const near = peaks.filter((other) => Math.abs(other.bin - bin) <= reach).length;
    const width = Math.min(binCount - 1, bin + reach) - Math.max(0, bin - reach);
    return {
      frequencyHz: centre * resolutionHz,
      power: power * resolutionHz,
      widthHz: Math.sqrt(Math.max(0, second / Math.max(power, 1e-300) - centre * centre)) * resolutionHz,
      floor: level,
      ratio,
      peaksPerHz: near / (width * resolutionHz),
    };
  });
}
