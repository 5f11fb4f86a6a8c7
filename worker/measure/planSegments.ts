export interface SegmentPlan {
  surveyLength: number;
  fineLength: number;
  /** Short frames for the look over time. */
  frameLength: number;
}

/** Fewest samples from which a spectrum is made at all. */
export const leastSamples = 256;

const powerOfTwoAtMost = (value: number): number => 2 ** Math.floor(Math.log2(value));

/**
 * Segment lengths for a capture: the survey at 4096 or, for short captures, so that 16 segments fit; the fine spectrum as long
 * as 8 segments with 50 % overlap allow, up to 2^17 (2^15 with many channels, to bound memory).
 */
export function planSegments(frameCount: number, channelCount: number): SegmentPlan {
  const longest = channelCount > 8 ? 2 ** 15 : 2 ** 17;
  return {
    surveyLength: Math.min(4096, Math.max(64, powerOfTwoAtMost(frameCount / 8.5))),
    fineLength: Math.min(longest, Math.max(64, powerOfTwoAtMost(frameCount / 4.5))),
    frameLength: Math.min(256, Math.max(32, powerOfTwoAtMost(frameCount / 48))),
  };
}
