import type {
  FoldedOrderMeasurement,
  OrderLawMeasurement,
  OrderMeasurement,
} from '../../shared/screening/OrderMeasurement.js';
import { type ChirpVote, chirpVotes } from '../dsp/warp/chirpVotes.js';
import { decibels } from '../dsp/decibels.js';
import { findLaws, followLaw, type FoundLaw } from '../dsp/warp/findLaws.js';
import { flattenSpectrum, type FlatSignal } from '../dsp/warp/flattenSpectrum.js';
import { type FoldedLine, foldedLines } from '../dsp/warp/foldedLines.js';
import { followsOtherLaw } from '../dsp/warp/followsOtherLaw.js';
import { isSameRidge } from '../dsp/warp/isSameRidge.js';
import { removeInBandLines } from '../dsp/warp/removeInBandLines.js';
import { oppositeLaw, type SpeedLaw } from '../dsp/warp/SpeedLaw.js';
import type { ChannelSpeed } from '../dsp/warp/speedFromChannel.js';
import { taperEnds } from '../dsp/warp/taperEnds.js';
import { type TransformOf, transformOf } from '../dsp/warp/transformOf.js';
import type { WarpedTransform } from '../dsp/warp/WarpedTransform.js';
import { binPowers, type WarpedLine, warpedLines } from '../dsp/warp/warpedLines.js';

export interface OrderOptions {
  sampleRateHz: number;
  /** Orders are looked for up to here. */
  highestHz: number;
  /** Time of the first sample. */
  fromS: number;
  /** From a speed channel of the same capture and stretch. */
  speed?: ChannelSpeed | null;
}

export const leastOrderSamples = 2048;
const voteLengths = [256, 512, 1024, 2048, 4096, 8192, 16384];
/** Longer stretches use every second frame length. */
const longStretch = 40_000;
const mostLinesKept = 32;
/** A line enters the record from here; whether it counts is the judge's to say. */
const leastKeptRatio = 10;
const inBandRatio = 10;
const clearLeadDb = 3;
/** So many lines that share a law in band are a machine of their own, and not one folded line. */
const leastMachineLines = 3;
/** Where the speed is read; the very ends, where samples fade, are left out. */
const speedShares = Array.from({ length: 37 }, (_, i) => (i + 2) / 40);
/** Near a multiple of fs/2 a folded order follows the opposite law for a while: such lines are no measure of chance. */
const alikeBins = 12;

/**
 * Orders beyond fs/2 in one stretch of a channel: the relative speed law is found blind from the slopes of all lines, the
 * stretch is transformed in warped time, where everything that turns with it is a steady line at its true frequency, and
 * the lines beyond fs/2 are measured where they are folded. The opposite law gives the height that no folding explains.
 * @returns null where the stretch is too short
 */
export function measureOrders(samples: Float64Array, options: OrderOptions): OrderMeasurement | null {
  const { length } = samples;
  if (length < leastOrderSamples) return null;
  const mean = samples.reduce((sum, value) => sum + value, 0) / length;
  const flat = flattenSpectrum(samples.map((value) => value - mean));
  const tapered = taperEnds(flat.samples);
  const known = options.speed ? followLaw(tapered, options.speed.law, transformOf) : null;
  const found = known === null ? findLaws(tapered, collectVotes(flat.samples), transformOf) : [known];
  const stretch = { tapered, flat, options, transformOf, speed: known === null ? null : (options.speed ?? null) };
  const measured = found.map((one) => ({
    law: one.law,
    measured: measureLaw(
      one,
      found.filter((other) => other !== one).map(({ law }) => law),
      stretch,
    ),
  }));
  const laws = dropSameRidges(measured, options.sampleRateHz);
  return {
    fromS: options.fromS,
    toS: options.fromS + length / options.sampleRateHz,
    highestHz: options.highestHz,
    laws,
  };
}

function collectVotes(samples: Float64Array): ChirpVote[] {
  const { length } = samples;
  const step = length > longStretch ? 2 : 1;
  return voteLengths
    .filter((frame, index) => frame <= length / 4 && index % step === 0)
    .flatMap((frame) => chirpVotes(samples, frame));
}

interface Stretch {
  tapered: Float64Array;
  flat: FlatSignal;
  options: OrderOptions;
  transformOf: TransformOf;
  /** Where the law comes from a speed channel. */
  speed: ChannelSpeed | null;
}

function inBandLines(samples: Float64Array, law: SpeedLaw, transformOf: TransformOf): WarpedLine[] {
  const count = Math.floor(law.length / 2 / Math.max(...speedShares.map(law.speedAt)));
  return warpedLines(binPowers(transformOf(count + 64).forward(law.warped, samples)), 3, count, inBandRatio);
}

/**
 * What turns with another shaft is no line under this law, but hundreds of its bins could pass for one: it is taken out where
 * at least three lines that this law leaves share the other law in band (one alone may be a folded line of this law).
 */
function removeMachines(
  tapered: Float64Array,
  law: SpeedLaw,
  others: SpeedLaw[],
  transformOf: TransformOf,
): { rest: Float64Array; machines: SpeedLaw[]; lineCount: number } {
  let rest = removeInBandLines(tapered, law, transformOf);
  const machines: SpeedLaw[] = [];
  let lineCount = 0;
  for (const other of others) {
    const lines = inBandLines(rest, other, transformOf);
    if (lines.length < leastMachineLines) continue;
    machines.push(other);
    lineCount += lines.length;
    rest = removeInBandLines(rest, other, transformOf);
  }
  return { rest, machines, lineCount };
}

function measureLaw(
  { law, sharpness, steadySharpness }: FoundLaw,
  others: SpeedLaw[],
  { tapered, flat, options, transformOf, speed }: Stretch,
): OrderLawMeasurement {
  const { sampleRateHz, highestHz, fromS } = options;
  const { length } = law;
  const durationS = length / sampleRateHz;
  const count = Math.ceil((highestHz / sampleRateHz) * length) + 64;
  const transform = transformOf(count);
  const speeds = speedShares.map(law.speedAt);
  const inBand = inBandLines(tapered, law, transformOf);
  const { rest, machines, lineCount } = removeMachines(tapered, law, others, transformOf);
  const lines = foldedLines(transform.forward(law.warped, rest), law)
    .filter(({ ratio }) => ratio > leastKeptRatio)
    .filter((line) => !machines.some((machine) => followsOtherLaw({ law, ...line }, machine)));
  const chanceRatio = lines.length === 0 ? 0 : highestByChance(rest, oppositeLaw(law), transform);
  return {
    mode: speed === null ? 'blind' : 'speedChannel',
    pulseHz: speed === null || speed.pulses === null ? null : speed.pulses / durationS,
    speedFrom: speeds[0] as number,
    speedTo: speeds[speeds.length - 1] as number,
    speedChange: Math.max(...speeds) - Math.min(...speeds),
    sharpness,
    steadySharpness,
    inBandLines: inBand
      .slice(0, mostLinesKept)
      .map(({ bin, ratio }) => ({ frequencyHz: bin / durationS, standsOutDb: decibels(ratio) })),
    otherLines: lineCount,
    linesTried: count,
    chanceStandsOutDb: decibels(Math.max(1, chanceRatio)),
    lines: lines.slice(0, mostLinesKept).map((line) => {
      const gain = flat.gainAt(line.foldedFrequency);
      return {
        frequencyHz: line.foldedFrequency * sampleRateHz,
        trueFrequencyHz: line.trueFrequency * sampleRateHz,
        meanFrequencyHz: line.nu * sampleRateHz,
        uncertaintyHz: Math.sqrt(6 / line.ratio) / (Math.PI * durationS * line.foldedShare),
        levelDb: decibels((line.power * line.foldedShare) / gain ** 2),
        standsOutDb: decibels(line.ratio),
        inBandStandsOutDb: line.inBandRatio > 1 ? decibels(line.inBandRatio) : null,
        foldedShare: line.foldedShare,
        apartBins: line.apartBins,
        fromS: fromS + line.from * durationS,
        toS: fromS + line.to * durationS,
      };
    }),
  };
}

/** The highest line beyond fs/2 under a law that nothing in the stretch follows. */
function highestByChance(samples: Float64Array, law: SpeedLaw, transform: WarpedTransform): number {
  const isOther = (line: FoldedLine): boolean =>
    Math.abs(2 * line.nu - Math.round(2 * line.nu)) * line.apartBins > alikeBins;
  return foldedLines(transform.forward(law.warped, samples), law).filter(isOther)[0]?.ratio ?? 0;
}

interface MeasuredLaw {
  law: SpeedLaw;
  measured: OrderLawMeasurement;
}

/**
 * One ridge can follow two laws, each folded where the other is in band: a sweep up through fs/2, or one down from beyond.
 * The reading in which it stands out more is kept, of equals the one with the shorter folded part.
 */
function dropSameRidges(laws: MeasuredLaw[], sampleRateHz: number): OrderLawMeasurement[] {
  const ridges = laws.flatMap(({ law, measured }) =>
    measured.lines.map((line) => ({ law, line, nu: line.meanFrequencyHz / sampleRateHz })),
  );
  const dropped = new Set<FoldedOrderMeasurement>();
  for (const one of ridges) {
    for (const other of ridges) {
      if (one.law === other.law || dropped.has(other.line) || !isSameRidge(one, other)) continue;
      const lead = other.line.standsOutDb - one.line.standsOutDb;
      const isShorter = other.line.foldedShare < one.line.foldedShare;
      if (lead > clearLeadDb || (lead > -clearLeadDb && isShorter)) dropped.add(one.line);
    }
  }
  return laws.map(({ measured }) => ({ ...measured, lines: measured.lines.filter((line) => !dropped.has(line)) }));
}
