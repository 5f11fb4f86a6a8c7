import { createRealFft, type RealFft } from './createRealFft.js';
import { hannWindow } from './hannWindow.js';

/** Called once a segment; `density` is overwritten by the next one. */
export type OnSegment = (density: Float64Array, firstFrame: number) => void;

/**
 * Streams samples into Welch segments (Welch 1967): Hann periodic, 50 % overlap, mean removed per segment. Each segment
 * gives a modified periodogram as a one-sided density, (sample unit)²/Hz: |X|²/(fs·Σw²), doubled except at 0 and fs/2.
 * Memory: one segment. The order of segments, and so of every sum over them, is the order of time.
 */
export class SegmentSpectra {
  readonly resolutionHz: number;
  readonly binCount: number;
  segments = 0;
  private readonly fft: RealFft;
  private readonly window: Float64Array;
  private readonly buffer: Float64Array;
  private readonly windowed: Float64Array;
  private readonly density: Float64Array;
  private readonly scale: number;
  private filled = 0;
  private nextFrame = 0;

  constructor(
    readonly segmentLength: number,
    sampleRateHz: number,
    private readonly onSegment: OnSegment,
    private readonly hop = segmentLength / 2,
    /** Segments for which this says no are left out (a dropout, a gap or clipping inside). */
    private readonly isUsable: (firstFrame: number, lastFrame: number) => boolean = () => true,
  ) {
    this.fft = createRealFft(segmentLength);
    this.window = hannWindow(segmentLength);
    this.buffer = new Float64Array(segmentLength);
    this.windowed = new Float64Array(segmentLength);
    this.binCount = segmentLength / 2 + 1;
    this.density = new Float64Array(this.binCount);
    this.resolutionHz = sampleRateHz / segmentLength;
    let sumSquares = 0;
    for (const value of this.window) sumSquares += value * value;
    this.scale = 1 / (sampleRateHz * sumSquares);
  }

  /** Samples must be finite. Blocks of any length give the same segments. */
  push(samples: Float64Array, frames = samples.length): void {
    let taken = 0;
    while (taken < frames) {
      const count = Math.min(frames - taken, this.segmentLength - this.filled);
      this.buffer.set(samples.subarray(taken, taken + count), this.filled);
      this.filled += count;
      taken += count;
      if (this.filled === this.segmentLength) this.finishSegment();
    }
  }

  private finishSegment(): void {
    if (this.isUsable(this.nextFrame, this.nextFrame + this.segmentLength - 1)) this.computeSegment();
    this.buffer.copyWithin(0, this.hop);
    this.filled = this.segmentLength - this.hop;
    this.nextFrame += this.hop;
  }

  private computeSegment(): void {
    const { segmentLength, buffer, windowed, window, density } = this;
    let sum = 0;
    for (let n = 0; n < segmentLength; n++) sum += buffer[n] as number;
    const mean = sum / segmentLength;
    for (let n = 0; n < segmentLength; n++) windowed[n] = ((buffer[n] as number) - mean) * (window[n] as number);
    const spectrum = this.fft.transform(windowed);
    for (let bin = 0; bin < this.binCount; bin++) {
      const real = spectrum[2 * bin] as number;
      const imaginary = spectrum[2 * bin + 1] as number;
      density[bin] = 2 * this.scale * (real * real + imaginary * imaginary);
    }
    density[0] = (density[0] as number) / 2;
    density[this.binCount - 1] = (density[this.binCount - 1] as number) / 2;
    this.onSegment(density, this.nextFrame);
    this.segments++;
  }
}
