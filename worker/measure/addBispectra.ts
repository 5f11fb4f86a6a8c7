import { bispectralTest } from '../dsp/bispectralTest.js';
import { bispectrumCells, bispectrumLength, BispectrumMeter } from '../dsp/BispectrumMeter.js';
import { stationarityTest } from '../dsp/stationarityTest.js';
import type { BispectrumMeasurement } from '../../shared/screening/MeasurementRecord.js';
import type { SampleSource } from '../readers/SampleSource.js';
import type { ChannelParts } from './buildMeasurement.js';
import { holdLastFinite } from './IntegrityMeter.js';
import type { Pass } from './Pass.js';

const leastBlocks = 128;
const mostBlocks = 1024;
const mostChannels = 8;
/** Bits of amplitude below which rounding itself fills the outer triangle. */
const leastStepsPerDeviation = 8;
const largestToneShare = 0.05;
/** Kurtosis of a skewed but steady noise stays below this; impacts and speech lie above. */
const largestKurtosis = 12;

/**
 * The bispectral test of section "supporting evidence": only on captures that are neither clipped, coarse, tonal nor
 * transient, because those fill the outer triangle without any folding. Uses the first 131 072 samples at most.
 */
export function addBispectra(source: SampleSource, parts: ChannelParts[], pass: Pass): void {
  const blocks = Math.min(mostBlocks, Math.floor(source.frameCount / bispectrumLength));
  const reasons = parts.map((part, channel) =>
    channel >= mostChannels ? 'moreChannels' : reasonAgainst(part, blocks),
  );
  const meters = reasons.map((reason) => (reason === null ? new BispectrumMeter(blocks) : null));
  if (meters.some((meter) => meter !== null)) {
    pass(2, (channels, frames, first) => {
      if (first >= blocks * bispectrumLength) return;
      meters.forEach((meter, c) => meter?.push(holdLastFinite(channels[c] as Float64Array, frames), frames));
    });
  }
  parts.forEach((part, channel) => {
    const meter = meters[channel];
    part.bispectrum = meter ? measure(meter) : notRun(reasons[channel] ?? 'moreChannels');
  });
}

const notRun = (reason: NonNullable<BispectrumMeasurement['notRun']>): BispectrumMeasurement => ({
  notRun: reason,
  blocks: 0,
  outer: null,
  inner: null,
  stationaryChance: null,
});

function reasonAgainst(part: ChannelParts, blocks: number): BispectrumMeasurement['notRun'] {
  const { level, quantum, clippedCount, dropoutCount, notFiniteCount } = part.integrity;
  if (level === null || part.spectra === null || blocks < leastBlocks) return 'tooShort';
  if (clippedCount > 0 || dropoutCount > 0 || notFiniteCount > 0) return 'damaged';
  if (quantum !== null && level.rms < leastStepsPerDeviation * quantum) return 'coarse';
  if (level.kurtosis > largestKurtosis) return 'transient';
  const tonal = part.tones.reduce((sum, tone) => sum + 10 ** (tone.levelDb / 10), 0);
  return tonal > largestToneShare * 10 ** (level.powerDb / 10) ? 'tonal' : null;
}

function measure(meter: BispectrumMeter): BispectrumMeasurement {
  const test = (triangle: 'inner' | 'outer') =>
    bispectralTest(meter.spectra, meter.blocks, bispectrumCells(triangle), triangle);
  return {
    notRun: null,
    blocks: meter.blocks,
    outer: test('outer'),
    inner: test('inner'),
    stationaryChance: stationarityTest(meter.spectra, meter.blocks),
  };
}
