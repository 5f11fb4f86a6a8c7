import { WarpedTransform } from './WarpedTransform.js';

export type TransformOf = (count: number) => WarpedTransform;

const mostKept = 6;
const kept = new Map<number, WarpedTransform>();

/** A transform of a size, made once and kept while few others are asked for: captures of one batch are often equally long. */
export const transformOf: TransformOf = (count) => {
  const known = kept.get(count) ?? new WarpedTransform(count);
  kept.delete(count);
  kept.set(count, known);
  for (const oldest of kept.keys()) {
    if (kept.size <= mostKept) break;
    kept.delete(oldest);
  }
  return known;
};
