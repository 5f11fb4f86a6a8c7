/** Sums over interleaved complex values. */
export function powerOf(values: Float64Array): number {
  let sum = 0;
  for (const value of values) sum += value * value;
  return sum;
}

/** Σ conj(a)·b of interleaved complex values. */
export function inner(a: Float64Array, b: Float64Array): [number, number] {
  let [real, imaginary] = [0, 0];
  for (let n = 0; n < a.length; n += 2) {
    const [ar, ai, br, bi] = [a[n] as number, a[n + 1] as number, b[n] as number, b[n + 1] as number];
    real += ar * br + ai * bi;
    imaginary += ar * bi - ai * br;
  }
  return [real, imaginary];
}

/** Takes out of `target` what `input` explains of it. */
export function takeOut(target: Float64Array, input: Float64Array, power: number): void {
  const [real, imaginary] = inner(input, target);
  const [c, s] = [real / power, imaginary / power];
  for (let n = 0; n < target.length; n += 2) {
    const [x, y] = [input[n] as number, input[n + 1] as number];
    target[n] = (target[n] as number) - (x * c - y * s);
    target[n + 1] = (target[n + 1] as number) - (x * s + y * c);
  }
}
