import { describe, expect, it } from 'vitest';
import { byFallingScore, rocFigures, type ScoredCapture } from './rocFigures.js';

const scored = (folded: number[], clean: number[]): ScoredCapture[] =>
  byFallingScore([
    ...folded.map((score) => ({ score, isFolded: true, recording: '' })),
    ...clean.map((score) => ({ score, isFolded: false, recording: '' })),
  ]);

/** `counts[n]` ratings of n + 1. */
const ratings = (counts: number[]): number[] =>
  counts.flatMap((count, index) => Array.from({ length: count }, () => index + 1));

describe('rocFigures', () => {
  // Hanley & McNeil 1982, Radiology 143, 29-36: 51 abnormal and 58 normal CT images rated 1 to 5, area 0.893.
  it('gives the published area of the rated CT images', () => {
    const { area } = rocFigures(scored(ratings([3, 2, 2, 11, 33]), ratings([33, 6, 6, 11, 2])));
    expect(area).toBeCloseTo(0.893, 3);
  });

  it('counts ties half, order as 1 and reversal as 0', () => {
    expect(rocFigures(scored([1], [1])).area).toBe(0.5);
    expect(rocFigures(scored([2, 3], [0, 1])).area).toBe(1);
    expect(rocFigures(scored([0, 1], [2, 3])).area).toBe(0);
  });

  it('lets at most the stated share of the clean ones through', () => {
    const clean = Array.from({ length: 100 }, (_, n) => n);
    // 97.5 stands above all but two of a hundred (98, 99), 94.5 above all but five, 93.5 above all but six.
    const found = rocFigures(scored([97.5, 94.5, 93.5, 98.5], clean));
    expect(found.foundAt2).toBe(0.5);
    expect(found.foundAt5).toBe(0.75);
  });

  it('never takes a part of a tie', () => {
    const found = rocFigures(scored([5, 5, 5], [5, ...Array.from({ length: 9 }, () => 0)]));
    expect(found.foundAt5).toBe(0);
  });

  it('weights captures as if they were there that often', () => {
    const once = scored([3, 1], [2, 0]);
    const weights = Float64Array.from(once, ({ score }) => (score === 1 ? 3 : 1));
    expect(rocFigures(once, weights)).toEqual(rocFigures(scored([3, 1, 1, 1], [2, 0])));
  });

  it('is not a number without both kinds', () => {
    expect(rocFigures(scored([1], [])).area).toBeNaN();
    expect(rocFigures(scored([], [1])).foundAt2).toBeNaN();
  });
});
