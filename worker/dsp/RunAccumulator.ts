/** A run of equal samples. `stepIn` and `stepOut`: the neighbours minus the run's value. */
export interface EqualRun {
  value: number;
  firstFrame: number;
  length: number;
  stepIn: number;
  stepOut: number;
}

/** Flat tops at one value: runs of three or more equal samples with both neighbours on the same side. */
export interface Plateau {
  value: number;
  /** 1: a top (neighbours below), −1: a bottom. */
  side: 1 | -1;
  runs: number;
  samples: number;
  stepSum: number;
  firstFrame: number;
  lastFrame: number;
  spans: { firstFrame: number; length: number }[];
}

const longestKept = 64;
const plateausKept = 512;

/** One pass over the samples: plateaus (for clipping), the longest runs of equal values (for dropouts), equal neighbours. */
export class RunAccumulator {
  equalNeighbours = 0;
  readonly plateaus = new Map<string, Plateau>();
  readonly longest: EqualRun[] = [];
  private run: EqualRun | null = null;
  private previous = Number.NaN;

  push(samples: Float64Array, frames: number, firstFrame: number): void {
    for (let n = 0; n < frames; n++) {
      const value = samples[n] as number;
      if (value === this.previous) {
        this.equalNeighbours++;
        if (this.run !== null) this.run.length++;
      } else {
        if (this.run !== null && this.run.length >= 3) this.close(value);
        const stepIn = this.previous - value;
        if (this.run === null) this.run = { value, firstFrame: firstFrame + n, length: 1, stepIn, stepOut: 0 };
        else Object.assign(this.run, { value, firstFrame: firstFrame + n, length: 1, stepIn, stepOut: 0 });
        this.previous = value;
      }
    }
  }

  finish(): void {
    if (this.run !== null && this.run.length >= 3) this.close(Number.NaN);
    this.run = null;
  }

  private close(next: number): void {
    const run = { ...(this.run as EqualRun), stepOut: next - (this.run as EqualRun).value };
    if (run.length >= 8) {
      this.longest.push(run);
      if (this.longest.length > 2 * longestKept) this.trimLongest();
    }
    if (!(run.stepIn * run.stepOut > 0)) return;
    const side = run.stepIn < 0 ? 1 : -1;
    const key = `${side}:${run.value}`;
    let plateau = this.plateaus.get(key);
    if (plateau === undefined) {
      if (this.plateaus.size >= plateausKept) this.evict();
      const { value, firstFrame } = run;
      plateau = { value, side, runs: 0, samples: 0, stepSum: 0, firstFrame, lastFrame: firstFrame, spans: [] };
      this.plateaus.set(key, plateau);
    }
    plateau.runs++;
    plateau.samples += run.length;
    plateau.stepSum += (Math.abs(run.stepIn) + Math.abs(run.stepOut)) / 2;
    plateau.lastFrame = run.firstFrame + run.length - 1;
    if (plateau.spans.length < 64) plateau.spans.push({ firstFrame: run.firstFrame, length: run.length });
  }

  trimLongest(): void {
    this.longest.sort((a, b) => b.length - a.length || a.firstFrame - b.firstFrame);
    this.longest.length = Math.min(this.longest.length, longestKept);
  }

  /** Forgets plateaus seen once; if none, the one with the fewest samples. */
  private evict(): void {
    let fewest: [string, Plateau] | null = null;
    for (const entry of this.plateaus) {
      if (entry[1].runs === 1) this.plateaus.delete(entry[0]);
      else if (fewest === null || entry[1].samples < fewest[1].samples) fewest = entry;
    }
    if (this.plateaus.size >= plateausKept && fewest !== null) this.plateaus.delete(fewest[0]);
  }
}
