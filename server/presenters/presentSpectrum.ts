import type { SpectrumDto } from '../../shared/schemas/capture.js';
import type { Spectrum } from '../entities/index.js';

/** Lower densities than this say nothing; 0 itself has no decibel. */
const leastDensity = 1e-30;
const toDb = (density: number): number => 10 * Math.log10(Math.max(density, leastDensity));
/** Finer steps are neither visible nor meaningful, and cost bytes. */
const rounded = (value: number): number => Math.round(value * 1000) / 1000;

/** Bytes of a spectrum's column (little-endian float32) as numbers. Copies, since a view must begin at a multiple of 4. */
function toDensities(bytes: Buffer): Float32Array {
  const copy = new Uint8Array(bytes);
  return new Float32Array(copy.buffer, 0, Math.floor(copy.byteLength / 4));
}

export interface SpectrumWindow {
  fromHz?: number | undefined;
  toHz?: number | undefined;
  points: number;
}

export interface SpectrumOf {
  channel: number;
  kind: SpectrumDto['kind'];
  unit: string;
  sampleRateHz: number | null;
}

/**
 * Cuts the stretch asked for and pools its bins down to at most `points`. A pool is shown by its largest bin at that
 * bin's own frequency, so that no tone gets lower or moves; the median curve is averaged over the pool instead.
 */
export function presentSpectrum(spectrum: Spectrum, of: SpectrumOf, window: SpectrumWindow): SpectrumDto {
  const { resolutionHz } = spectrum;
  const mean = toDensities(spectrum.densityMean);
  const median = spectrum.densityMedian && toDensities(spectrum.densityMedian);
  const first = Math.min(mean.length, Math.max(0, Math.ceil((window.fromHz ?? 0) / resolutionHz - 1e-9)));
  const end = Math.min(mean.length, Math.floor((window.toHz ?? Infinity) / resolutionHz + 1e-9) + 1);
  const binsPerPool = Math.max(1, Math.ceil((end - first) / window.points));

  const frequencyHz: number[] = [];
  const densityDb: number[] = [];
  const medianDb: number[] | null = median ? [] : null;
  for (let start = first; start < end; start += binsPerPool) {
    const stop = Math.min(end, start + binsPerPool);
    let largest = start;
    let medianSum = 0;
    for (let bin = start; bin < stop; bin += 1) {
      if ((mean[bin] ?? 0) > (mean[largest] ?? 0)) largest = bin;
      medianSum += median?.[bin] ?? 0;
    }
    frequencyHz.push(largest * resolutionHz);
    densityDb.push(rounded(toDb(mean[largest] ?? 0)));
    medianDb?.push(rounded(toDb(medianSum / (stop - start))));
  }

  const sampleRateHz = of.sampleRateHz ?? 2 * Math.max(0, mean.length - 1) * resolutionHz;
  return {
    channel: of.channel,
    kind: spectrum.kind,
    unit: of.unit,
    sampleRateHz,
    foldingFrequencyHz: sampleRateHz / 2,
    resolutionHz,
    segments: spectrum.segments,
    frequencyHz,
    densityDb,
    medianDb,
  };
}

/** What is told of a channel that has no such spectrum: its rate, and no bins. */
export function presentNoSpectrum({ channel, kind, unit, sampleRateHz }: SpectrumOf): SpectrumDto {
  const rateHz = sampleRateHz ?? 0;
  return {
    channel,
    kind,
    unit,
    sampleRateHz: rateHz,
    foldingFrequencyHz: rateHz / 2,
    resolutionHz: 0,
    segments: 0,
    frequencyHz: [],
    densityDb: [],
    medianDb: null,
  };
}
