import { parseWavHeader, type WavHeader } from './wavHeader.js';

export type WavDescription = Pick<
  WavHeader,
  'sampleRateHz' | 'channelCount' | 'frameCount' | 'bitsPerSample' | 'encoding'
>;

/**
 * What a WAV says of itself, from its first bytes: for showing before an upload.
 * @throws CaptureError where the header is wrong, or lies further back than `firstBytes` reach
 */
export function describeWav(firstBytes: Uint8Array, fileSizeBytes: number): WavDescription {
  return parseWavHeader((offset, length) => firstBytes.subarray(offset, offset + length), fileSizeBytes);
}
