import FFT from 'fft.js';

/** Amplitude over the surroundings from which a line counts as visible (12 dB), and the bins looked at. */
const [leastRatio, nearBins, aroundBins] = [4, 6, 150] as const;

/** Whether the capture's own spectrum (four-term Blackman-Harris over the whole) shows a line at each of the frequencies. */
export function isVisibleAt(
  samples: Float64Array,
  sampleRateHz: number,
  frequenciesHz: readonly (number | null)[],
): boolean[] {
  const size = samples.length;
  const fft = new FFT(size);
  const spectrum = fft.createComplexArray() as number[];
  const mean = samples.reduce((sum, value) => sum + value, 0) / size;
  fft.realTransform(
    spectrum,
    samples.map((value, n) => {
      const angle = (2 * Math.PI * n) / size;
      const window =
        0.35875 - 0.48829 * Math.cos(angle) + 0.14128 * Math.cos(2 * angle) - 0.01168 * Math.cos(3 * angle);
      return (value - mean) * window;
    }),
  );
  const magnitude = Float64Array.from({ length: size / 2 + 1 }, (_, bin) =>
    Math.hypot(spectrum[2 * bin] as number, spectrum[2 * bin + 1] as number),
  );
  return frequenciesHz.map((hz) => {
    if (hz === null) return false;
    const bin = Math.round((hz * size) / sampleRateHz);
    const peak = Math.max(...magnitude.slice(Math.max(0, bin - nearBins), bin + nearBins + 1));
    const around = magnitude.slice(Math.max(0, bin - aroundBins), bin + aroundBins + 1).sort();
    return peak > leastRatio * (around[around.length >> 1] as number);
  });
}
