/**
 * How far the power of a spectrum is gathered in few bins: mean square over squared mean of the bin powers; 2 for plain noise,
 * far more where lines stand (the contrast used for focusing; Fienup & Miller 2003).
 * @param spectrum interleaved real and imaginary parts; bins `from` … `to` − 1 count
 */
export function sharpness(spectrum: Float64Array, from: number, to: number): number {
  let sum = 0;
  let squares = 0;
  for (let k = from; k < to; k++) {
    const power = (spectrum[2 * k] as number) ** 2 + (spectrum[2 * k + 1] as number) ** 2;
    sum += power;
    squares += power * power;
  }
  return sum === 0 ? 0 : (squares * (to - from)) / (sum * sum);
}
