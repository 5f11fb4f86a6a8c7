export interface WindowFigures {
  /** Equivalent noise bandwidth in bins: N·Σw² / (Σw)². */
  noiseBandwidthBins: number;
  /** Loss of a tone halfway between two bins, dB: −20·lg(|Σ w·exp(−iπn/N)| / Σw). */
  scallopingLossDb: number;
  /** Coherent gain: Σw / N. */
  coherentGain: number;
}

/** Figures of merit of a window as Harris (1978), "On the use of windows for harmonic analysis", defines them. */
export function windowFigures(window: Float64Array): WindowFigures {
  let sum = 0;
  let sumSquares = 0;
  let real = 0;
  let imaginary = 0;
  window.forEach((value, n) => {
    const angle = (Math.PI * n) / window.length;
    sum += value;
    sumSquares += value * value;
    real += value * Math.cos(angle);
    imaginary -= value * Math.sin(angle);
  });
  return {
    noiseBandwidthBins: (window.length * sumSquares) / (sum * sum),
    scallopingLossDb: -20 * Math.log10(Math.hypot(real, imaginary) / sum),
    coherentGain: sum / window.length,
  };
}
