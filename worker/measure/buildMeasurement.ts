import type {
  BispectrumMeasurement,
  IntegrityMeasurement,
  IrregularMeasurement,
  MeasurementObstacle,
  SpanS,
  TimeStampMeasurement,
  ToneMeasurement,
} from '../../shared/screening/MeasurementRecord.js';
import type { OrderMeasurement } from '../../shared/screening/OrderMeasurement.js';
import { decibels } from '../dsp/decibels.js';
import type { RaisedRate } from '../dsp/RaisedRateMeter.js';
import { removeTones } from '../dsp/removeTones.js';
import type { SampleSource } from '../readers/SampleSource.js';
import type { ChannelMeasurement, MeasuredSpectrum } from './ChannelMeasurement.js';
import type { FrameSpan, IntegrityResult } from './IntegrityMeter.js';
import { measureEdge } from './measureEdge.js';
import { measureProfile } from './measureProfile.js';
import { leastSamples } from './planSegments.js';
import type { SpectrumMeter } from './SpectrumMeter.js';

export interface ChannelParts {
  integrity: IntegrityResult;
  spectra: SpectrumMeter | null;
  tones: ToneMeasurement[];
  irregular: IrregularMeasurement | null;
  raised: RaisedRate | null;
  orders: OrderMeasurement[] | null;
  bispectrum: BispectrumMeasurement | null;
  damageLeftOut: boolean;
}

const mostSpans = 16;
/** A line stands this far (linear) over the survey's running median. */
const surveyLineRatio = 5;

/** Puts the parts of one channel together as a record of plain numbers. */
export function buildMeasurement(source: SampleSource, parts: ChannelParts, channel: number): ChannelMeasurement {
  const { integrity, spectra } = parts;
  const rateHz = source.sampleRateHz;
  const isSilent = integrity.level !== null && !(integrity.level.rms > 1e-12 * Math.abs(integrity.level.mean) + 1e-30);
  const hasSpectra = spectra !== null && !isSilent && spectra.survey.segments >= 4;
  const mean = hasSpectra ? spectra.surveySum.map((value) => value / spectra.survey.segments) : null;
  const toneless = mean === null ? null : removeTones(mean, surveyLineRatio);
  const median = hasSpectra ? spectra.kept.median() : null;
  const obstacles: MeasurementObstacle[] = [];
  if (rateHz === null) obstacles.push('rateUnknown');
  if (integrity.samples < leastSamples) obstacles.push('tooFewSamples');
  if (integrity.level === null) obstacles.push('notFinite');
  if (isSilent) obstacles.push('silent');
  if (source.timeStamps?.irregular === true) obstacles.push('irregularStamps');
  const spectraKept: MeasuredSpectrum[] = [];
  if (hasSpectra && mean !== null && median !== null) {
    const { survey, fine, fineSum } = spectra;
    spectraKept.push({
      kind: 'survey',
      resolutionHz: survey.resolutionHz,
      segments: survey.segments,
      densityMean: Float32Array.from(mean),
      densityMedian: Float32Array.from(median),
    });
    if (fine.segments > 0) {
      spectraKept.push({
        kind: 'fine',
        resolutionHz: fine.resolutionHz,
        segments: fine.segments,
        densityMean: Float32Array.from(fineSum, (value) => value / fine.segments),
        densityMedian: null,
      });
    }
  }
  return {
    record: {
      version: 1,
      channel,
      channelName: source.channelNames[channel] ?? '',
      unit: source.units[channel] ?? '',
      format: source.format,
      sampleRateHz: rateHz,
      headerRateHz: source.headerRateHz,
      samples: integrity.samples,
      durationS: rateHz === null ? null : integrity.samples / rateHz,
      obstacles,
      warnings: source.warnings.map(({ code, message }) => ({ code, message })),
      level: integrity.level,
      integrity: measureIntegrity(source, integrity),
      timeStamps: measureTimeStamps(source),
      profile:
        toneless === null || median === null || spectra === null ? null : measureProfile(spectra, toneless, median),
      edge:
        toneless === null || mean === null || spectra === null
          ? null
          : measureEdge(spectra, mean, toneless, parts.raised),
      damageLeftOut: parts.damageLeftOut,
      tones: hasSpectra ? parts.tones : [],
      irregular: isSilent ? null : parts.irregular,
      companion: null,
      orders: hasSpectra ? parts.orders : null,
      bispectrum: parts.bispectrum,
    },
    spectra: spectraKept,
  };
}

const frameCount = (spans: FrameSpan[]): number => spans.reduce((sum, { first, last }) => sum + last - first + 1, 0);

function measureIntegrity(source: SampleSource, result: IntegrityResult): IntegrityMeasurement {
  const rateHz = source.sampleRateHz;
  // Without a rate frames have no time.
  const toSpans = (spans: FrameSpan[]): SpanS[] =>
    (rateHz === null ? [] : [...spans])
      .sort((a, b) => b.last - b.first - (a.last - a.first) || a.first - b.first)
      .slice(0, mostSpans)
      .map(({ first, last }) => ({ fromS: first / (rateHz ?? 1), toS: (last + 1) / (rateHz ?? 1) }));
  const { level, quantum, samples } = result;
  const range = level === null ? 0 : level.maximum - level.minimum;
  const peak = level === null ? 0 : Math.max(Math.abs(level.maximum), Math.abs(level.minimum));
  const steps = quantum === null || level === null ? null : level.rms / quantum;
  const missing = result.notFiniteCount + result.dropoutCount;
  return {
    notFiniteCount: result.notFiniteCount,
    clippedCount: result.clippedCount,
    clippedShare: samples === 0 ? 0 : result.clippedCount / samples,
    clippedRuns: result.clippedRuns,
    clippedSpans: toSpans(result.clippedSpans),
    clipsBelowFullScale:
      result.clippedAt.some((value) => Math.abs(value) < 0.99 * peak) || (source.format === 'wav' && peak < 0.98),
    missingShare: samples === 0 ? 0 : Math.max(missing / samples, source.timeStamps?.missingShare ?? 0),
    dropoutCount: result.dropouts.length,
    dropouts: toSpans(result.dropouts),
    pauses: toSpans(result.pauses),
    pauseCount: result.pauses.length,
    pauseShare: samples === 0 ? 0 : frameCount(result.pauses) / samples,
    offsetShare: level === null || peak === 0 ? 0 : Math.abs(level.mean) / peak,
    quantum,
    usedBits: quantum === null || range === 0 ? null : Math.log2(range / quantum + 1),
    nominalBits: source.bitsPerSample,
    stepsPerDeviation: steps,
    // Bennett's formula needs a signal that moves over many steps.
    quantisationFloorDb:
      rateHz !== null && quantum !== null && steps !== null && steps > 2
        ? decibels((quantum * quantum) / (6 * rateHz))
        : null,
  };
}

function measureTimeStamps(source: SampleSource): TimeStampMeasurement | null {
  if (source.timeStamps === null) return null;
  const { irregular, jitterShare, missingShare, gaps, repeatedCount, roundingStepS } = source.timeStamps;
  return { irregular, jitterShare, missingShare, gaps: gaps.slice(0, mostSpans), repeatedCount, roundingStepS };
}
