import type { Complex } from './blockResponse.js';

export interface RefinedTone {
  /** Offset from the demodulator's frequency, rad a sample. */
  delta: number;
  /** x[n] contains amplitude·exp(iωn) and its conjugate, phase at the demodulator's origin. */
  amplitude: Complex;
  /** The amplitude falls as exp(−decay·(n−origin)), per sample; 0 for a steady tone, below 0 for one that grows. */
  decay: number;
  /** Blocks of the demodulator less every other tone: interleaved real and imaginary parts. */
  residual: Float64Array;
}
