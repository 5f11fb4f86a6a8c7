import type { Complex } from './blockResponse.js';

export interface SteadyTone {
  /** Rad a sample. */
  omega: number;
  /** The signal holds amplitude·exp(iω(n−origin)) and its conjugate. */
  amplitude: Complex;
}

/** Takes steady tones out of a block of samples in place; `firstFrame` counts from the start of the capture. */
export function subtractTones(
  samples: Float64Array,
  firstFrame: number,
  origin: number,
  tones: readonly SteadyTone[],
): void {
  for (const { omega, amplitude } of tones) {
    const stepC = Math.cos(omega);
    const stepS = Math.sin(omega);
    for (let start = 0; start < samples.length; start += 1024) {
      const phase = omega * (firstFrame + start - origin);
      let c = Math.cos(phase);
      let s = Math.sin(phase);
      const stop = Math.min(samples.length, start + 1024);
      for (let n = start; n < stop; n++) {
        samples[n] = (samples[n] as number) - 2 * (amplitude.real * c - amplitude.imaginary * s);
        const next = c * stepC - s * stepS;
        s = s * stepC + c * stepS;
        c = next;
      }
    }
  }
}
