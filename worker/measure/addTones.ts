import type { RefinedTone } from '../dsp/RefinedTone.js';
import { refineTones } from '../dsp/refineTones.js';
import { type PlainTone, subtractTones } from '../dsp/subtractTones.js';
import { ToneDemodulator } from '../dsp/ToneDemodulator.js';
import type { SampleSource } from '../readers/SampleSource.js';
import type { ChannelParts } from './buildMeasurement.js';
import { holdLastFinite } from './IntegrityMeter.js';
import { measureTones } from './measureTones.js';
import type { Pass } from './Pass.js';
import { pickCloseTones } from './pickCloseTones.js';
import { type PickedTone, pickTones } from './pickTones.js';
import type { SpectrumMeter } from './SpectrumMeter.js';

/** Frames refined by least squares: a longer stretch gains nothing on real sources, whose speed wanders. */
const mostRefinedFrames = 2 ** 21;
/** The residual of a whole channel is held in memory up to this length, and for this many channels. */
const mostResidualFrames = 2 ** 18;
const mostResidualChannels = 8;
const blocks = 64;

interface ToneWork {
  picked: PickedTone[];
  demodulator: ToneDemodulator;
  refined: RefinedTone[];
}

/** Picks tones from the fine spectra, refines them over the whole capture, looks for close neighbours and refines again. */
export function addTones(
  source: SampleSource,
  rateHz: number,
  parts: ChannelParts[],
  meters: SpectrumMeter[],
  pass: Pass,
): void {
  const usedFrames = Math.min(source.frameCount, mostRefinedFrames);
  const blockFrames = Math.floor(usedFrames / blocks);
  const fineHz = meters[0]?.fine.resolutionHz ?? 0;
  const refine = (lists: PickedTone[][]): ToneWork[] => {
    const work = lists.map((picked) => {
      const omegas = picked.map(({ frequencyHz }) => (2 * Math.PI * frequencyHz) / rateHz);
      return { picked, demodulator: new ToneDemodulator(omegas, blocks, blockFrames), refined: [] as RefinedTone[] };
    });
    if (lists.every((picked) => picked.length === 0)) return work;
    pass(2, (channels, frames, first) => {
      if (first >= usedFrames) return;
      work.forEach(({ demodulator }, c) => {
        const mean = parts[c]?.integrity.level?.mean ?? 0;
        demodulator.push(holdLastFinite(channels[c] as Float64Array, frames), frames, first, mean);
      });
    });
    for (const one of work) one.refined = refineTones(one.demodulator, (2 * Math.PI * fineHz) / rateHz);
    return work;
  };
  let work = refine(meters.map(pickTones));
  const fits = source.frameCount <= mostResidualFrames && source.channelCount <= mostResidualChannels;
  if (fits && work.some(({ picked }) => picked.length > 0)) {
    const close = pickFromResiduals(source, rateHz, fineHz, parts, work, pass);
    if (close.some((found) => found.length > 0)) {
      work = refine(work.map(({ picked }, c) => [...picked, ...(close[c] ?? [])]));
    }
  }
  work.forEach(({ picked, refined, demodulator }, c) => {
    (parts[c] as ChannelParts).tones = measureTones(picked, refined, demodulator, rateHz, fineHz);
  });
}

function pickFromResiduals(
  source: SampleSource,
  rateHz: number,
  fineHz: number,
  parts: ChannelParts[],
  work: ToneWork[],
  pass: Pass,
): PickedTone[][] {
  const residuals = work.map(() => new Float64Array(source.frameCount));
  const models = work.map(({ demodulator, refined }) =>
    refined.map(({ delta, amplitude, decay }, index): PlainTone => ({
      omega: (demodulator.omegas[index] as number) + delta,
      amplitude,
      decay,
    })),
  );
  pass(2, (channels, frames, first) => {
    residuals.forEach((residual, c) => {
      const mean = parts[c]?.integrity.level?.mean ?? 0;
      const block = holdLastFinite(channels[c] as Float64Array, frames).map((value) => value - mean);
      const { demodulator } = work[c] as ToneWork;
      subtractTones(block, first, demodulator.origin, models[c] as PlainTone[]);
      residual.set(block, first);
    });
  });
  return work.map(({ picked, demodulator, refined }, c) => {
    const known = picked.map((tone, index) => {
      const omega = (demodulator.omegas[index] as number) + (refined[index]?.delta ?? 0);
      return { ...tone, frequencyHz: (omega * rateHz) / (2 * Math.PI) };
    });
    return pickCloseTones(residuals[c] as Float64Array, known, rateHz, fineHz);
  });
}
