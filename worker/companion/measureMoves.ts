import { aliasHz, candidatesHz } from '../../shared/screening/foldArithmetic.js';
import type { ToneMeasurement, ToneMove, TonePlace } from '../../shared/screening/MeasurementRecord.js';
import { FrameBank } from '../dsp/FrameBank.js';
import { besideOwn } from './besideOwn.js';
import { crossAmplitude, filledFrames } from './compareFrames.js';
import { powerOf } from './complexSums.js';

/** One channel of a capture on its own clock. */
export interface Recorded {
  samples: Float64Array;
  rateHz: number;
}

/** What happens in one capture at t happens in the other at clockRatio·t + lag. */
export interface Clock {
  lagS: number;
  clockRatio: number;
}

const mostTones = 40;
const mostPlaces = 24;
/** Two captures' clocks agree to this share of the frequency. */
const clockShare = 5e-5;
/** Frames over the overlap, from the finest in time to the finest in frequency. */
const frameCounts = [24, 16, 12, 8, 5, 3] as const;
/** Tones this much weaker than the one looked at don't disturb its frames. */
const disturbingDb = -25;
/** Places at which less than this of the highest stands are taken to be empty. */
const leastLooked = 0.03;
/** A tone of both captures at the place is fitted along, if frames are enough and it is not that much stronger. */
const leastFramesApart = 8;
const mostApartDb = 25;
/** Offsets of the places beside, in widths of a frame's response. */
const besideWidths = [-2.75, -1.75, 1.75, 2.75] as const;

/**
 * Looks for each tone of a capture in its companion: at its own place, and where each frequency that looks like it here lands
 * there. Aligned captures are compared frame by frame, phase and all, so that decay, beats and wander are shared by both sides
 * and cost nothing; captures of repeated events by their power.
 * @param clock null where the captures can't be aligned
 * @param reachHz highest true frequency looked for
 */
export function measureMoves(
  own: Recorded,
  other: Recorded,
  clock: Clock | null,
  tones: ToneMeasurement[],
  reachHz: number,
): ToneMove[] {
  const isAligned = clock !== null;
  // The companion's samples on this capture's clock.
  const startS = clock === null ? 0 : -clock.lagS / clock.clockRatio;
  const otherRateHz = other.rateHz * (clock?.clockRatio ?? 1);
  const ownS = own.samples.length / own.rateHz;
  const otherS = other.samples.length / other.rateHz;
  const fromS = Math.max(0, startS);
  const toS = isAligned ? Math.min(ownS, startS + other.samples.length / otherRateHz) : ownS;
  if (!(toS > fromS)) return [];
  const banks = new Map<number, { ours: FrameBank; theirs: FrameBank; lengthS: number }>();
  const bankOf = (frames: number) => {
    const lengthS = (2 * (toS - fromS)) / (frames + 1);
    const centres = (start: number, span: number): number[] =>
      Array.from({ length: frames }, (_, k) => start + ((k + 1) * span) / (frames + 1));
    const made = banks.get(frames) ?? {
      lengthS,
      ours: new FrameBank(own.samples, own.rateHz, 0, centres(fromS, toS - fromS), lengthS),
      theirs: isAligned
        ? new FrameBank(other.samples, otherRateHz, startS, centres(fromS, toS - fromS), lengthS)
        : new FrameBank(other.samples, other.rateHz, 0, centres(0, otherS), lengthS),
    };
    banks.set(frames, made);
    return made;
  };
  const strongest = [...tones].sort((a, b) => b.levelDb - a.levelDb).slice(0, mostTones);
  return strongest.map((tone) => {
    const nearestHz = tones.reduce(
      (least, one) =>
        one === tone || one.levelDb < tone.levelDb + disturbingDb
          ? least
          : Math.min(least, Math.abs(one.frequencyHz - tone.frequencyHz)),
      Infinity,
    );
    const frames = isAligned ? (frameCounts.find((count) => count + 1 <= nearestHz * (toS - fromS)) ?? 3) : 3;
    const { ours, theirs, lengthS } = bankOf(frames);
    const hopS = (toS - fromS) / (frames + 1);
    const here = ours.at(tone.frequencyHz);
    const power = powerOf(here);
    const soundsS = hopS * filledFrames(here);
    const spanTurns = (reach: number): number[] =>
      isAligned ? [-1, -0.5, 0, 0.5, 1].map((step) => 2 * Math.PI * step * reach * hopS) : [0];
    const looks = candidatesHz(tone.frequencyHz, own.rateHz, reachHz)
      .slice(0, mostPlaces)
      .map((trueHz) => {
        const template = ours.at(trueHz);
        const turns = spanTurns(Math.max(0.25 / soundsS, clockShare * trueHz));
        const amplitude = (frames: Float64Array): number =>
          isAligned
            ? Math.max(...turns.map((turn) => crossAmplitude(template, frames, turn))) / power
            : Math.sqrt(powerOf(frames) / power);
        const there = theirs.at(trueHz);
        return { trueHz, amplitude, ratio: amplitude(there), therePower: powerOf(there) };
      });
    const highest = Math.max(...looks.map(({ ratio }) => ratio));
    const places = looks.map(({ trueHz, amplitude, ratio, therePower }, index): TonePlace => {
      const expectedHz = aliasHz(trueHz, other.rateHz);
      // Where next to nothing stands, what stands beside it is of no interest.
      const isLooked = index === 0 || ratio > highest * leastLooked;
      const beside = (isLooked ? besideWidths : [])
        .map((width) => amplitude(theirs.at(trueHz + width * (2 / lengthS))))
        .sort((a, b) => a - b);
      const sign = signOf(trueHz, otherRateHz);
      const isElsewhere = Math.abs(expectedHz - tone.frequencyHz) > 2 / lengthS && expectedHz < own.rateHz / 2;
      const place: TonePlace = {
        trueHz,
        expectedHz,
        ratioDb: toDb(ratio),
        besideDb: toDb(isLooked ? ((beside[1] ?? 0) + (beside[2] ?? 0)) / 2 : ratio),
        hereDb: null,
        coherence: isAligned ? Math.min(1, (ratio * ratio * power) / Math.max(therePower, 1e-300)) : null,
      };
      if (!isLooked || !isElsewhere) return place;
      const alsoHere = ours.at(sign * expectedHz);
      const hereDb = toDb(amplitude(alsoHere));
      // Frames at the place's own frequency differ from those at the true one by a constant phase only.
      const apart =
        isAligned && frames >= leastFramesApart
          ? besideOwn(theirs.at(sign * expectedHz), ours.at(trueHz), alsoHere)
          : null;
      if (apart === null || toDb(apart.amplitude) < hereDb - mostApartDb) return { ...place, hereDb };
      return { ...place, ratioDb: toDb(apart.amplitude), coherence: apart.coherence };
    });
    return { frequencyHz: tone.frequencyHz, soundsS, isAligned, places };
  });
}

/** Whether a frequency lands with its direction kept (+1) or mirrored (−1). */
const signOf = (frequencyHz: number, rateHz: number): 1 | -1 =>
  frequencyHz - rateHz * Math.round(frequencyHz / rateHz) >= 0 ? 1 : -1;

const toDb = (ratio: number): number => 20 * Math.log10(Math.max(ratio, 1e-10));
