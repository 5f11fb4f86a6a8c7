import type { ScreenedCapture } from '../screening/ScreenedCapture.js';
import { simpleThresholdsDb } from '../simple/simpleMethods.js';

/** Something that scores captures and calls them folded or clear: this engine, or a script that it is held against. */
export interface ScreeningMethod {
  name: string;
  /** What it can be used on: the simple ones need a uniform rate. */
  isFor: (capture: ScreenedCapture) => boolean;
  score: (capture: ScreenedCapture) => number;
  callsFolded: (capture: ScreenedCapture) => boolean;
  callsClear: (capture: ScreenedCapture) => boolean;
}

const hasLevels = ({ simple }: ScreenedCapture): boolean => simple !== null;
const midDb = ({ simple }: ScreenedCapture): number => simple?.edgeAgainstMidDb ?? Number.NEGATIVE_INFINITY;
const totalDb = ({ simple }: ScreenedCapture): number => simple?.edgeAgainstTotalDb ?? Number.NEGATIVE_INFINITY;

const engine: ScreeningMethod = {
  name: 'Overfold',
  isFor: () => true,
  // Without a score nothing is known: the prior.
  score: ({ foldScore, prior }) => foldScore ?? prior,
  callsFolded: ({ verdict }) => verdict === 'folded',
  callsClear: ({ verdict }) => verdict === 'clear',
};

export const screeningMethods: readonly ScreeningMethod[] = [
  engine,
  { ...engine, name: 'Overfold, uniform captures', isFor: hasLevels },
  {
    name: 'edge level against mid-band',
    isFor: hasLevels,
    score: midDb,
    callsFolded: (capture) => midDb(capture) > simpleThresholdsDb.edgeAgainstMid,
    callsClear: (capture) => midDb(capture) <= simpleThresholdsDb.edgeAgainstMid,
  },
  {
    name: 'Welch-and-threshold script',
    isFor: hasLevels,
    score: totalDb,
    callsFolded: (capture) => totalDb(capture) > simpleThresholdsDb.edgeAgainstTotal,
    callsClear: (capture) => totalDb(capture) <= simpleThresholdsDb.edgeAgainstTotal,
  },
];
