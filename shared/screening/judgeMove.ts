import { isOccupied } from './companionGain.js';
import type { CompanionMeasurement, ToneMeasurement, ToneMove, TonePlace } from './MeasurementRecord.js';

/** Filters and sensors change a level by no more than this between two captures of one event; repeated events differ more. */
const largestStepDb = { aligned: 10, repeated: 15 } as const;
const leastStandOutDb = 6;
/** What stands at a place beyond what this capture shows there itself. */
const leastExcessDb = 6;

export interface JudgedMove {
  /**
   * `stays`: stands at its own place in the companion; `moved`: only where a higher frequency lands; `ambiguous`: stays, and a
   * higher frequency would stay as well; `absent`: nowhere; `hidden`: too weak to be seen in the companion.
   */
  outcome: 'stays' | 'moved' | 'ambiguous' | 'absent' | 'hidden';
  place: TonePlace | null;
  /** True frequencies that both captures show at the same places. */
  candidatesHz: number[];
  /** Chance that something unrelated stands at the place found, all places tried counted. */
  chanceProbability: number;
  /** Places looked at before and with the one found. */
  tried: number;
}

/** What stands at a place is of the tone's kind, and of the level that sensors and filters can make of it. */
export function fitsPlace(move: ToneMove, place: TonePlace, gainDb: number): boolean {
  const stepDb = move.isAligned ? largestStepDb.aligned : largestStepDb.repeated;
  return isOccupied(place, leastStandOutDb) && Math.abs(place.ratioDb - gainDb) < stepDb;
}

/**
 * Where a tone of this capture stands in the companion. A place counts when its level fits the tone's within what sensors and
 * filters do, moves with the tone (aligned captures), and is no tone that this capture shows at that place as well.
 * Smallest zones first (Xia 1999); each place tried adds to the chance.
 */
export function judgeMove(
  move: ToneMove,
  tone: ToneMeasurement,
  companion: CompanionMeasurement,
  gainDb: number,
): JudgedMove {
  const stepDb = move.isAligned ? largestStepDb.aligned : largestStepDb.repeated;
  const fits = (place: TonePlace): boolean => fitsPlace(move, place, gainDb);
  const [same, ...others] = move.places;
  if (same === undefined) return { outcome: 'hidden', place: null, candidatesHz: [], chanceProbability: 1, tried: 0 };
  const toleranceHz = (move.isAligned ? 0.75 : 2) / Math.max(move.soundsS, 1e-9);
  const isSamePlace = (place: TonePlace): boolean => Math.abs(place.expectedHz - same.expectedHz) < toleranceHz;
  if (fits(same)) {
    const alike = others.filter((place) => isSamePlace(place) && fits(place));
    const candidatesHz = [same.trueHz, ...alike.map(({ trueHz }) => trueHz)];
    return {
      outcome: alike.length > 0 ? 'ambiguous' : 'stays',
      place: same,
      candidatesHz,
      chanceProbability: 0,
      tried: 0,
    };
  }
  const levelDb = tone.levelDb + gainDb;
  const alike = companion.tones.filter((other) => Math.abs(other.levelDb - levelDb) < stepDb);
  const peaksPerHz = (alike.length + 1) / (companion.sampleRateHz / 2);
  let tried = 0;
  for (const place of others) {
    if (isSamePlace(place)) continue;
    tried++;
    if (!fits(place)) continue;
    if (place.hereDb !== null && place.ratioDb - gainDb < place.hereDb + leastExcessDb) continue;
    const chanceProbability = Math.min(1, tried * (1 - Math.exp(-2 * toleranceHz * peaksPerHz)));
    // Rates in a simple ratio show several true frequencies alike.
    const candidatesHz = others
      .filter((other) => Math.abs(other.expectedHz - place.expectedHz) < toleranceHz && fits(other))
      .map(({ trueHz }) => trueHz);
    return { outcome: 'moved', place, candidatesHz, chanceProbability, tried };
  }
  const isVisible = gainDb > same.besideDb + 2 * leastStandOutDb && same.ratioDb < gainDb - stepDb;
  return { outcome: isVisible ? 'absent' : 'hidden', place: null, candidatesHz: [], chanceProbability: 1, tried };
}
