/**
 * Periodic Hann window, w[n] = 0.5 − 0.5·cos(2πn/N), n = 0 … N−1 (the form that sums to a constant at 50 % overlap).
 * @throws RangeError when the length is below 1
 */
export function hannWindow(length: number): Float64Array {
  if (!(length >= 1)) throw new RangeError(`A window needs at least one sample, got ${length}.`);
  const window = new Float64Array(length);
  for (let n = 0; n < length; n++) window[n] = 0.5 - 0.5 * Math.cos((2 * Math.PI * n) / length);
  return window;
}
