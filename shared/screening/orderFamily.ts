import type { AcquisitionSheet } from '../schemas/acquisitionSheet.js';
import { bestBlindFamily, followFamily, type HarmonicFamily } from './harmonicFamily.js';
import type { ToneMeasurement } from './MeasurementRecord.js';
import type { OrderLawMeasurement } from './OrderMeasurement.js';

export interface OrderFamily {
  fundamentalHz: number;
  /** From the stated speed, or from the lines alone. */
  isStated: boolean;
  /** Multiple of the fundamental; null between its multiples. */
  orderOf: (meanFrequencyHz: number) => number | null;
}

/** A stated speed is the mean one to within this share of it: a run-up's mean may lie well off. */
const statedShare = 0.05;
const leastStatedMembers = 2;
/** A line's place is read to this share of a bin. */
const placeBins = 0.3;
const orderTolerance = 0.1;

/** The shaft's own speed behind the lines that follow one law; null where they have no common spacing. */
export function orderFamily(
  { inBandLines, pulseHz }: OrderLawMeasurement,
  sheet: AcquisitionSheet,
  binHz: number,
): OrderFamily | null {
  const tones = inBandLines.map(({ frequencyHz, standsOutDb }): ToneMeasurement => ({
    frequencyHz,
    boundHz: placeBins * binHz,
    wanderHz: 0,
    levelDb: standsOutDb,
    standsOutDb,
    floorDb: 0,
    peaksPerHz: 0,
  }));
  const family =
    pulseFamily(tones, pulseHz, binHz) ??
    statedFamily(tones, sheet, binHz) ??
    bestBlindFamily(tones, [...tones.keys()], binHz);
  if (family === null) return null;
  const { fundamentalHz, isStated } = family;
  return {
    fundamentalHz,
    isStated,
    orderOf: (meanFrequencyHz) => {
      const order = Math.round(meanFrequencyHz / fundamentalHz);
      return order > 0 && Math.abs(meanFrequencyHz / fundamentalHz - order) < orderTolerance ? order : null;
    },
  };
}

/** Lines at multiples of the pulse rate: an order is then counted in pulses. */
function pulseFamily(tones: ToneMeasurement[], pulseHz: number | null, binHz: number): HarmonicFamily | null {
  if (pulseHz === null) return null;
  const family = followFamily(tones, 'pulses', pulseHz, 0.01 * pulseHz, binHz, true);
  return family.members.length >= leastStatedMembers ? family : null;
}

function statedFamily(tones: ToneMeasurement[], sheet: AcquisitionSheet, binHz: number): HarmonicFamily | null {
  const startHz = sheet.nominalSpeedHz;
  if (startHz === undefined) return null;
  const family = followFamily(tones, 'shaft', startHz, (statedShare * startHz) / 3, binHz, true);
  return family.members.length >= leastStatedMembers ? family : null;
}
