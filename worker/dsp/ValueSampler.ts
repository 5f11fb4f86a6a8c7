/** Keeps at most 2·`limit` values, evenly thinned over a stream of unknown length. */
export class ValueSampler {
  private readonly kept: number[] = [];
  private stride = 1;
  private seen = 0;

  constructor(private readonly limit = 4096) {}

  push(samples: Float64Array, frames: number): void {
    let next = (this.stride - (this.seen % this.stride)) % this.stride;
    while (next < frames) {
      this.kept.push(samples[next] as number);
      if (this.kept.length === 2 * this.limit) {
        for (let place = 0; place < this.limit; place++) this.kept[place] = this.kept[2 * place] as number;
        this.kept.length = this.limit;
        this.stride *= 2;
        const position = this.seen + next;
        next = Math.ceil((position + 1) / this.stride) * this.stride - this.seen;
      } else next += this.stride;
    }
    this.seen += frames;
  }

  get values(): readonly number[] {
    return this.kept;
  }
}
