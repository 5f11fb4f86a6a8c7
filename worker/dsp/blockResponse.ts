export interface Complex {
  real: number;
  imaginary: number;
}

/**
 * Σ exp(iδ(n−origin)) over one block of frames: what a tone off by δ (rad a sample) leaves in that block of a demodulator.
 * The closed form is exact; near δ = 0 its limit is used.
 */
export function blockResponse(delta: number, block: number, blockFrames: number, origin: number): Complex {
  const half = Math.sin(delta / 2);
  const length = Math.abs(half) < 1e-12 ? blockFrames : Math.sin((delta * blockFrames) / 2) / half;
  const phase = delta * (block * blockFrames + (blockFrames - 1) / 2 - origin);
  return { real: length * Math.cos(phase), imaginary: length * Math.sin(phase) };
}
