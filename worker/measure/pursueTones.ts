import type { IrregularTone } from '../../shared/screening/MeasurementRecord.js';
import { decibels } from '../dsp/decibels.js';
import { createLombScargle } from '../dsp/lombScargle.js';
import { localFloor, nearlyHighest, seenShare, strongestAboveFloor } from '../dsp/localFloor.js';
import { type ExtremeValueLaw, logChanceOfPeak, shuffledMaxima } from '../dsp/shuffledMaxima.js';
import { type SinusoidFit, sinusoidFit, sinusoidModel } from '../dsp/sinusoidFit.js';
import type { IrregularSearch } from './irregularReach.js';

export interface PursuedTones {
  tones: IrregularTone[];
  falseAlarm: ExtremeValueLaw;
  /** What the tones leave of all values. */
  residual: Float64Array;
}

type Rival = Required<Pick<IrregularTone, 'rivalHz' | 'rivalLogRatio'>>;
type Found = SinusoidFit & { ratios: number[]; rivals: Rival[] };

/** Rivals are tried where the samples are less likely by no more than this, in nats per sample. */
const triedShare = 0.05;
const mostTones = 16;
const leastLogChance = Math.log(1e-3);
/** A tone found once more within this many 1/span of a stronger one is that one's unsteadiness. */
const sameToneWidths = 3;

/**
 * Prepares the pursuit for stamps shared by all channels. Times count from the middle of the capture.
 * Orthogonal matching pursuit (Tropp & Gilbert 2007) on four fifths of the samples: the peak that stands highest above its
 * surroundings joins, all frequencies and amplitudes are refined together, until a peak is no rarer than noise would give or no longer
 * lowers the residual of the fifth that took no part. Each tone is then confirmed on that fifth alone, set against its
 * rivals (another frequency in its place: the window's own pattern), and refined on all samples.
 */
export function createTonePursuit(
  timesS: Float64Array,
  search: IrregularSearch,
): (values: Float64Array) => PursuedTones {
  const fitted = part(timesS, false);
  const periodogram = createLombScargle(fitted, search.stepHz, search.count);
  const polishing = { steps: 1, mostShiftHz: 0.25 / search.spanS };
  return (values) => {
    const found = pursue(values);
    const law = shuffledMaxima(found.residual, periodogram, search.count > 2 ** 14 ? 8 : 16);
    const all = sinusoidFit(timesS, values, found.frequenciesHz, { steps: 4, mostShiftHz: polishing.mostShiftHz });
    const tones = describe(found, all, values, law);
    return { tones, falseAlarm: law, residual: all.residual };
  };

  function pursue(values: Float64Array): Found {
    const [fitValues, heldValues, heldTimes] = [part(values, false), part(values, true), part(timesS, true)];
    const ratios: number[] = [];
    let fit = sinusoidFit(fitted, fitValues, []);
    let held = meanSquare(less(heldValues, sinusoidModel(heldTimes, fit)));
    while (ratios.length < mostTones) {
      const leastRatio = Math.log(Math.max(1, search.reachHz * search.spanS)) - leastLogChance;
      const peak = strongestAboveFloor(periodogram(fit.residual), leastRatio);
      if (peak === null) break;
      const startHz = bestOffGrid(fit.residual, peak.places);
      const next = sinusoidFit(fitted, fitValues, [...fit.frequenciesHz, startHz], polishing);
      const nextHeld = meanSquare(less(heldValues, sinusoidModel(heldTimes, next)));
      if (!(nextHeld < held)) break;
      [fit, held] = [next, nextHeld];
      ratios.push(peak.ratio);
    }
    return { ...swapRivals(fit, fitValues), ratios };
  }

  /** Between grid points a peak may be higher than on them: of those nearly as high, the one that explains most. */
  function bestOffGrid(residual: Float64Array, places: number[]): number {
    let best = { frequencyHz: 0, left: Number.POSITIVE_INFINITY };
    for (const place of places) {
      const fit = sinusoidFit(fitted, residual, [(place + 1) * search.stepHz], {
        steps: 2,
        mostShiftHz: search.stepHz,
      });
      const left = meanSquare(fit.residual);
      if (left < best.left) best = { frequencyHz: fit.frequenciesHz[0] as number, left };
    }
    return best.frequencyHz;
  }

  /**
   * With all tones found, one taken for another by the window's pattern may show: then the better one takes its place.
   * Rivals far less likely than the tone are not tried.
   */
  function swapRivals(start: SinusoidFit, fitValues: Float64Array): SinusoidFit & { rivals: Rival[] } {
    let fit = start;
    let rivals = start.frequenciesHz.map((_, index) => rivalOf(start, index));
    let hasSwapped = false;
    rivals.forEach(({ rivalHz, rivalLogRatio }, index) => {
      if (rivalHz === null || rivalLogRatio === null || rivalLogRatio > triedShare * fitted.length) return;
      const swapped = fit.frequenciesHz.map((hz, other) => (other === index ? rivalHz : hz));
      const next = sinusoidFit(fitted, fitValues, swapped, polishing);
      if (!(meanSquare(next.residual) < meanSquare(fit.residual))) return;
      fit = next;
      hasSwapped = true;
    });
    if (hasSwapped) rivals = fit.frequenciesHz.map((_, index) => rivalOf(fit, index));
    return { ...fit, rivals };
  }

  function describe(found: Found, all: SinusoidFit, values: Float64Array, law: ExtremeValueLaw): IrregularTone[] {
    const floor = localFloor(periodogram(found.residual));
    const heldTimes = part(timesS, true);
    const heldResidual = less(part(values, true), sinusoidModel(heldTimes, found));
    const noise = meanSquare(all.residual);
    const powers = all.frequenciesHz.map(
      (_, index) => ((all.cosines[index] as number) ** 2 + (all.sines[index] as number) ** 2) / 2,
    );
    return all.frequenciesHz.flatMap((frequencyHz, index) => {
      const tonePower = powers[index] as number;
      const isPartOfAnother = all.frequenciesHz.some(
        (other, o) =>
          Math.abs(other - frequencyHz) * search.spanS < sameToneWidths && (powers[o] as number) > tonePower,
      );
      const tone = sinusoidModel(heldTimes, found, index);
      const without = heldResidual.map((value, n) => value + (tone[n] as number));
      const heldOutGainDb = decibels(meanSquare(without) / Math.max(meanSquare(heldResidual), 1e-300));
      const place = Math.min(floor.length - 1, Math.max(0, Math.round(frequencyHz / search.stepHz) - 1));
      // Share of the residual that a frequency takes by chance, against 2/(N − 1) for white noise: the noise as met there.
      const colour = ((floor[place] as number) * (fitted.length - 1)) / 2;
      // What the tone takes with all others in place: as found at first it may have stood for several.
      const ratio = Math.min(
        found.ratios[index] as number,
        (fitted.length * tonePower) / (2 * noise * Math.max(0.1, colour)),
      );
      if (isPartOfAnother || !(heldOutGainDb > 0) || !(frequencyHz > 0)) return [];
      return {
        frequencyHz,
        uncertaintyHz:
          (all.spreadHz[index] as number) > 0
            ? (all.spreadHz[index] as number) * Math.sqrt(noise * Math.max(0.1, colour))
            : 1 / search.spanS,
        levelDb: decibels(tonePower),
        standsOutDb: decibels(ratio),
        logFalseAlarm: Math.max(-1e6, logChanceOfPeak(ratio, law)),
        heldOutGainDb,
        ...(found.rivals[index] as Rival),
      };
    });
  }

  /** The best other frequency in the tone's place, and how much less likely it makes the samples (natural logarithm). */
  function rivalOf(found: SinusoidFit, index: number): Rival {
    const tone = sinusoidModel(fitted, found, index);
    const target = found.residual.map((value, n) => value + (tone[n] as number));
    const power = periodogram(target);
    const frequencyHz = found.frequenciesHz[index] as number;
    const far = power.map((value, k) =>
      Math.abs((k + 1) * search.stepHz - frequencyHz) * search.spanS < sameToneWidths ? 0 : value,
    );
    const places = nearlyHighest(far);
    if (places.length === 0) return { rivalHz: null, rivalLogRatio: null };
    const left = meanSquare(found.residual);
    const before = meanSquare(target);
    const gridShare = (far[places[0] as number] as number) / seenShare;
    // A rival that explains little is no danger, wherever exactly it lies between the grid's points.
    const isWeak = gridShare < 0.7 * (1 - left / before);
    const rivalHz = isWeak ? ((places[0] as number) + 1) * search.stepHz : bestOffGrid(target, places);
    const rivalLeft = isWeak ? before * (1 - gridShare) : meanSquare(sinusoidFit(fitted, target, [rivalHz]).residual);
    const logRatio = (fitted.length / 2) * Math.log(Math.max(rivalLeft, 1e-300) / Math.max(left, 1e-300));
    return { rivalHz, rivalLogRatio: Math.max(0, logRatio) };
  }
}

/** Every fifth sample on average, without a period that a tone could share, takes no part in the fit. */
const isHeld = (n: number): boolean => (Math.imul(n + 1, 0x9e3779b1) >>> 16) % 5 === 0;

const part = (source: Float64Array, held: boolean): Float64Array => source.filter((_, n) => isHeld(n) === held);

const less = (values: Float64Array, model: Float64Array): Float64Array =>
  values.map((value, n) => value - (model[n] as number));

function meanSquare(values: Float64Array): number {
  return values.reduce((sum, value) => sum + value * value, 0) / Math.max(1, values.length);
}
