import { WarpedTransform } from './WarpedTransform.js';

export type TransformOf = (count: number) => WarpedTransform;

/** Transforms of a few sizes, made once each. */
export function transformsBySize(): TransformOf {
  const made = new Map<number, WarpedTransform>();
  return (count) => {
    const known = made.get(count);
    if (known !== undefined) return known;
    const transform = new WarpedTransform(count);
    made.set(count, transform);
    return transform;
  };
}
