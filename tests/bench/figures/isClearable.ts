import type { ScreenedCapture } from '../screening/ScreenedCapture.js';

/** The protection asked for, and 3 dB more: what a cautious judge must be able to clear. */
const marginDb = 3;

/**
 * A clean capture that can be cleared: if all that could be folded, the density next to fs/2 at every frequency, stays 3 dB
 * under the protection against the total power, and its rate was not raised. From the plain averaged spectrum, not the engine's.
 */
export function isClearable({ truth, simple, protectionDb }: ScreenedCapture): boolean {
  return simple !== null && !truth.isRateRaised && simple.edgeAgainstTotalDb <= -(protectionDb + marginDb);
}
