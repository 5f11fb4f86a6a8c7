import { errorInOrder } from './calibrationError.js';
import { seededRandom } from '../../../worker/dsp/seededRandom.js';

export interface Calibration {
  /** Share of folded captures that the scores were computed for and that the drawn sets hold. */
  share: number;
  /** Captures in each drawn set. */
  captures: number;
  /** As counted; what a perfectly calibrated score would show on as many captures; the difference of the two. */
  error: number;
  expectedError: number;
  correctedError: number;
}

/**
 * Calibration error at a stated share of folded captures: sets with that share are drawn without replacement, the scores are
 * recomputed from the log-likelihood ratios with that prior, and what chance alone gives (outcomes simulated from the scores
 * themselves, as in Bröcker & Smith 2007, Weather and Forecasting 22, 651-661) is taken off. Can come out below 0.
 */
export function calibrationAtShare(
  captures: readonly { logRatio: number; isFolded: boolean }[],
  share: number,
  options: { sets?: number; simulations?: number; bins?: number; seed?: number } = {},
): Calibration {
  const { sets = 40, simulations = 25, bins = 10, seed = 1 } = options;
  const random = seededRandom(seed);
  const folded = captures.filter(({ isFolded }) => isFolded);
  const others = captures.filter(({ isFolded }) => !isFolded);
  const total = Math.floor(Math.min(folded.length / share, others.length / (1 - share)));
  const foldedCount = Math.round(total * share);
  const prior = Math.log(share / (1 - share));
  let [error, expectedError] = [0, 0];
  for (let set = 0; set < sets; set++) {
    const drawn = [...draw(folded, foldedCount, random), ...draw(others, total - foldedCount, random)];
    const scores = Float64Array.from(drawn, ({ logRatio }) => 1 / (1 + Math.exp(-logRatio - prior)));
    const outcomes = Float64Array.from(drawn, ({ isFolded }) => (isFolded ? 1 : 0));
    const order = Array.from(scores.keys()).sort((a, b) => (scores[a] ?? 0) - (scores[b] ?? 0));
    error += errorInOrder(order, scores, outcomes, bins) / sets;
    for (let n = 0; n < simulations; n++) {
      const simulated = scores.map((score) => (random() < score ? 1 : 0));
      expectedError += errorInOrder(order, scores, simulated, bins) / (sets * simulations);
    }
  }
  return { share, captures: total, error, expectedError, correctedError: error - expectedError };
}

/** `count` of the items without replacement (Fisher-Yates, stopped early). */
function draw<T>(items: readonly T[], count: number, random: () => number): T[] {
  const rest = [...items];
  for (let n = 0; n < count; n++) {
    const other = n + Math.floor(random() * (rest.length - n));
    [rest[n], rest[other]] = [rest[other] as T, rest[n] as T];
  }
  return rest.slice(0, count);
}
