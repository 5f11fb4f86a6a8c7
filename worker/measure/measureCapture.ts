import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import type { SampleSource } from '../readers/SampleSource.js';
import { RaisedRateMeter } from '../dsp/RaisedRateMeter.js';
import { addBispectra } from './addBispectra.js';
import { addOrders } from './addOrders.js';
import { addTones } from './addTones.js';
import { buildMeasurement, type ChannelParts } from './buildMeasurement.js';
import type { ChannelMeasurement } from './ChannelMeasurement.js';
import { type FrameSpan, holdLastFinite, IntegrityMeter } from './IntegrityMeter.js';
import { createIrregularMeter } from './measureIrregular.js';
import type { Pass } from './Pass.js';
import { leastSamples, planSegments } from './planSegments.js';
import { SpectrumMeter } from './SpectrumMeter.js';

export interface MeasureOptions {
  onProgress?: (share: number) => void;
  signal?: AbortSignal;
}

const blockFrames = 16_384;
/** Fewer survey segments than this are no spectrum. */
const leastSegments = 4;

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
    raised: null,
    orders: null,
    bispectrum: null,
    damageLeftOut: false,
  }));
  const rateHz = source.sampleRateHz;
  const isIrregular = source.timeStamps?.irregular === true;
  if (rateHz !== null && source.frameCount >= leastSamples) {
    if (isIrregular) addIrregular(source, sheet, parts, pass);
    else {
      addSpectra(source, rateHz, parts, pass);
      addOrders(source, sheet, rateHz, parts, pass);
      addBispectra(source, parts, pass);
    }
  }
  options.onProgress?.(1);
  return parts.map((part, channel) => buildMeasurement(source, part, channel));
}

function createPasses(source: SampleSource, { onProgress, signal }: MeasureOptions): Pass {
  let reached = 0;
  return (index, onBlock) => {
    source.readBlocks(
      (channels, frames, firstFrame) => {
        signal?.throwIfAborted();
        onBlock(channels, frames, firstFrame);
        reached = Math.max(reached, (index + (firstFrame + frames) / Math.max(1, source.frameCount)) / 3);
        onProgress?.(reached);
      },
      signal === undefined ? { blockFrames } : { blockFrames, signal },
    );
  };
}

function addSpectra(source: SampleSource, rateHz: number, parts: ChannelParts[], pass: Pass): void {
  const plan = planSegments(source.frameCount, source.channelCount);
  const makeMeters = (avoided: FrameSpan[][]): SpectrumMeter[] => {
    const made = avoided.map((spans) => new SpectrumMeter(plan, rateHz, spans));
    const raised = parts.map(({ integrity }) => new RaisedRateMeter(integrity.quantum, integrity.level?.rms ?? 0));
    pass(1, (channels, frames) =>
      made.forEach((meter, c) => {
        const samples = holdLastFinite(channels[c] as Float64Array, frames);
        meter.push(samples, frames);
        raised[c]?.push(samples, frames);
      }),
    );
    parts.forEach((part, c) => (part.raised = raised[c]?.result() ?? null));
    return made;
  };
  const avoided = parts.map((part) => avoidedSpans(source, rateHz, part));
  let meters = makeMeters(avoided);
  // Damage sprinkled over the whole capture leaves no segment: then it stays in, and the integrity findings say so.
  const isStarved = meters.map((meter, c) => meter.survey.segments < leastSegments && (avoided[c]?.length ?? 0) > 0);
  if (isStarved.includes(true)) meters = makeMeters(avoided.map((spans, c) => (isStarved[c] === true ? [] : spans)));
  parts.forEach((part, c) => {
    part.spectra = meters[c] ?? null;
    part.damageLeftOut = (avoided[c]?.length ?? 0) > 0 && isStarved[c] !== true;
  });
  addTones(source, rateHz, parts, meters, pass);
}

/**
 * Stretches that spectra leave out: dropouts, pauses, values that are no numbers, gaps, and clipping; as long as half of
 * the capture remains, otherwise nothing is left out and the damage is only reported.
 */
function avoidedSpans(source: SampleSource, rateHz: number, { integrity }: ChannelParts): FrameSpan[] {
  const gaps = (source.timeStamps?.gaps ?? []).map(({ fromS, toS }) => ({
    first: Math.floor(fromS * rateHz),
    last: Math.ceil(toS * rateHz),
  }));
  const spans = [
    ...integrity.dropouts,
    ...integrity.pauses,
    ...integrity.notFiniteSpans,
    ...integrity.clippedStretches,
    ...gaps,
  ];
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
  const measure = createIrregularMeter(timesS, {
    roundingStepS: source.timeStamps?.roundingStepS ?? 0,
    sensorBandHz: sheet.sensorBandHz ?? null,
  });
  parts.forEach((part, c) => (part.irregular = measure(values[c] as Float64Array)));
}
