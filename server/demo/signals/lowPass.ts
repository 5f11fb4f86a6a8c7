const taps = 257;

/** Four-term Blackman-Harris: side lobes 92 dB down (Harris 1978, table 1). */
const window = (index: number): number => {
  const angle = (2 * Math.PI * index) / (taps - 1);
  return 0.35875 - 0.48829 * Math.cos(angle) + 0.14128 * Math.cos(2 * angle) - 0.01168 * Math.cos(3 * angle);
};

/** Windowed-sinc low-pass; `corner` is a share of the sampling rate. The length of the block is kept. */
export function lowPass(samples: Float64Array, corner: number): Float64Array {
  const middle = (taps - 1) / 2;
  const kernel = Float64Array.from({ length: taps }, (_, index) => {
    const place = index - middle;
    const sinc = place === 0 ? 2 * corner : Math.sin(2 * Math.PI * corner * place) / (Math.PI * place);
    return sinc * window(index);
  });
  return samples.map((_, n) => {
    let sum = 0;
    for (let index = 0; index < taps; index += 1) {
      sum += (kernel[index] as number) * (samples[n + middle - index] ?? 0);
    }
    return sum;
  });
}
