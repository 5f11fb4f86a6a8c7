import { createRealFft, type RealFft } from './createRealFft.js';
import { hannWindow } from './hannWindow.js';

export const bispectrumLength = 128;
const half = bispectrumLength / 2;
/** The lowest bins hold what the removal of the mean leaves; the last next to fs/2 are real or nearly so. */
const firstBin = 3;
const lastBin = half - 2;

/** Three bins whose frequencies add up: j + k = l (inner triangle) or j + k + l = N (outer triangle, through fs). */
export interface BispectrumCell {
  j: number;
  k: number;
  l: number;
}

/** Every second bin only: neighbours are correlated by the window. */
export function bispectrumCells(triangle: 'inner' | 'outer'): BispectrumCell[] {
  const cells: BispectrumCell[] = [];
  for (let j = firstBin; j <= lastBin; j += 2) {
    for (let k = firstBin; k < j; k += 2) {
      const l = triangle === 'inner' ? j + k : bispectrumLength - j - k;
      const isInside = triangle === 'inner' ? l <= lastBin : l > j && l <= lastBin;
      if (isInside) cells.push({ j, k, l });
    }
  }
  return cells;
}

/**
 * Collects the spectra of consecutive blocks of 128 samples (mean removed, Hann, no overlap) for the bispectral test,
 * at most `limit` of them. Memory: limit × 65 complex numbers. Blocks of any length give the same spectra.
 */
export class BispectrumMeter {
  /** Interleaved real and imaginary parts of bins 0 … 64, one block after the other. */
  readonly spectra: Float64Array;
  blocks = 0;
  private readonly fft: RealFft = createRealFft(bispectrumLength);
  private readonly window = hannWindow(bispectrumLength);
  private readonly buffer = new Float64Array(bispectrumLength);
  private filled = 0;

  constructor(private readonly limit: number) {
    this.spectra = new Float64Array(limit * (bispectrumLength + 2));
  }

  get isFull(): boolean {
    return this.blocks === this.limit;
  }

  push(samples: Float64Array, frames: number): void {
    for (let n = 0; n < frames && !this.isFull; n++) {
      this.buffer[this.filled++] = samples[n] as number;
      if (this.filled === bispectrumLength) this.finishBlock();
    }
  }

  private finishBlock(): void {
    this.filled = 0;
    const mean = this.buffer.reduce((sum, value) => sum + value, 0) / bispectrumLength;
    const windowed = this.buffer.map((value, n) => (value - mean) * (this.window[n] as number));
    const stride = bispectrumLength + 2;
    this.spectra.set(this.fft.transform(windowed).subarray(0, stride), this.blocks * stride);
    this.blocks++;
  }
}
