import type { LevelMeasurement } from '../../shared/screening/MeasurementRecord.js';
import { detectQuantum } from '../dsp/detectQuantum.js';
import { Envelope } from '../dsp/Envelope.js';
import { findClipping } from '../dsp/findClipping.js';
import { isPause } from '../dsp/isPause.js';
import { findDropouts } from '../dsp/findDropouts.js';
import { LevelAccumulator } from '../dsp/LevelAccumulator.js';
import { RunAccumulator } from '../dsp/RunAccumulator.js';
import { ValueSampler } from '../dsp/ValueSampler.js';

/** A stretch of frames, both ends included. */
export interface FrameSpan {
  first: number;
  last: number;
}

export interface IntegrityResult {
  level: LevelMeasurement | null;
  samples: number;
  notFiniteCount: number;
  notFiniteSpans: FrameSpan[];
  clippedCount: number;
  clippedRuns: number;
  clippedSpans: FrameSpan[];
  /** Whole stretches within which clipping occurs. */
  clippedStretches: FrameSpan[];
  clippedAt: number[];
  dropoutCount: number;
  dropouts: FrameSpan[];
  pauses: FrameSpan[];
  quantum: number | null;
}

/** First pass over one channel: levels, clipping, dropouts, values that are no numbers, and the quantum. */
export class IntegrityMeter {
  private readonly level = new LevelAccumulator();
  private readonly runs = new RunAccumulator();
  private readonly envelope = new Envelope();
  private readonly sampler = new ValueSampler();
  private readonly notFiniteSpans: FrameSpan[] = [];
  private notFiniteCount = 0;
  private finite = new Float64Array(0);

  push(samples: Float64Array, frames: number, firstFrame: number): void {
    if (this.finite.length < frames) this.finite = new Float64Array(frames);
    let count = 0;
    for (let n = 0; n < frames; n++) {
      const value = samples[n] as number;
      if (Number.isFinite(value)) this.finite[count++] = value;
      else this.noteNotFinite(firstFrame + n);
    }
    this.level.push(this.finite, count);
    this.sampler.push(this.finite, count);
    // Runs and envelope keep the frame numbers, so they see a held value where there is no number.
    const held = count === frames ? this.finite : holdLastFinite(samples, frames);
    this.runs.push(held, frames, firstFrame);
    this.envelope.push(held, frames);
  }

  private noteNotFinite(frame: number): void {
    this.notFiniteCount++;
    const last = this.notFiniteSpans[this.notFiniteSpans.length - 1];
    if (last !== undefined && (last.last === frame - 1 || this.notFiniteSpans.length >= 256)) last.last = frame;
    else this.notFiniteSpans.push({ first: frame, last: frame });
  }

  result(): IntegrityResult {
    this.runs.finish();
    const quantum = detectQuantum(this.sampler.values);
    const clipping = findClipping(this.runs, this.envelope, quantum);
    const clippedAt = clipping.plateaus.map((plateau) => plateau.value);
    const level = this.level.result();
    const held = findDropouts(this.runs, this.level.count, new Set(clippedAt));
    const pauses = held.filter((run) => level !== null && isPause(run, level));
    const dropouts = held.filter((run) => !pauses.includes(run));
    const span = (run: { firstFrame: number; length: number }): FrameSpan => ({
      first: run.firstFrame,
      last: run.firstFrame + run.length - 1,
    });
    return {
      level,
      samples: this.level.count + this.notFiniteCount,
      notFiniteCount: this.notFiniteCount,
      notFiniteSpans: this.notFiniteSpans,
      clippedCount: clipping.samples,
      clippedRuns: clipping.runs,
      clippedSpans: clipping.plateaus.flatMap((plateau) => plateau.spans.map(span)),
      clippedStretches: clipping.plateaus.map((plateau) => ({ first: plateau.firstFrame, last: plateau.lastFrame })),
      clippedAt,
      dropoutCount: dropouts.reduce((sum, run) => sum + run.length, 0),
      dropouts: dropouts.map(span),
      pauses: pauses.map(span),
      quantum,
    };
  }
}

/** A copy with every value that is no number replaced by the last one before it (0 at the start). */
export function holdLastFinite(samples: Float64Array, frames: number): Float64Array {
  const held = new Float64Array(frames);
  let last = 0;
  for (let n = 0; n < frames; n++) {
    const value = samples[n] as number;
    if (Number.isFinite(value)) last = value;
    held[n] = last;
  }
  return held;
}
