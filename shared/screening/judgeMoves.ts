import { companionGainDb } from './companionGain.js';
import { matchSigmas, poissonTail, toneErrorHz } from './harmonicFamily.js';
import { fitsPlace, type JudgedMove, judgeMove } from './judgeMove.js';
import type { CompanionMeasurement, ToneMeasurement, ToneMove } from './MeasurementRecord.js';

export interface JudgedMoves {
  gainDb: number;
  /**
   * Chance that captures of two different events agree as much: of the cross-correlation where they are aligned, else of as many
   * tones at their own places, the surer of two measures: how often those tones find other places occupied, and how well the
   * frequencies of both lists agree for their errors.
   */
  eventChance: number;
  /** One entry a measured tone; null for a tone that was not looked for. */
  tones: (JudgedMove | null)[];
}

/** Sets of tones that stay by accident are taken for one event no more often than this. */
const largestEventChance = 0.05;

/**
 * All tones of a capture against its companion. As many moves as were found have to be unlikely by chance too: among many tones
 * that the companion doesn't show some would find a place by accident; and a companion of another event shows nothing.
 * @returns null where the companion shows no tone of this capture at all
 */
export function judgeMoves(measured: readonly ToneMeasurement[], companion: CompanionMeasurement): JudgedMoves | null {
  const moves = companion.moves ?? [];
  const gainDb = companionGainDb(moves);
  if (gainDb === null) return null;
  const looked = measured.map((tone) => moves.find(({ frequencyHz }) => frequencyHz === tone.frequencyHz) ?? null);
  const judged = looked.map((move, index) => {
    const tone = measured[index];
    return move === null || tone === undefined ? null : judgeMove(move, tone, companion, gainDb);
  });
  const isAligned = looked.some((move) => move?.isAligned === true);
  const staying = looked.filter((_, index) => stays(judged[index] ?? null));
  const accident = accidents(staying, gainDb);
  const count = judged.filter((one) => one !== null).length;
  const eventChance = isAligned
    ? (companion.alignment?.chanceProbability ?? 1)
    : Math.min(
        1,
        2 *
          Math.min(
            poissonTail(staying.length, count * ((accident.hits + 0.5) / (accident.places + 1))),
            chanceOfSamePlaces(measured, companion),
          ),
      );
  const byPower = isAligned ? 0 : accident.hits / Math.max(1, accident.places);
  const chances = judged.map((one) =>
    one?.outcome === 'moved' ? Math.min(1, Math.max(one.chanceProbability, one.tried * byPower)) : 0,
  );
  const moved = chances.filter((_, index) => judged[index]?.outcome === 'moved');
  const unplaced = judged.filter((one) => one?.outcome === 'absent' || one?.outcome === 'hidden').length;
  const typical = moved.reduce((sum, chance) => sum + chance, 0) / Math.max(1, moved.length);
  const together = poissonTail(moved.length, typical * (moved.length + unplaced));
  const tones = judged.map((one, index) => {
    if (one?.outcome !== 'moved') return one;
    if (eventChance > largestEventChance)
      return { ...one, outcome: 'absent' as const, place: null, chanceProbability: 1 };
    return { ...one, chanceProbability: Math.max(chances[index] ?? 1, together, eventChance) };
  });
  return { gainDb, eventChance, tones };
}

const stays = (one: JudgedMove | null): boolean => one?.outcome === 'stays' || one?.outcome === 'ambiguous';

/** Chance that as many tones stand at the same frequencies in both lists, each within the errors of both. */
function chanceOfSamePlaces(measured: readonly ToneMeasurement[], companion: CompanionMeasurement): number {
  const binHz = 1 / Math.max(companion.durationS, 1e-9);
  let [same, expected] = [0, 0];
  for (const tone of measured) {
    const toleranceOf = (other: ToneMeasurement): number =>
      matchSigmas * Math.hypot(toneErrorHz(tone, binHz), toneErrorHz(other, binHz));
    const nearest = companion.tones.reduce<ToneMeasurement | null>(
      (best, other) =>
        Math.abs(other.frequencyHz - tone.frequencyHz) < Math.abs((best?.frequencyHz ?? Infinity) - tone.frequencyHz)
          ? other
          : best,
      null,
    );
    if (nearest === null) continue;
    expected += 1 - Math.exp(-2 * toleranceOf(nearest) * nearest.peaksPerHz);
    if (Math.abs(nearest.frequencyHz - tone.frequencyHz) <= toleranceOf(nearest)) same++;
  }
  return poissonTail(same, expected);
}

/** How often a tone that stays finds one of its other places occupied as well. */
function accidents(staying: readonly (ToneMove | null)[], gainDb: number): { hits: number; places: number } {
  let [hits, places] = [0, 0];
  for (const move of staying) {
    const [same, ...others] = move?.places ?? [];
    if (move === null || same === undefined) continue;
    for (const place of others) {
      if (Math.abs(place.expectedHz - same.expectedHz) < 2 / Math.max(move.soundsS, 1e-9)) continue;
      places++;
      if (fitsPlace(move, place, gainDb)) hits++;
    }
  }
  return { hits, places };
}
