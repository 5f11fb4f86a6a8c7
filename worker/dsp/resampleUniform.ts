/** Zero crossings of the kernel on each side: images stay some 70 dB down. */
const crossings = 24;

/**
 * Band-limited interpolation of uniform samples at other uniform times (Shannon's series with a Blackman window).
 * @param samples at times n/rateHz
 * @param startS time of the first value wanted
 * @param cornerHz what is above it is taken out; at most half of the lower of both rates, the kernel's transition included
 * @returns `count` values at startS + m/newRateHz; 0 outside the samples
 * @throws RangeError unless 0 < corner ≤ rate/2
 */
export function resampleUniform(
  samples: Float64Array,
  rateHz: number,
  startS: number,
  newRateHz: number,
  count: number,
  cornerHz: number,
): Float64Array {
  if (!(cornerHz > 0 && cornerHz <= rateHz / 2)) {
    throw new RangeError(`The corner must lie between 0 and ${rateHz / 2} Hz, got ${cornerHz}.`);
  }
  const scale = (2 * cornerHz) / rateHz;
  const reach = crossings / scale;
  const table = kernelTable(crossings);
  const result = new Float64Array(count);
  for (let m = 0; m < count; m++) {
    const place = (startS + m / newRateHz) * rateHz;
    const from = Math.max(0, Math.ceil(place - reach));
    const to = Math.min(samples.length - 1, Math.floor(place + reach));
    let sum = 0;
    for (let n = from; n <= to; n++) {
      const at = Math.abs(place - n) * scale * tableSteps;
      const below = Math.floor(at);
      const low = table[below] as number;
      sum += (samples[n] as number) * (low + (at - below) * ((table[below + 1] as number) - low));
    }
    result[m] = sum * scale;
  }
  return result;
}

/** Steps a zero crossing: straight lines between them err by less than 2e-6. */
const tableSteps = 1024;
let cached: Float64Array | null = null;

function kernelTable(halfWidth: number): Float64Array {
  cached ??= Float64Array.from({ length: halfWidth * tableSteps + 2 }, (_, index) => {
    const x = index / tableSteps;
    if (x === 0) return 1;
    const phase = Math.PI * Math.min(1, x / halfWidth);
    const window = 0.42 + 0.5 * Math.cos(phase) + 0.08 * Math.cos(2 * phase);
    return (window * Math.sin(Math.PI * x)) / (Math.PI * x);
  });
  return cached;
}
