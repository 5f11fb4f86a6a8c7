import { aliasHz } from '@shared/screening/foldArithmetic.js';
import { magnitudeSquared } from '@shared/screening/filterModels.js';
import type { AntiAliasFilter } from '@shared/schemas/acquisitionSheet.js';
import { curve, label, line, sumDb, tone } from './figureParts';
import type { FigurePoint, FigureShape, HelpFigure } from './HelpFigure';

const rateHz = 1000;
const halfHz = rateHz / 2;
const floorDb = -84;
const bottomDb = -95;
const protectionDb = 40;
const filter = { type: 'butterworth', order: 12, cornerHz: 300 } satisfies AntiAliasFilter;

const sourceDb = (hz: number): number => -12 - hz / 60;
const filteredDb = (hz: number): number => sourceDb(hz) + 10 * Math.log10(magnitudeSquared(filter, hz) ?? 1);
/** What is recorded: the source, what folds from the next two zones, and the converter's floor. */
const recordedDb = (before: (hz: number) => number, hz: number): number =>
  sumDb(before(hz), before(rateHz - hz), before(rateHz + hz), floorDb);
const filtered = (hz: number): number => recordedDb(filteredDb, hz);
const unfiltered = (hz: number): number => recordedDb(sourceDb, hz);

const frame = {
  xLabel: 'frequency, Hz (fs/2 = 500)',
  yLabel: 'density, dB',
  xRange: [0, halfHz] as const,
  yRange: [bottomDb, 0] as const,
};
const across = (value: (hz: number) => number): FigurePoint[] => curve(0, halfHz, 101, value);
const level = (role: 'caution' | 'protected' | 'quiet', atDb: number): FigureShape =>
  line(
    role,
    [
      [0, atDb],
      [halfHz, atDb],
    ],
    true,
  );
/** Up to here the density stands above the bound by the protection. */
const clearTo = (value: (hz: number) => number): number =>
  across(value).findLast(([, atDb]) => atDb >= value(halfHz) + protectionDb)?.[0] ?? 0;

export function skirtFigure(): HelpFigure {
  return {
    ...frame,
    title: 'With and without a skirt',
    description:
      'With a filter the density falls by tens of decibels before fs/2. Without one (dashed) it reaches fs/2 almost undiminished, so what lies beyond has folded in.',
    shapes: [
      line('protected', across(filtered)),
      line('caution', across(unfiltered), true),
      label('protected', [300, -70], 'filtered', 'end'),
      label('caution', [495, -8], 'no skirt', 'end'),
    ],
  };
}

export function boundFigure(): HelpFigure {
  const boundDb = filtered(halfHz);
  const topHz = clearTo(filtered);
  return {
    ...frame,
    title: 'Bound and clear-to frequency',
    description: `The density next to fs/2 bounds what may have folded anywhere (lower dashed line). The capture is clear up to ${Math.round(topHz)} Hz, where the density falls below the bound plus ${protectionDb} dB (upper dashed line).`,
    shapes: [
      {
        shape: 'area',
        role: 'protected',
        points: [[0, boundDb], ...across(filtered).filter(([hz]) => hz <= topHz), [topHz, boundDb]],
      },
      line('signal', across(filtered)),
      level('caution', boundDb),
      level('protected', boundDb + protectionDb),
      tone('protected', topHz, filtered(topHz), bottomDb),
      label('caution', [6, boundDb - 8], 'bound'),
      label('protected', [495, boundDb + protectionDb + 3], `bound + ${protectionDb} dB`, 'end'),
      label('protected', [topHz - 6, -90], 'clear to', 'end'),
    ],
  };
}

export function floorFigure(): HelpFigure {
  const noiseDb = -46;
  const value = (hz: number): number => sumDb(filtered(hz), noiseDb);
  return {
    ...frame,
    title: 'A flat floor caps the claim',
    description: `The upper half of the band is a flat floor. The signal stands only ${Math.round(value(0) - value(halfHz))} dB above it, so ${protectionDb} dB of protection cannot be shown anywhere, whether the floor is noise or folded noise.`,
    shapes: [
      line('signal', across(value)),
      level('caution', value(halfHz)),
      level('protected', value(halfHz) + protectionDb),
      label('caution', [495, value(halfHz) - 9], 'floor', 'end'),
      label('protected', [495, value(halfHz) + protectionDb - 9], `floor + ${protectionDb} dB`, 'end'),
    ],
  };
}

export function overSampledFigure(): HelpFigure {
  const slow = { ...filter, order: 10, cornerHz: 70 } satisfies AntiAliasFilter;
  const value = (hz: number): number => sumDb(sourceDb(hz) + 10 * Math.log10(magnitudeSquared(slow, hz) ?? 1), floorDb);
  const topHz = across(value).findLast(([, atDb]) => atDb > value(0) - 60)?.[0] ?? 0;
  return {
    ...frame,
    title: 'All the signal lies low',
    description: `Above ${Math.round(topHz)} Hz the density stays 60 dB below its highest value, far below fs/2 = ${halfHz} Hz. A lower rate would hold all of it.`,
    shapes: [
      line('signal', across(value)),
      tone('protected', topHz, -10, bottomDb, true),
      label('protected', [topHz + 6, -16], 'true bandwidth'),
    ],
  };
}

export function resonanceFigure(): HelpFigure {
  const boundDb = filtered(halfHz);
  const trueHz = 590;
  const landsHz = aliasHz(trueHz, rateHz);
  return {
    ...frame,
    xLabel: 'frequency, Hz',
    xRange: [0, rateHz],
    title: 'A folded line above the bound',
    description: `The band edge allows no more than the dashed bound, yet a resonance at ${trueHz} Hz folds to ${landsHz} Hz well above it: beyond fs/2 the source is not lower than next to it, so the bound does not hold.`,
    shapes: [
      line('signal', across(filtered)),
      level('caution', boundDb),
      tone('quiet', trueHz, -34, bottomDb, true),
      tone('folded', landsHz, -36, boundDb),
      { shape: 'arrow', role: 'folded', from: [trueHz, -32], to: [landsHz + 8, -32] },
      label('caution', [8, boundDb - 8], 'bound'),
      label('quiet', [trueHz + 8, -40], 'resonance'),
    ],
  };
}

export function foldedShareFigure(): HelpFigure {
  const beyond = curve(halfHz, rateHz, 60, sourceDb);
  const folded = curve(0, halfHz, 60, (hz) => sourceDb(rateHz - hz) - 8);
  return {
    ...frame,
    xLabel: 'frequency, Hz',
    xRange: [0, rateHz],
    title: 'Predicted from the faster companion',
    description:
      'The faster companion shows what the source does beyond fs/2 = 500 Hz. Folded to the slower rate, it predicts the filled share of the slow capture’s density.',
    shapes: [
      line('signal', across(unfiltered)),
      line('quiet', beyond, true),
      { shape: 'area', role: 'folded', points: [[0, bottomDb], ...folded, [halfHz, bottomDb]] },
      label('quiet', [560, -12], 'companion only'),
      label('folded', [250, -64], 'folded share', 'middle'),
      { shape: 'arrow', role: 'folded', from: [700, -45], to: [510, -45] },
    ],
  };
}
