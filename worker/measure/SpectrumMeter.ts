import { KeptSegments } from '../dsp/KeptSegments.js';
import { PooledFrames } from '../dsp/PooledFrames.js';
import { SegmentSpectra } from '../dsp/SegmentSpectra.js';
import type { FrameSpan } from './IntegrityMeter.js';
import type { SegmentPlan } from './planSegments.js';

/** Equal bands of the short frames from 0 to fs/2. */
export const frameBands = 16;

/** Second pass over one channel: survey and fine sums, kept survey segments, and band powers of short frames over time. */
export class SpectrumMeter {
  readonly survey: SegmentSpectra;
  readonly fine: SegmentSpectra;
  readonly surveySum: Float64Array;
  readonly fineSum: Float64Array;
  readonly kept = new KeptSegments(96);
  readonly frames = new PooledFrames(1024);
  /** Per survey segment (pooled when many): mean density in the last 4 % but one bin below fs/2, and its square. */
  readonly edgeFrames = new PooledFrames(2048);
  private readonly short: SegmentSpectra;

  constructor(plan: SegmentPlan, sampleRateHz: number, avoided: FrameSpan[]) {
    const isUsable = (first: number, last: number): boolean =>
      avoided.every((span) => span.last < first || span.first > last);
    this.surveySum = new Float64Array(plan.surveyLength / 2 + 1);
    this.fineSum = new Float64Array(plan.fineLength / 2 + 1);
    const { from, to } = edgeBins(plan.surveyLength);
    const hop = plan.surveyLength / 2;
    this.survey = new SegmentSpectra(
      plan.surveyLength,
      sampleRateHz,
      (density, firstFrame) => {
        addTo(this.surveySum, density);
        this.kept.add(density, firstFrame);
        let edge = 0;
        for (let bin = from; bin <= to; bin++) edge += density[bin] as number;
        this.edgeFrames.add(Float64Array.of(edge / (to - from + 1)));
      },
      hop,
      isUsable,
    );
    const fineHop = plan.fineLength / 2;
    this.fine = new SegmentSpectra(
      plan.fineLength,
      sampleRateHz,
      (density) => addTo(this.fineSum, density),
      fineHop,
      isUsable,
    );
    this.short = new SegmentSpectra(
      plan.frameLength,
      sampleRateHz,
      (density) => this.frames.add(bandMeans(density, frameBands)),
      plan.frameLength / 2,
      isUsable,
    );
  }

  push(samples: Float64Array, frames: number): void {
    this.survey.push(samples, frames);
    this.fine.push(samples, frames);
    this.short.push(samples, frames);
  }
}

/** Bins of the band edge: the last 2 % below fs/2 without the last bins, widened to four bins in short spectra. */
export function edgeBins(segmentLength: number): { from: number; to: number } {
  const last = segmentLength / 2;
  const to = last - (segmentLength >= 1024 ? 3 : 1);
  return { from: Math.max(1, Math.min(Math.ceil(0.98 * last), to - 3)), to };
}

function addTo(sum: Float64Array, density: Float64Array): void {
  for (let bin = 0; bin < sum.length; bin++) sum[bin] = (sum[bin] as number) + (density[bin] as number);
}

/** Mean density of equal bands; the two bins at 0 and the one at fs/2 are left out. */
function bandMeans(density: Float64Array, bands: number): Float64Array {
  const means = new Float64Array(bands);
  const perBand = (density.length - 1) / bands;
  for (let band = 0; band < bands; band++) {
    let sum = 0;
    let count = 0;
    for (let bin = Math.max(2, band * perBand); bin < Math.min(density.length - 1, (band + 1) * perBand); bin++) {
      sum += density[bin] as number;
      count++;
    }
    means[band] = count > 0 ? sum / count : 0;
  }
  return means;
}
