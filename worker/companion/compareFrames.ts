/** (Σ|a|²)²/Σ|a|⁴: how many frames a tone really fills. */
export function filledFrames(frames: Float64Array): number {
  let [first, second] = [0, 0];
  for (let k = 0; k < frames.length; k += 2) {
    const power = (frames[k] as number) ** 2 + (frames[k + 1] as number) ** 2;
    first += power;
    second += power * power;
  }
  return second > 0 ? (first * first) / second : 0;
}

/** |Σ conj(a)·b·exp(−i·turn·k)|: how much of b goes along with a, their frequencies apart by a turn a frame. */
export function crossAmplitude(a: Float64Array, b: Float64Array, turn: number): number {
  let [real, imaginary] = [0, 0];
  for (let k = 0; k < a.length; k += 2) {
    const [ar, ai, br, bi] = [a[k] as number, a[k + 1] as number, b[k] as number, b[k + 1] as number];
    const x = ar * br + ai * bi;
    const y = ar * bi - ai * br;
    const angle = (-turn * k) / 2;
    const [c, s] = [Math.cos(angle), Math.sin(angle)];
    real += x * c - y * s;
    imaginary += x * s + y * c;
  }
  return Math.hypot(real, imaginary);
}
