import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import type { IrregularMeasurement, ToneMeasurement } from '../../shared/screening/MeasurementRecord.js';
import { ToneDemodulator } from '../dsp/ToneDemodulator.js';
import type { SampleSource } from '../readers/SampleSource.js';
import { buildMeasurement, type ChannelParts } from './buildMeasurement.js';
import type { ChannelMeasurement } from './ChannelMeasurement.js';
import { type FrameSpan, holdLastFinite, IntegrityMeter } from './IntegrityMeter.js';
import { measureIrregular } from './measureIrregular.js';
import { measureTones } from './measureTones.js';
import { pickTones } from './pickTones.js';
import { leastSamples, planSegments } from './planSegments.js';
import { SpectrumMeter } from './SpectrumMeter.js';

export interface MeasureOptions {
  onProgress?: (share: number) => void;
  signal?: AbortSignal;
}

/** Frames refined by least squares: a longer stretch gains nothing on real sources, whose speed wanders. */
const mostRefinedFrames = 2 ** 21;
const blockFrames = 16_384;

/**
 * Measures every channel of a capture in three passes over the source: integrity, spectra (without the damaged stretches),
 * tones. Channels share each read; memory depends on the number of channels, not on the length. No threshold enters.
 * @throws whatever the source throws, and the signal's reason when aborted
 */
export function measureCapture(
  source: SampleSource,
  sheet: AcquisitionSheet,
  options: MeasureOptions = {},
): ChannelMeasurement[] {
  const pass = createPasses(source, options);
  const integrity = Array.from({ length: source.channelCount }, () => new IntegrityMeter());
  pass(0, (channels, frames, first) =>
    integrity.forEach((meter, c) => meter.push(channels[c] as Float64Array, frames, first)),
  );
  const parts: ChannelParts[] = integrity.map((meter) => ({
    integrity: meter.result(),
    spectra: null,
    tones: [],
    irregular: null,
  }));
  const rateHz = source.sampleRateHz;
  const isIrregular = source.timeStamps?.irregular === true;
  if (rateHz !== null && source.frameCount >= leastSamples) {
    if (isIrregular) addIrregular(source, sheet, parts, pass);
    else addSpectra(source, rateHz, parts, pass);
  }
  options.onProgress?.(1);
  return parts.map((part, channel) => buildMeasurement(source, part, channel));
}

type OnBlock = (channels: Float64Array[], frames: number, firstFrame: number) => void;
type Pass = (index: number, onBlock: OnBlock) => void;

function createPasses(source: SampleSource, { onProgress, signal }: MeasureOptions): Pass {
  return (index, onBlock) => {
    source.readBlocks(
      (channels, frames, firstFrame) => {
        signal?.throwIfAborted();
        onBlock(channels, frames, firstFrame);
        onProgress?.((index + (firstFrame + frames) / Math.max(1, source.frameCount)) / 3);
      },
      signal === undefined ? { blockFrames } : { blockFrames, signal },
    );
  };
}

function addSpectra(source: SampleSource, rateHz: number, parts: ChannelParts[], pass: Pass): void {
  const plan = planSegments(source.frameCount, source.channelCount);
  const meters = parts.map((part) => {
    const damage = avoidedSpans(source, rateHz, part);
    return new SpectrumMeter(plan, rateHz, damage);
  });
  pass(1, (channels, frames) =>
    meters.forEach((meter, c) => meter.push(holdLastFinite(channels[c] as Float64Array, frames), frames)),
  );
  const usedFrames = Math.min(source.frameCount, mostRefinedFrames);
  const blocks = 64;
  const demodulators = meters.map((meter, c) => {
    (parts[c] as ChannelParts).spectra = meter;
    const picked = pickTones(meter);
    const omegas = picked.map((tone) => (2 * Math.PI * tone.frequencyHz) / rateHz);
    return { picked, demodulator: new ToneDemodulator(omegas, blocks, Math.floor(usedFrames / blocks)) };
  });
  if (demodulators.some(({ picked }) => picked.length > 0)) {
    pass(2, (channels, frames, first) => {
      if (first >= usedFrames) return;
      demodulators.forEach(({ demodulator }, c) => {
        const mean = parts[c]?.integrity.level?.mean ?? 0;
        demodulator.push(holdLastFinite(channels[c] as Float64Array, frames), frames, first, mean);
      });
    });
  }
  demodulators.forEach(({ picked, demodulator }, c) => {
    const fineHz = (meters[c] as SpectrumMeter).fine.resolutionHz;
    const tones: ToneMeasurement[] = measureTones(picked, demodulator, rateHz, fineHz);
    (parts[c] as ChannelParts).tones = tones;
  });
}

/**
 * Stretches that spectra leave out: dropouts, values that are no numbers, gaps, and clipping; as long as half of
 * the capture remains, otherwise nothing is left out and the damage is only reported.
 */
function avoidedSpans(source: SampleSource, rateHz: number, { integrity }: ChannelParts): FrameSpan[] {
  const gaps = (source.timeStamps?.gaps ?? []).map(({ fromS, toS }) => ({
    first: Math.floor(fromS * rateHz),
    last: Math.ceil(toS * rateHz),
  }));
  const spans = [...integrity.dropouts, ...integrity.notFiniteSpans, ...integrity.clippedStretches, ...gaps];
  const share = spans.reduce((sum, span) => sum + span.last - span.first + 1, 0) / Math.max(1, source.frameCount);
  return share > 0.4 ? [] : spans;
}

function addIrregular(source: SampleSource, sheet: AcquisitionSheet, parts: ChannelParts[], pass: Pass): void {
  const timesS = source.timeStamps?.timesS;
  if (timesS === undefined) return;
  const values = parts.map(() => new Float64Array(source.frameCount));
  pass(1, (channels, frames, first) =>
    values.forEach((target, c) => target.set(holdLastFinite(channels[c] as Float64Array, frames), first)),
  );
  parts.forEach((part, c) => {
    const measured: IrregularMeasurement = measureIrregular(timesS, values[c] as Float64Array, {
      roundingStepS: source.timeStamps?.roundingStepS ?? 0,
      sensorBandHz: sheet.sensorBandHz ?? null,
    });
    part.irregular = measured;
  });
}
