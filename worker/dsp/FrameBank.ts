/**
 * Complex amplitudes at chosen frequencies in Hann-windowed frames at chosen moments, from samples in memory. A frequency
 * beyond half the rate is evaluated at the samples' own times, so that two captures at different rates are compared at one
 * true frequency: Σ w(t_n − t_k)·x[n]·exp(−2πi·f·t_n)/Σ w, with all times on one clock.
 */
export class FrameBank {
  private readonly windows: { first: number; weights: Float64Array }[];

  /**
   * @param startS time of the first sample on the common clock
   * @param centresS middle of each frame on the common clock
   * @param lengthS length of each frame
   */
  constructor(
    private readonly samples: Float64Array,
    private readonly rateHz: number,
    private readonly startS: number,
    centresS: readonly number[],
    lengthS: number,
  ) {
    this.windows = centresS.map((centreS) => {
      const first = Math.max(0, Math.ceil((centreS - lengthS / 2 - startS) * rateHz));
      const last = Math.min(samples.length - 1, Math.floor((centreS + lengthS / 2 - startS) * rateHz));
      const weights = Float64Array.from({ length: Math.max(0, last - first + 1) }, (_, index) => {
        const offsetS = startS + (first + index) / rateHz - centreS;
        return 0.5 + 0.5 * Math.cos((2 * Math.PI * offsetS) / lengthS);
      });
      const sum = weights.reduce((total, weight) => total + weight, 0);
      return { first, weights: sum > 0 ? weights.map((weight) => weight / sum) : weights };
    });
  }

  /** Interleaved real and imaginary parts, one pair a frame; negative frequencies give the conjugate. */
  at(frequencyHz: number): Float64Array {
    const turns = frequencyHz / this.rateHz;
    const omega = 2 * Math.PI * (turns - Math.round(turns));
    const [stepC, stepS] = [Math.cos(omega), -Math.sin(omega)];
    const result = new Float64Array(2 * this.windows.length);
    this.windows.forEach(({ first, weights }, frame) => {
      const startTurns = frequencyHz * this.startS + turns * first;
      let c = Math.cos(2 * Math.PI * (startTurns - Math.round(startTurns)));
      let s = -Math.sin(2 * Math.PI * (startTurns - Math.round(startTurns)));
      let [real, imaginary] = [0, 0];
      for (let n = 0; n < weights.length; n++) {
        const value = (weights[n] as number) * (this.samples[first + n] as number);
        real += value * c;
        imaginary += value * s;
        const next = c * stepC - s * stepS;
        s = s * stepC + c * stepS;
        c = next;
      }
      result[2 * frame] = real;
      result[2 * frame + 1] = imaginary;
    });
    return result;
  }
}
