/** A real tone A·exp(−t/τ)·cos(2πf·t + φ); a steady one has no τ. */
export interface ModelTone {
  frequencyHz: number;
  amplitude: number;
  phase: number;
  decayS: number | null;
}

export function toneValue({ frequencyHz, amplitude, phase, decayS }: ModelTone, timeS: number): number {
  const level = decayS === null ? amplitude : amplitude * Math.exp(-timeS / decayS);
  return level * Math.cos(2 * Math.PI * frequencyHz * timeS + phase);
}
