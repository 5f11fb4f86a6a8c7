import type { HarmonicFamily } from './harmonicFamily.js';
import type { ToneMeasurement } from './MeasurementRecord.js';

export interface FundamentalTrack {
  /** Phase of the fundamental, rad, in equal parts of the capture. */
  phasesRad: number[];
  errorRad: number;
}

/** No track is known better than this: neighbours that beat, and parts cut at other places. */
const leastErrorRad = 0.01;
/** The fundamental's track has to show this many times its own error, or nothing can be set against it. */
const leastWanderRatio = 3;
/** A slope has to be known to this part of what is expected of it. */
const largestRelativeError = 0.1;

/**
 * How the phase of a family's fundamental wanders: weighted mean of its members' tracks over their multiples. True
 * harmonics wander in proportion (order tracking: Blough 2003).
 * @returns null where nothing wanders visibly
 */
export function fundamentalTrack(tones: ToneMeasurement[], family: HarmonicFamily): FundamentalTrack | null {
  const members = family.members.flatMap(({ tone, multiple }) => {
    const track = tones[tone]?.phaseTrack;
    return track === undefined ? [] : [{ multiple, ...track, errorRad: Math.hypot(track.errorRad, leastErrorRad) }];
  });
  const parts = members[0]?.phasesRad.length ?? 0;
  if (parts === 0) return null;
  // A stranger that only stands at a multiple must not bend the track: the weighted median, then the mean of what follows it.
  const median = Array.from({ length: parts }, (_, part) =>
    weightedMedian(
      members.map(({ multiple, errorRad, phasesRad }) => ({
        value: (phasesRad[part] ?? 0) / multiple,
        weight: multiple / errorRad,
      })),
    ),
  );
  const following = members.filter(({ multiple, phasesRad, errorRad }) => {
    const left = phasesRad.map((phase, part) => phase - multiple * (median[part] ?? 0));
    return rmsOf(left) <= Math.max(3 * errorRad, 0.2 * multiple * rmsOf(median));
  });
  if (following.length === 0) return null;
  const weight = following.reduce((sum, { multiple, errorRad }) => sum + (multiple / errorRad) ** 2, 0);
  const phasesRad = median.map(
    (_, part) =>
      following.reduce(
        (sum, { multiple, errorRad, phasesRad: phases }) => sum + (multiple * (phases[part] ?? 0)) / errorRad ** 2,
        0,
      ) / weight,
  );
  const errorRad = weight ** -0.5;
  return rmsOf(phasesRad) > leastWanderRatio * errorRad ? { phasesRad, errorRad } : null;
}

const rmsOf = (values: number[]): number =>
  Math.sqrt(values.reduce((sum, value) => sum + value * value, 0) / values.length);

function weightedMedian(values: { value: number; weight: number }[]): number {
  const ordered = [...values].sort((x, y) => x.value - y.value);
  const half = ordered.reduce((sum, { weight }) => sum + weight, 0) / 2;
  let reached = 0;
  for (const { value, weight } of ordered) {
    reached += weight;
    if (reached >= half) return value;
  }
  return 0;
}

/**
 * By what multiple of the fundamental a tone's phase wanders, least squares: +k for a true harmonic, −k for one mirrored by
 * sampling, 0 for a stranger.
 * @returns null without tracks; `error` holds what the straight line leaves too
 */
export function phaseSlope(
  tone: ToneMeasurement,
  fundamental: FundamentalTrack,
): { slope: number; error: number } | null {
  if (tone.phaseTrack === undefined) return null;
  const { phasesRad, errorRad } = tone.phaseTrack;
  const energy = fundamental.phasesRad.reduce((sum, phase) => sum + phase * phase, 0);
  const slope = phasesRad.reduce((sum, phase, part) => sum + phase * (fundamental.phasesRad[part] ?? 0), 0) / energy;
  const left = phasesRad.reduce(
    (sum, phase, part) => sum + (phase - slope * (fundamental.phasesRad[part] ?? 0)) ** 2,
    0,
  );
  const spread = Math.max(Math.hypot(errorRad, leastErrorRad) ** 2, left / Math.max(1, phasesRad.length - 3));
  return { slope, error: Math.sqrt(spread / energy) };
}

/**
 * Whether a tone wanders as the predicted multiple does (negative: mirrored). `null`: the tracks don't tell. `chance` is the
 * share of slopes of that size, either way up, that would have fitted as well.
 */
export function slopeAgrees(
  tone: ToneMeasurement,
  fundamental: FundamentalTrack | null,
  multiple: number,
): { agrees: boolean; chance: number } | null {
  const fitted = fundamental === null ? null : phaseSlope(tone, fundamental);
  if (fitted === null || fitted.error > largestRelativeError * Math.abs(multiple)) return null;
  // The fundamental's own error in its track makes every slope too small by a few per cent at most.
  const toleranceOrders = Math.max(3 * fitted.error, 0.1 * Math.abs(multiple));
  return {
    agrees: Math.abs(fitted.slope - multiple) <= toleranceOrders,
    chance: Math.min(1, toleranceOrders / Math.abs(multiple)),
  };
}
