import type { MeasurementRecord } from '../../shared/screening/MeasurementRecord.js';

/** A spectrum kept for pictures: one-sided linear densities, (full scale or unit)²/Hz, bin k at k·resolutionHz. */
export interface MeasuredSpectrum {
  kind: 'survey' | 'fine';
  resolutionHz: number;
  segments: number;
  densityMean: Float32Array;
  /** Bias-corrected median over segments; null where too few segments were kept. */
  densityMedian: Float32Array | null;
}

export interface ChannelMeasurement {
  record: MeasurementRecord;
  spectra: MeasuredSpectrum[];
}
