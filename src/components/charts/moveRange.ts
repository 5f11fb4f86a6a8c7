import type { Range } from './SpectrumModel';

const narrowestShare = 1e-4;

/** The range, about its middle, made `factor` times as wide, inside the whole. */
export function zoomed(range: Range, whole: Range, factor: number): Range {
  const wholeWidth = whole.toHz - whole.fromHz;
  const width = Math.min(wholeWidth, Math.max(wholeWidth * narrowestShare, (range.toHz - range.fromHz) * factor));
  const middle = (range.fromHz + range.toHz) / 2;
  const fromHz = Math.min(Math.max(middle - width / 2, whole.fromHz), whole.toHz - width);
  return { fromHz, toHz: fromHz + width };
}

/** The range moved by a share of its width, inside the whole. */
export function panned(range: Range, whole: Range, share: number): Range {
  const width = range.toHz - range.fromHz;
  const fromHz = Math.min(Math.max(range.fromHz + share * width, whole.fromHz), whole.toHz - width);
  return { fromHz, toHz: fromHz + width };
}
