import type { Complex } from './blockResponse.js';

export interface PlainTone {
  /** Rad a sample. */
  omega: number;
  /** The signal holds amplitude·exp(iω(n−origin)) and its conjugate. */
  amplitude: Complex;
  /** The amplitude falls as exp(−decay·(n−origin)), per sample; 0 for a steady tone. */
  decay: number;
}

/** Takes tones out of a block of samples in place; `firstFrame` counts from the start of the capture. */
export function subtractTones(
  samples: Float64Array,
  firstFrame: number,
  origin: number,
  tones: readonly PlainTone[],
): void {
  for (const { omega, amplitude, decay } of tones) {
    const stepC = Math.exp(-decay) * Math.cos(omega);
    const stepS = Math.exp(-decay) * Math.sin(omega);
    for (let start = 0; start < samples.length; start += 1024) {
      const phase = omega * (firstFrame + start - origin);
      const weight = decay === 0 ? 1 : Math.exp(-decay * (firstFrame + start - origin));
      let c = weight * Math.cos(phase);
      let s = weight * Math.sin(phase);
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
