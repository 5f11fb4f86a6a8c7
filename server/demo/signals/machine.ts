import type { SeededRandom } from './SeededRandom.js';

export interface Machine {
  sampleRateHz: number;
  durationS: number;
  speedHz: number;
  /** Share by which the speed wanders slowly about its mean. */
  wanderShare?: number;
  /** Share by which the speed rises over the recording. */
  runUpShare?: number;
  /** Amplitude of each multiple of the speed. */
  orders: readonly { order: number; amplitude: number }[];
  /** What passes the filter in front of the converter; everything where there is none. */
  gainAt?: (frequencyHz: number) => number;
}

/**
 * A shaft's orders as a converter sees them: sampled where they are, so that those above half the rate fold by themselves,
 * and their wandering folds with them.
 */
export function machineSignal(machine: Machine, random: SeededRandom): Float64Array {
  const { sampleRateHz, durationS, speedHz, wanderShare = 0, runUpShare = 0, orders, gainAt = () => 1 } = machine;
  const frames = Math.round(sampleRateHz * durationS);
  const periodS = random.between(5, 9);
  const startPhase = random.between(0, 2 * Math.PI);
  const lines = orders.map(({ order, amplitude }) => ({
    order,
    amplitude: amplitude * gainAt(order * speedHz),
    phase: random.between(0, 2 * Math.PI),
  }));
  let shaftPhase = 0;
  return Float64Array.from({ length: frames }, (_, frame) => {
    const timeS = frame / sampleRateHz;
    const wander = wanderShare * Math.sin((2 * Math.PI * timeS) / periodS + startPhase);
    const speedNowHz = speedHz * (1 + wander + runUpShare * (timeS / durationS - 0.5));
    shaftPhase += (2 * Math.PI * speedNowHz) / sampleRateHz;
    return lines.reduce(
      (sum, { order, amplitude, phase }) => sum + amplitude * Math.sin(order * shaftPhase + phase),
      0,
    );
  });
}

/** Orders 1…count that fall off as a worn bearing's do. */
export const fallingOrders = (count: number, first: number, exponent = 0.5) =>
  Array.from({ length: count }, (_, index) => ({ order: index + 1, amplitude: first / (index + 1) ** exponent }));

/** Amplitude response of a Butterworth low-pass. */
export const butterworth =
  (order: number, cornerHz: number) =>
  (frequencyHz: number): number =>
    1 / Math.sqrt(1 + (frequencyHz / cornerHz) ** (2 * order));
