import { holdLastFinite } from '../measure/IntegrityMeter.js';
import type { SampleSource } from '../readers/SampleSource.js';

/** Frames of one capture held in memory at most, and values over all its channels. */
const mostFrames = 2 ** 20;
const mostValues = 2 ** 22;

/** The first frames of every channel with the mean taken out; `isWhole` says whether that is the whole capture. */
export interface Excerpt {
  rateHz: number;
  channels: Float64Array[];
  isWhole: boolean;
}

/** Holds a capture, or as much of its beginning as fits, in memory: two captures are compared sample by sample. */
export function readExcerpt(source: SampleSource, rateHz: number, signal?: AbortSignal): Excerpt {
  const frames = Math.min(source.frameCount, mostFrames, Math.floor(mostValues / Math.max(1, source.channelCount)));
  const channels = Array.from({ length: source.channelCount }, () => new Float64Array(frames));
  source.readBlocks(
    (blocks, count, firstFrame) => {
      signal?.throwIfAborted();
      const used = Math.min(count, frames - firstFrame);
      if (used <= 0) return;
      channels.forEach((channel, c) =>
        channel.set(holdLastFinite(blocks[c] as Float64Array, count).subarray(0, used), firstFrame),
      );
    },
    signal === undefined ? {} : { signal },
  );
  for (const channel of channels) {
    const mean = channel.reduce((sum, value) => sum + value, 0) / Math.max(1, channel.length);
    for (let n = 0; n < channel.length; n++) channel[n] = (channel[n] as number) - mean;
  }
  return { rateHz, channels, isWhole: frames === source.frameCount };
}
