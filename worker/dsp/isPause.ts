import type { EqualRun } from './RunAccumulator.js';

/** Steps and offsets up to this share of the signal's standard deviation are a fade, not a break. */
const fadeShare = 0.05;

/**
 * Tells a rest from a dropout among runs of one value: a signal that fades into the mean and rises from it again (pauses,
 * a recorder's gate), or silence of exactly 0 at the very start or end of the file. A dropout breaks off from full swing, or
 * holds a value away from the mean.
 * @param run `stepIn` NaN at the start of the file, `stepOut` NaN at its end
 * @param level mean and standard deviation of all samples
 */
export function isPause(run: EqualRun, level: { mean: number; rms: number }): boolean {
  const nearest = fadeShare * level.rms;
  if (Math.abs(run.value - level.mean) > nearest) return false;
  const isAtEnd = Number.isNaN(run.stepIn) || Number.isNaN(run.stepOut);
  if (isAtEnd && run.value === 0) return true;
  return isFade(run.stepIn, nearest) && isFade(run.stepOut, nearest);
}

/** The end of the file breaks nothing off. */
const isFade = (step: number, nearest: number): boolean => Number.isNaN(step) || Math.abs(step) <= nearest;
