import type { ScreenedCapture } from '../screening/ScreenedCapture.js';
import { recordingOf } from '../sets/LabelledCapture.js';
import { bootstrapLimits, type Limits } from '../statistics/bootstrapLimits.js';
import { clopperPearson } from '../statistics/clopperPearson.js';

export interface ShareFigure {
  count: number;
  total: number;
  /** null when there is nothing to count. */
  share: number | null;
  /** Two-sided 95 % limits if captures were independent (Clopper-Pearson). */
  exact: Limits;
  /** One-sided upper 95 % limit, the same way. */
  exactUpper: number;
  /** 95 % limits by drawing whole recordings; blind where the count is 0 or complete. */
  byRecording: Limits;
}

/** Share of the captures that fulfil `isSo`, with both kinds of limits. */
export function shareFigure(
  captures: readonly ScreenedCapture[],
  isSo: (capture: ScreenedCapture) => boolean,
): ShareFigure {
  return shareOfTrials(
    captures.map((one) => ({ count: isSo(one) ? 1 : 0, total: 1, recording: recordingOf(one.truth) })),
  );
}

/** The same where one capture brings several trials, such as its tones. */
export function shareOfTrials(trials: readonly { count: number; total: number; recording: string }[]): ShareFigure {
  const count = trials.reduce((sum, one) => sum + one.count, 0);
  const total = trials.reduce((sum, one) => sum + one.total, 0);
  const byRecording = bootstrapLimits(
    trials.map(({ recording }) => recording),
    (weights) => {
      let [seen, all] = [0, 0];
      trials.forEach((one, index) => {
        seen += one.count * (weights[index] as number);
        all += one.total * (weights[index] as number);
      });
      return all === 0 ? Number.NaN : seen / all;
    },
  );
  return {
    count,
    total,
    share: total === 0 ? null : count / total,
    exact: clopperPearson(count, total),
    exactUpper: clopperPearson(count, total, 0.05).high,
    byRecording,
  };
}
