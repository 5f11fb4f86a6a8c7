export interface TimeStampReport {
  irregular: boolean;
  /** Standard deviation of the stamps about the uniform grid, over the sampling interval. */
  jitterShare: number;
  /** Missing rows over the rows that a gapless grid would have. */
  missingShare: number;
  gaps: { fromS: number; toS: number }[];
  repeatedCount: number;
  /** The stamps' smallest step of writing, in seconds; 0 where none shows. */
  roundingStepS: number;
  /** All stamps in seconds from the first; only where they are irregular. */
  timesS?: Float64Array;
}

export interface ReadOptions {
  /** Frames a block; results must not depend on it. */
  blockFrames?: number;
  signal?: AbortSignal;
}

/** channels[c] is a view of `frames` values, valid only during the call. */
export type BlockVisitor = (channels: Float64Array[], frames: number, firstFrame: number) => void;

/** A capture's file opened for reading: what it says of itself, and its samples as a stream of blocks. */
export interface SampleSource {
  readonly format: 'wav' | 'csv';
  readonly channelCount: number;
  /** Empty where unnamed. */
  readonly channelNames: string[];
  /** Empty: full scale. */
  readonly units: string[];
  /** Uniform or mean rate after sheet, header and stamps; null: unknown. */
  readonly sampleRateHz: number | null;
  /** What the file itself says, before the sheet. */
  readonly headerRateHz: number | null;
  readonly frameCount: number;
  /** Null for WAV and for CSV without a time column. */
  readonly timeStamps: TimeStampReport | null;
  /** Nominal bits a sample; null for CSV and floating point. */
  readonly bitsPerSample: number | null;
  readonly warnings: { code: string; message: string }[];
  /**
   * Streams the file once, in order; may be called again. Synchronous: screening runs in a thread of its own.
   * @throws CaptureError where the content turns out to be unreadable
   */
  readBlocks(onBlock: BlockVisitor, options?: ReadOptions): void;
  close(): void;
}
