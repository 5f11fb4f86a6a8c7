const coefficients = [0.35875, -0.48829, 0.14128, -0.01168] as const;

/** Periodic four-term Blackman-Harris window (minimum side lobe, −92 dB; Harris 1978, Table 1). */
export function blackmanHarrisWindow(length: number): Float64Array {
  if (!(length >= 1)) throw new RangeError(`A window needs at least one sample, got ${length}.`);
  const window = new Float64Array(length);
  for (let n = 0; n < length; n++) {
    const angle = (2 * Math.PI * n) / length;
    let value = 0;
    for (let term = 0; term < coefficients.length; term++) value += (coefficients[term] ?? 0) * Math.cos(term * angle);
    window[n] = value;
  }
  return window;
}
