/** Frames between two exact evaluations of the rotating phasor: keeps the recurrence's error below 1e-12. */
const resyncFrames = 1024;

/**
 * Correlates a stream with exp(−iωn) for several tones at once, in `blocks` consecutive blocks of `blockFrames` from frame
 * 0 on: z[m] = Σ_{n in block m} x[n]·exp(−iω(n−origin)). No window: with a tone known to a fraction of 1/blockFrames
 * nothing of the capture's precision is lost. `origin` is the middle of the stretch, where frequency and phase errors separate.
 */
export class ToneDemodulator {
  /** Per tone: interleaved real and imaginary parts, one pair a block. */
  readonly values: Float64Array[];
  readonly origin: number;

  constructor(
    readonly omegas: readonly number[],
    readonly blocks: number,
    readonly blockFrames: number,
  ) {
    this.values = omegas.map(() => new Float64Array(2 * blocks));
    this.origin = (blocks * blockFrames - 1) / 2;
  }

  push(samples: Float64Array, frames: number, firstFrame: number, mean: number): void {
    const end = Math.min(frames, this.blocks * this.blockFrames - firstFrame);
    for (let start = 0; start < end;) {
      const block = Math.floor((firstFrame + start) / this.blockFrames);
      const stop = Math.min(end, (block + 1) * this.blockFrames - firstFrame, start + resyncFrames);
      for (let tone = 0; tone < this.omegas.length; tone++)
        this.correlate(tone, block, samples, start, stop, firstFrame, mean);
      start = stop;
    }
  }

  private correlate(
    tone: number,
    block: number,
    samples: Float64Array,
    start: number,
    stop: number,
    firstFrame: number,
    mean: number,
  ): void {
    const omega = this.omegas[tone] as number;
    const phase = -omega * (firstFrame + start - this.origin);
    let c = Math.cos(phase);
    let s = Math.sin(phase);
    const stepC = Math.cos(omega);
    const stepS = -Math.sin(omega);
    let real = 0;
    let imaginary = 0;
    for (let n = start; n < stop; n++) {
      const value = (samples[n] as number) - mean;
      real += value * c;
      imaginary += value * s;
      const next = c * stepC - s * stepS;
      s = s * stepC + c * stepS;
      c = next;
    }
    const values = this.values[tone] as Float64Array;
    values[2 * block] = (values[2 * block] as number) + real;
    values[2 * block + 1] = (values[2 * block + 1] as number) + imaginary;
  }
}
