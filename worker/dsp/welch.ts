import { KeptSegments } from './KeptSegments.js';
import { SegmentSpectra } from './SegmentSpectra.js';

export interface WelchSpectrum {
  resolutionHz: number;
  segments: number;
  densityMean: Float64Array;
  /** Median over segments divided by its bias; for noise floors only. */
  densityMedian: Float64Array;
}

/**
 * Welch's averaged modified periodogram of samples in memory (Welch 1967): one-sided density in (sample unit)²/Hz, bins
 * 0 … N/2, Hann periodic window, 50 % overlap, mean removed per segment, nothing padded.
 * @throws RangeError when there are fewer samples than one segment
 */
export function welch(samples: Float64Array, sampleRateHz: number, segmentLength: number): WelchSpectrum {
  if (samples.length < segmentLength) {
    throw new RangeError(`One segment needs ${segmentLength} samples, got ${samples.length}.`);
  }
  const kept = new KeptSegments(2048);
  const sum = new Float64Array(segmentLength / 2 + 1);
  const spectra = new SegmentSpectra(segmentLength, sampleRateHz, (density, firstFrame) => {
    for (let bin = 0; bin < sum.length; bin++) sum[bin] = (sum[bin] as number) + (density[bin] as number);
    kept.add(density, firstFrame);
  });
  spectra.push(samples);
  return {
    resolutionHz: spectra.resolutionHz,
    segments: spectra.segments,
    densityMean: sum.map((value) => value / spectra.segments),
    densityMedian: kept.median(),
  };
}
