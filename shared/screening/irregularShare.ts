import type { BeyondHalfMeasurement, IrregularMeasurement, IrregularTone } from './MeasurementRecord.js';
import { normalProbability } from './normalProbability.js';

/** What the fold score and its calibration mean by folded: more than this share of the power. */
const materialShareDb = -40;
/** Of a level estimated from a capture of limited length and steadiness. */
const levelErrorDb = 1.5;
const largestChance = 0.01;
/** Noise alone scatters over the bands, and what lies above the common level adds up to some 6 dB over the error. */
const leastOverErrorDb = 6;
const leastRatio = -6;
const largestRatio = 6;
/** Nothing seen, but noise could hide a little. */
const unseenRatio = -2.5;

export interface IrregularShare {
  /** Share of the power shown to lie beyond half the mean rate, dB; null for none. */
  shownDb: number | null;
  /** The most that the stamps leave possible up to the reach, dB; null where that was not measured. */
  mostDb: number | null;
  isBroadbandShown: boolean;
  /** Chance that the share shown is above −40 dB. */
  materialChance: number;
  /** Natural logarithm of the likelihood ratio for the fold score. */
  logRatio: number;
}

const fromDb = (level: number): number => 10 ** (level / 10);
const toDb = (power: number): number => 10 * Math.log10(Math.max(power, 1e-40));

/**
 * Chance that held-out stretches favour content beyond half the mean rate this much where there is none. Half the log
 * ratio counts: on simulated white and coloured noise below half the mean rate, 240 captures, none passed 8.3.
 */
export function broadbandChance({ heldOutLogRatio }: BeyondHalfMeasurement): number {
  return Math.min(1, Math.exp(-heldOutLogRatio / 2));
}

/** Adds up the tones shown and, where held-out stretches confirm it, the rest beyond half the mean rate. */
export function irregularShare(
  { beyond, totalDb, tones: found }: IrregularMeasurement,
  tones: IrregularTone[],
  confidenceWanted: number,
): IrregularShare {
  // Older records lack the total: that of the tones found is a lower limit.
  const total = totalDb === undefined ? sumOf(found) : fromDb(totalDb);
  const toneShare = total > 0 ? sumOf(tones) / total : 0;
  const rest = beyond ?? null;
  const isBroadbandShown =
    rest !== null &&
    broadbandChance(rest) < Math.min(1 - confidenceWanted, largestChance) &&
    rest.beyondDb > rest.errorDb + leastOverErrorDb;
  const shown = toneShare + (isBroadbandShown ? fromDb(rest.beyondDb) : 0);
  const most =
    rest === null ? null : toneShare + fromDb(rest.beyondDb) + fromDb(rest.flatDb) + 2 * fromDb(rest.errorDb);
  const shownDb = shown > 0 ? toDb(shown) : null;
  const mostDb = most === null ? null : toDb(most);
  const materialChance = shownDb === null ? 0 : normalProbability((shownDb - materialShareDb) / levelErrorDb);
  const highest = mostDb === null ? 1 : normalProbability((mostDb - materialShareDb) / levelErrorDb);
  return { shownDb, mostDb, isBroadbandShown, materialChance, logRatio: ratioOf(materialChance, highest) };
}

/** Between what is shown and what is possible, unseen energy is unlikely but not excluded. */
function ratioOf(materialChance: number, possibleChance: number): number {
  const unseen = Math.max(0, possibleChance - materialChance) / (1 + Math.exp(-unseenRatio));
  const chance = Math.min(1, materialChance + unseen);
  const ratio = Math.log(Math.max(chance, 1e-6) / Math.max(1 - chance, 1e-6));
  return Math.max(leastRatio, Math.min(largestRatio, ratio));
}

function sumOf(tones: IrregularTone[]): number {
  return tones.reduce((sum, { levelDb }) => sum + fromDb(levelDb), 0);
}
