import type { ScreenedCapture } from '../screening/ScreenedCapture.js';
import { recordingOf } from '../sets/LabelledCapture.js';
import { type ShareFigure, shareOfTrials } from './shareFigure.js';

/** Folded tones of one capture: what there was, what was found, what was reported beside it. */
export interface ToneCount {
  visible: number;
  found: number;
  /** Of those found: true frequency given and right. */
  trueRight: number;
  reported: number;
  /** Reported where the truth has none, on captures whose truth is complete. */
  wrong: number;
  /** Reported, unmatched, on captures whose list of true tones is cut off or moving: can't be judged. */
  unjudged: number;
}

export interface ToneFigures {
  found: ShareFigure;
  trueRight: ShareFigure;
  /** Wrong ones among those reported. */
  wrong: ShareFigure;
  unjudged: number;
  /** Captures with at least one wrong one. */
  capturesWithWrong: number;
}

export const isFoldedTone = ({ explanation }: { explanation: string }): boolean =>
  explanation.startsWith('folded') || explanation === 'movedBetweenRates';

/** Uniform captures only: uneven ones report recovered true frequencies, nothing lands anywhere. */
export function countTones({ truth, tones, durationS }: ScreenedCapture): ToneCount {
  const count: ToneCount = { visible: 0, found: 0, trueRight: 0, reported: 0, wrong: 0, unjudged: 0 };
  if (truth.isIrregular || truth.label === 'na') return count;
  // Lines are listed to a bin of the spectrum, slowly moving ones by the middle of their path.
  const toleranceHz = Math.max(3 / Math.max(durationS ?? 1, 1e-6), 5e-4 * truth.sampleRateHz);
  const isNear = (a: number, b: number): boolean => Math.abs(a - b) <= toleranceHz;
  const shown = tones.filter(isFoldedTone);
  for (const { trueHz, foldedHz, isVisible } of truth.tones) {
    if (!isVisible || foldedHz === null) continue;
    count.visible++;
    const matches = shown.filter(({ frequencyHz }) => isNear(frequencyHz, foldedHz));
    if (matches.length > 0) count.found++;
    if (matches.some(({ trueFrequencyHz }) => trueFrequencyHz !== undefined && isNear(trueFrequencyHz, trueHz)))
      count.trueRight++;
  }
  count.reported = shown.length;
  const unmatched = shown.filter(({ frequencyHz }) =>
    truth.tones.every(({ foldedHz }) => foldedHz === null || !isNear(frequencyHz, foldedHz)),
  );
  if (truth.label === 'clean' || truth.hasAllTones) count.wrong = unmatched.length;
  else count.unjudged = unmatched.length;
  return count;
}

export function toneFigures(captures: readonly ScreenedCapture[]): ToneFigures {
  const counts = captures.map((capture) => ({ ...countTones(capture), recording: recordingOf(capture.truth) }));
  const share = (count: keyof ToneCount, total: keyof ToneCount): ShareFigure =>
    shareOfTrials(counts.map((one) => ({ count: one[count], total: one[total], recording: one.recording })));
  return {
    found: share('found', 'visible'),
    trueRight: share('trueRight', 'found'),
    wrong: share('wrong', 'reported'),
    unjudged: counts.reduce((sum, one) => sum + one.unjudged, 0),
    capturesWithWrong: counts.filter(({ wrong }) => wrong > 0).length,
  };
}
