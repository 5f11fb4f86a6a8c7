import type { WavHeader } from '../../shared/formats/wavHeader.js';

/** Writes `frames` frames of interleaved bytes into one array a channel. */
export type SampleDecoder = (bytes: Buffer, channels: Float64Array[], frames: number) => void;

type SampleReader = (bytes: Buffer, offset: number) => number;

/** Raw number of one sample; integers as they are, 8-bit about its middle. */
function sampleReader({ encoding, bitsPerSample, isBigEndian }: WavHeader): SampleReader {
  if (encoding === 'float') {
    if (bitsPerSample === 64) return isBigEndian ? (b, o) => b.readDoubleBE(o) : (b, o) => b.readDoubleLE(o);
    return isBigEndian ? (b, o) => b.readFloatBE(o) : (b, o) => b.readFloatLE(o);
  }
  if (bitsPerSample === 8) return (b, o) => (b[o] ?? 0) - 128;
  const bytesPerSample = bitsPerSample / 8;
  return isBigEndian ? (b, o) => b.readIntBE(o, bytesPerSample) : (b, o) => b.readIntLE(o, bytesPerSample);
}

/** 16-bit little-endian, the commonest kind by far, read through a typed view instead of a call per sample. */
function decodeInt16(channelCount: number, factor: number): SampleDecoder {
  return (bytes, channels, frames) => {
    const values = new Int16Array(bytes.buffer, bytes.byteOffset, frames * channelCount);
    for (const [index, channel] of channels.entries()) {
      for (let frame = 0, at = index; frame < frames; frame += 1, at += channelCount) {
        channel[frame] = (values[at] ?? 0) * factor;
      }
    }
  };
}

/**
 * Decoder for one header. Integers are scaled by 2^(1 − bits of the container), so that full scale is ±1; floating point
 * is taken as written; then `scale` (units per full scale) applies.
 */
export function createSampleDecoder(header: WavHeader, scale: number): SampleDecoder {
  const { encoding, bitsPerSample, channelCount, isBigEndian } = header;
  const factor = encoding === 'float' ? scale : scale * 2 ** (1 - bitsPerSample);
  if (encoding === 'integer' && bitsPerSample === 16 && !isBigEndian) return decodeInt16(channelCount, factor);
  const read = sampleReader(header);
  const bytesPerSample = bitsPerSample / 8;
  return (bytes, channels, frames) => {
    let offset = 0;
    for (let frame = 0; frame < frames; frame += 1) {
      for (const channel of channels) {
        channel[frame] = read(bytes, offset) * factor;
        offset += bytesPerSample;
      }
    }
  };
}
