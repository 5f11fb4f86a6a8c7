/** Least and largest value per stretch of time, in at most 2·`limit` stretches: neighbours are merged when full. */
export class Envelope {
  readonly minima: number[] = [];
  readonly maxima: number[] = [];
  stretchFrames = 64;
  private filled = 0;

  constructor(private readonly limit = 2048) {}

  push(samples: Float64Array, frames: number): void {
    for (let n = 0; n < frames; n++) {
      const value = samples[n] as number;
      if (this.filled === 0) {
        if (this.maxima.length === 2 * this.limit) this.merge();
        this.minima.push(value);
        this.maxima.push(value);
      }
      const last = this.maxima.length - 1;
      if (value < (this.minima[last] as number)) this.minima[last] = value;
      if (value > (this.maxima[last] as number)) this.maxima[last] = value;
      this.filled = (this.filled + 1) % this.stretchFrames;
    }
  }

  /** Largest value over the whole stretches that hold frames first … last. */
  maximumOver(firstFrame: number, lastFrame: number): number {
    return this.maxima
      .slice(this.index(firstFrame), this.index(lastFrame) + 1)
      .reduce((a, b) => Math.max(a, b), -Infinity);
  }

  minimumOver(firstFrame: number, lastFrame: number): number {
    return this.minima
      .slice(this.index(firstFrame), this.index(lastFrame) + 1)
      .reduce((a, b) => Math.min(a, b), Infinity);
  }

  private index(frame: number): number {
    return Math.floor(frame / this.stretchFrames);
  }

  private merge(): void {
    for (let place = 0; place < this.limit; place++) {
      this.minima[place] = Math.min(this.minima[2 * place] as number, this.minima[2 * place + 1] as number);
      this.maxima[place] = Math.max(this.maxima[2 * place] as number, this.maxima[2 * place + 1] as number);
    }
    this.minima.length = this.limit;
    this.maxima.length = this.limit;
    this.stretchFrames *= 2;
  }
}
