import { medianBias } from './medianBias.js';
import { quantileOfSorted } from './quantile.js';

/**
 * Keeps at most `limit` segment densities, evenly spread over a capture of unknown length: when full, every second one is
 * dropped and from then on only every 2^k-th is kept. Serves medians and pictures in bounded memory.
 */
export class KeptSegments {
  readonly densities: Float32Array[] = [];
  readonly firstFrames: number[] = [];
  private stride = 1;
  private seen = 0;

  constructor(private readonly limit: number) {}

  add(density: Float64Array, firstFrame: number): void {
    if (this.seen++ % this.stride !== 0) return;
    if (this.densities.length === this.limit) {
      this.halve();
      if ((this.seen - 1) % this.stride !== 0) return;
    }
    this.densities.push(Float32Array.from(density));
    this.firstFrames.push(firstFrame);
  }

  private halve(): void {
    const kept = this.densities.filter((_, index) => index % 2 === 0);
    const frames = this.firstFrames.filter((_, index) => index % 2 === 0);
    this.densities.splice(0, this.densities.length, ...kept);
    this.firstFrames.splice(0, this.firstFrames.length, ...frames);
    this.stride *= 2;
  }

  /** Bias-corrected median over the kept segments, per bin. */
  median(): Float64Array {
    const count = this.densities.length;
    const bins = this.densities[0]?.length ?? 0;
    const result = new Float64Array(bins);
    const column = new Float64Array(count);
    const bias = count === 0 ? 1 : medianBias(count);
    for (let bin = 0; bin < bins; bin++) {
      for (let index = 0; index < count; index++) column[index] = this.densities[index]?.[bin] as number;
      result[bin] = quantileOfSorted(column.sort(), 0.5) / bias;
    }
    return result;
  }
}
