import { closeSync, fstatSync, openSync, readSync } from 'node:fs';
import { parseWavHeader, type WavHeader } from '../../shared/formats/wavHeader.js';
import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import { createSampleDecoder, type SampleDecoder } from './createSampleDecoder.js';
import type { BlockVisitor, ReadOptions, SampleSource } from './SampleSource.js';

const defaultBlockFrames = 65_536;

/** A WAV file read in blocks with readSync into one buffer: nothing is allocated per block. */
export class WavSource implements SampleSource {
  readonly format = 'wav';
  readonly timeStamps = null;
  readonly channelCount: number;
  readonly channelNames: string[];
  readonly units: string[];
  readonly sampleRateHz: number;
  readonly headerRateHz: number;
  readonly frameCount: number;
  readonly bitsPerSample: number | null;
  readonly warnings: { code: string; message: string }[];
  private readonly descriptor: number;
  private readonly header: WavHeader;
  private readonly decode: SampleDecoder;

  /** @throws CaptureError */
  constructor(filePath: string, sheet: AcquisitionSheet) {
    this.descriptor = openSync(filePath, 'r');
    try {
      this.header = parseWavHeader((offset, length) => this.readAt(offset, length), fstatSync(this.descriptor).size);
    } catch (error) {
      this.close();
      throw error;
    }
    const { channelCount, sampleRateHz, frameCount, encoding, validBits, warnings } = this.header;
    this.channelCount = channelCount;
    this.channelNames = Array.from({ length: channelCount }, () => '');
    this.units = Array.from({ length: channelCount }, () => sheet.unit ?? '');
    this.sampleRateHz = sheet.sampleRateHz ?? sampleRateHz;
    this.headerRateHz = sampleRateHz;
    this.frameCount = frameCount;
    this.bitsPerSample = encoding === 'integer' ? validBits : null;
    this.warnings = warnings;
    this.decode = createSampleDecoder(this.header, sheet.scale ?? 1);
  }

  readBlocks(onBlock: BlockVisitor, { blockFrames = defaultBlockFrames, signal }: ReadOptions = {}): void {
    const { channelCount, bitsPerSample, dataOffset } = this.header;
    const frameBytes = (bitsPerSample / 8) * channelCount;
    const bytes = Buffer.from(new ArrayBuffer(Math.min(blockFrames, this.frameCount) * frameBytes));
    const channels = Array.from({ length: channelCount }, () => new Float64Array(blockFrames));
    for (let frame = 0; frame < this.frameCount; frame += blockFrames) {
      signal?.throwIfAborted();
      const frames = Math.min(blockFrames, this.frameCount - frame);
      this.fill(bytes.subarray(0, frames * frameBytes), dataOffset + frame * frameBytes);
      this.decode(bytes, channels, frames);
      const views = frames === blockFrames ? channels : channels.map((channel) => channel.subarray(0, frames));
      onBlock(views, frames, frame);
    }
  }

  close(): void {
    closeSync(this.descriptor);
  }

  private readAt(offset: number, length: number): Uint8Array {
    const bytes = new Uint8Array(length);
    return bytes.subarray(0, readSync(this.descriptor, bytes, 0, length, offset));
  }

  private fill(target: Buffer, position: number): void {
    let filled = 0;
    while (filled < target.length) {
      const read = readSync(this.descriptor, target, filled, target.length - filled, position + filled);
      if (read === 0) throw new Error('The file became shorter while it was being read.');
      filled += read;
    }
  }
}
