import type { SampleSource } from '../../worker/readers/SampleSource.js';

/** A capture held in memory, for tests of the engine: one array a channel. */
export function memorySource(
  channels: Float64Array[],
  sampleRateHz: number | null,
  overrides: Partial<SampleSource> = {},
): SampleSource {
  const frameCount = channels[0]?.length ?? 0;
  return {
    format: 'wav',
    channelCount: channels.length,
    channelNames: channels.map(() => ''),
    units: channels.map(() => ''),
    sampleRateHz,
    headerRateHz: sampleRateHz,
    frameCount,
    timeStamps: null,
    bitsPerSample: null,
    warnings: [],
    readBlocks(onBlock, options = {}) {
      const blockFrames = options.blockFrames ?? 4096;
      for (let first = 0; first < frameCount; first += blockFrames) {
        options.signal?.throwIfAborted();
        const frames = Math.min(blockFrames, frameCount - first);
        onBlock(
          channels.map((samples) => samples.subarray(first, first + frames)),
          frames,
          first,
        );
      }
    },
    close() {
      return undefined;
    },
    ...overrides,
  };
}
