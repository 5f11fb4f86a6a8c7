import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import { type ChannelSpeed, speedFromChannel } from '../dsp/warp/speedFromChannel.js';
import type { SampleSource } from '../readers/SampleSource.js';
import type { ChannelParts } from './buildMeasurement.js';
import { holdLastFinite } from './IntegrityMeter.js';
import { leastOrderSamples, measureOrders } from './measureOrders.js';
import type { Pass } from './Pass.js';

/** Frames of one stretch: a longer one gains little on real sources, and costs time and memory. */
const mostStretchFrames = 2 ** 16;
const mostStretches = 2;
/** Frames kept in memory over all channels at a time; channels beyond are not looked at. */
const mostFramesKept = 2 ** 21;
/** Orders are looked for up to this multiple of the rate, or the sensor's band. */
const highestRates = 1.5;

interface Stretch {
  first: number;
  frames: number;
}

/** Up to two stretches, one at each end of the capture; all of it where it is short enough. */
function planStretches(frameCount: number): Stretch[] {
  if (frameCount < leastOrderSamples) return [];
  const count = Math.min(mostStretches, Math.ceil(frameCount / mostStretchFrames));
  const frames = Math.min(mostStretchFrames, Math.floor(frameCount / count));
  return Array.from({ length: count }, (_, index) => ({
    first: count === 1 ? 0 : Math.floor((index * (frameCount - frames)) / (count - 1)),
    frames,
  }));
}

/** Reads stretches of every channel and measures the orders in them. */
export function addOrders(
  source: SampleSource,
  sheet: AcquisitionSheet,
  rateHz: number,
  parts: ChannelParts[],
  pass: Pass,
): void {
  const stretches = planStretches(source.frameCount);
  if (stretches.length === 0) return;
  const perChannel = stretches.reduce((sum, { frames }) => sum + frames, 0);
  const channels = parts.slice(0, Math.max(1, Math.floor(mostFramesKept / perChannel)));
  const kept = channels.map(() => stretches.map(({ frames }) => new Float64Array(frames)));
  pass(2, (blocks, frames, first) => {
    stretches.forEach((stretch, index) => {
      const from = Math.max(first, stretch.first);
      const to = Math.min(first + frames, stretch.first + stretch.frames);
      if (from >= to) return;
      kept.forEach((buffers, c) => {
        const held = holdLastFinite(blocks[c] as Float64Array, frames);
        buffers[index]?.set(held.subarray(from - first, to - first), from - stretch.first);
      });
    });
  });
  const highestHz = Math.min(sheet.sensorBandHz ?? Infinity, highestRates * rateHz);
  if (highestHz <= rateHz / 2) return;
  channels.forEach((part) => (part.orders = []));
  stretches.forEach(({ first }, index) => {
    const samples = kept.map((buffers) => buffers[index] as Float64Array);
    const { speed, channel } = findSpeed(samples, source.channelNames);
    samples.forEach((values, c) => {
      if (c === channel) return;
      const orders = measureOrders(values, { sampleRateHz: rateHz, highestHz, fromS: first / rateHz, speed });
      if (orders !== null) channels[c]?.orders?.push(orders);
    });
  });
}

/** The first channel that holds a speed; a capture of one channel has none to spare. */
function findSpeed(samples: Float64Array[], names: string[]): { speed: ChannelSpeed | null; channel: number } {
  if (samples.length > 1) {
    for (const [channel, values] of samples.entries()) {
      const speed = speedFromChannel(values, names[channel] ?? '');
      if (speed !== null) return { speed, channel };
    }
  }
  return { speed: null, channel: -1 };
}
