import FFT from 'fft.js';

/**
 * Welch's averaged periodograms (1967) as anyone would write them in a script: Hann, half overlap, mean removed.
 * Kept apart from the engine's own, so that what is compared with it does not rest on it.
 * @returns one-sided density, unit²/Hz, at the frequencies n·rate/length, n = 0 … length/2
 */
export function plainWelch(samples: Float64Array, sampleRateHz: number, segmentLength: number): Float64Array {
  const fft = new FFT(segmentLength);
  const window = Float64Array.from({ length: segmentLength }, (_, n) => Math.sin((Math.PI * n) / segmentLength) ** 2);
  const windowPower = window.reduce((sum, value) => sum + value * value, 0);
  const spectrum = fft.createComplexArray();
  const density = new Float64Array(segmentLength / 2 + 1);
  let segments = 0;
  for (let from = 0; from + segmentLength <= samples.length; from += segmentLength / 2) {
    const segment = samples.subarray(from, from + segmentLength);
    const mean = segment.reduce((sum, value) => sum + value, 0) / segmentLength;
    fft.realTransform(
      spectrum,
      Array.from(segment, (value, n) => (value - mean) * (window[n] as number)),
    );
    density.forEach((sum, bin) => {
      const sided = bin === 0 || bin === segmentLength / 2 ? 1 : 2;
      const power = (spectrum[2 * bin] as number) ** 2 + (spectrum[2 * bin + 1] as number) ** 2;
      density[bin] = sum + (sided * power) / (windowPower * sampleRateHz);
    });
    segments++;
  }
  return segments === 0 ? density.fill(Number.NaN) : density.map((sum) => sum / segments);
}
