import type { LevelMeasurement } from '../../shared/screening/MeasurementRecord.js';

/** Mean, power, extremes and kurtosis in one pass; sums are taken about the first sample so that offsets cost no digits. */
export class LevelAccumulator {
  count = 0;
  private origin = 0;
  private readonly sums = new Float64Array(4);
  private minimum = Number.POSITIVE_INFINITY;
  private maximum = Number.NEGATIVE_INFINITY;

  push(samples: Float64Array, frames: number): void {
    if (this.count === 0 && frames > 0) this.origin = samples[0] as number;
    let s1 = 0;
    let s2 = 0;
    let s3 = 0;
    let s4 = 0;
    for (let n = 0; n < frames; n++) {
      const value = samples[n] as number;
      if (value < this.minimum) this.minimum = value;
      if (value > this.maximum) this.maximum = value;
      const d = value - this.origin;
      const square = d * d;
      s1 += d;
      s2 += square;
      s3 += square * d;
      s4 += square * square;
    }
    this.sums.forEach((sum, power) => (this.sums[power] = sum + ([s1, s2, s3, s4][power] as number)));
    this.count += frames;
  }

  /** null before the first sample. */
  result(): LevelMeasurement | null {
    if (this.count === 0) return null;
    const [m1, m2, m3, m4] = [...this.sums].map((sum) => sum / this.count) as [number, number, number, number];
    const variance = Math.max(0, m2 - m1 * m1);
    const fourth = m4 - 4 * m1 * m3 + 6 * m1 * m1 * m2 - 3 * m1 ** 4;
    return {
      mean: this.origin + m1,
      rms: Math.sqrt(variance),
      minimum: this.minimum,
      maximum: this.maximum,
      powerDb: 10 * Math.log10(Math.max(variance, 1e-40)),
      kurtosis: variance > 0 ? Math.min(1e9, fourth / (variance * variance)) : 0,
    };
  }
}
