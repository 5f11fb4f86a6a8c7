import { CaptureError } from './CaptureError.js';

export interface WavHeader {
  sampleRateHz: number;
  channelCount: number;
  encoding: 'integer' | 'float';
  /** Bits of the container: what a sample takes in the file. */
  bitsPerSample: number;
  /** Bits the header calls valid; equals `bitsPerSample` where it says nothing. */
  validBits: number;
  isBigEndian: boolean;
  dataOffset: number;
  frameCount: number;
  warnings: { code: string; message: string }[];
}

/** Reads `length` bytes at `offset`; fewer where the source ends. */
export type ReadAt = (offset: number, length: number) => Uint8Array;

const highestRateHz = 1e8;
const highestChannelCount = 64;
const unpatchedSize = 0xffff_ffff;
/** The node part of every KSDATAFORMAT_SUBTYPE_* that stands for an ordinary format tag. */
const subFormatTail = '00aa00389b71';
const formatNames: Record<number, string> = {
  0x02: 'Microsoft ADPCM',
  0x06: 'A-law',
  0x07: 'µ-law',
  0x11: 'IMA ADPCM',
  0x31: 'GSM 6.10',
  0x50: 'MPEG',
  0x55: 'MP3',
  0xff: 'AAC',
};

interface Chunk {
  id: string;
  offset: number;
  claimedBytes: number;
}

const ascii = (bytes: Uint8Array): string => String.fromCharCode(...bytes);
const viewOf = (bytes: Uint8Array): DataView => new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
const isChunkId = (id: string): boolean => /^[\x20-\x7e]{4}$/.test(id);

class ChunkWalker {
  readonly isBigEndian: boolean;
  readonly riffSize: number;
  readonly form: string;

  constructor(
    private readonly readAt: ReadAt,
    private readonly fileBytes: number,
  ) {
    if (fileBytes === 0)
      throw new CaptureError('EMPTY_FILE', 'The file is empty (0 bytes). Copy it from the logger again.');
    const head = readAt(0, 12);
    this.form = head.length >= 4 ? ascii(head.subarray(0, 4)) : '';
    const isWave = head.length === 12 && ascii(head.subarray(8, 12)) === 'WAVE';
    if (!isWave || !['RIFF', 'RIFX', 'RF64', 'BW64'].includes(this.form)) {
      throw new CaptureError(
        'NOT_WAV',
        'The file is not a WAV recording, whatever its name says. Export it as WAV or CSV.',
      );
    }
    this.isBigEndian = this.form === 'RIFX';
    this.riffSize = viewOf(head).getUint32(4, !this.isBigEndian);
  }

  chunkAt(offset: number): Chunk | null {
    if (offset + 8 > this.fileBytes) return null;
    const head = this.readAt(offset, 8);
    if (head.length < 8) return null;
    const id = ascii(head.subarray(0, 4));
    return isChunkId(id)
      ? { id, offset: offset + 8, claimedBytes: viewOf(head).getUint32(4, !this.isBigEndian) }
      : null;
  }

  /** The chunk behind this one; some writers leave out the pad byte after an odd size. */
  after({ offset, claimedBytes }: Chunk): Chunk | null {
    const end = offset + claimedBytes;
    return this.chunkAt(end + (claimedBytes % 2)) ?? (claimedBytes % 2 === 1 ? this.chunkAt(end) : null);
  }
}

interface Format {
  tag: number;
  channelCount: number;
  sampleRateHz: number;
  byteRate: number;
  blockAlign: number;
  bits: number;
  validBits: number;
}

function parseFormat(bytes: Uint8Array, claimedBytes: number, isBigEndian: boolean): Format {
  if (bytes.length < claimedBytes || bytes.length < 16) {
    throw new CaptureError(
      'TRUNCATED_HEADER',
      'The format description in the WAV header is cut off. Copy the file again.',
    );
  }
  const view = viewOf(bytes);
  const word = (offset: number): number => view.getUint16(offset, !isBigEndian);
  const format: Format = {
    tag: word(0),
    channelCount: word(2),
    sampleRateHz: view.getUint32(4, !isBigEndian),
    byteRate: view.getUint32(8, !isBigEndian),
    blockAlign: word(12),
    bits: word(14),
    validBits: word(14),
  };
  if (format.tag !== 0xfffe) return format;
  if (bytes.length < 40) {
    throw new CaptureError('TRUNCATED_HEADER', 'The extended format description in the WAV header is cut off.');
  }
  const tail = [...bytes.subarray(34, 40)].map((byte) => byte.toString(16).padStart(2, '0')).join('');
  if (tail !== subFormatTail) {
    throw new CaptureError(
      'UNSUPPORTED_ENCODING',
      'The WAV uses an unknown sub-format. Export it as plain PCM or float.',
    );
  }
  // In RIFX some writers keep the identifier's first field little-endian: the small number is the right one.
  const asBig = view.getUint32(24, false);
  const subTag = isBigEndian && asBig <= 0xffff ? asBig : view.getUint16(24, true);
  return { ...format, tag: subTag, validBits: word(18) || format.bits };
}

/** @throws CaptureError where the header contradicts itself or names something that can't be read */
function checkFormat(format: Format): { encoding: WavHeader['encoding']; bytesPerSample: number } {
  const { tag, channelCount, sampleRateHz, blockAlign, bits } = format;
  if (tag !== 1 && tag !== 3) {
    const name = formatNames[tag] ?? `format 0x${tag.toString(16)}`;
    throw new CaptureError('UNSUPPORTED_ENCODING', `The WAV is encoded as ${name}. Export it as plain PCM or float.`);
  }
  if (channelCount === 0 || channelCount > highestChannelCount) {
    throw new CaptureError(
      'BAD_CHANNELS',
      `The WAV header names ${channelCount} channels; 1 to ${highestChannelCount} can be screened. Split the file.`,
    );
  }
  if (sampleRateHz === 0 || sampleRateHz > highestRateHz) {
    throw new CaptureError(
      'BAD_RATE',
      `The WAV header names a sampling rate of ${sampleRateHz} Hz, which can't be right.`,
    );
  }
  const bytesPerSample = blockAlign / channelCount;
  if (bits === 0 || !Number.isInteger(bytesPerSample) || bytesPerSample < Math.ceil(bits / 8)) {
    throw new CaptureError(
      'INCONSISTENT_HEADER',
      `The WAV header contradicts itself: ${channelCount} channels of ${bits} bits in frames of ${blockAlign} bytes.`,
    );
  }
  const encoding = tag === 3 ? 'float' : 'integer';
  const isReadable = encoding === 'float' ? bytesPerSample === 4 || bytesPerSample === 8 : bytesPerSample <= 4;
  if (!isReadable) {
    throw new CaptureError(
      'UNSUPPORTED_ENCODING',
      `Samples of ${bytesPerSample * 8} bits (${encoding}) can't be read.`,
    );
  }
  return { encoding, bytesPerSample };
}

function sameFormat(a: Format, b: Format): boolean {
  return (Object.keys(a) as (keyof Format)[]).every((key) => a[key] === b[key]);
}

/** Size of the data chunk from the ds64 chunk of RF64 (EBU Tech 3306) or BW64 (ITU-R BS.2088). */
function readLongDataSize(bytes: Uint8Array): number {
  const view = viewOf(bytes);
  return Number(view.getBigUint64(8, true));
}

/**
 * Reads a WAV header: RIFF, RIFX, RF64 and BW64 with the chunks in any order. Sizes in the header are claims: never more
 * frames are reported than the file holds.
 * @param fileBytes size of the whole file; `readAt` may know only its beginning
 * @throws CaptureError
 */
export function parseWavHeader(readAt: ReadAt, fileBytes: number): WavHeader {
  const walker = new ChunkWalker(readAt, fileBytes);
  let format: Format | null = null;
  let data: Chunk | null = null;
  let longDataBytes: number | null = null;
  for (let chunk = walker.chunkAt(12); chunk; chunk = walker.after(chunk)) {
    if (chunk.id === 'fmt ') {
      const bytes = readAt(chunk.offset, Math.min(chunk.claimedBytes, 1024));
      const next = parseFormat(bytes, Math.min(chunk.claimedBytes, 1024), walker.isBigEndian);
      if (chunk.offset + chunk.claimedBytes > fileBytes) {
        throw new CaptureError('TRUNCATED_HEADER', 'The format description runs past the end of the file.');
      }
      if (format && !sameFormat(format, next)) {
        throw new CaptureError('INCONSISTENT_HEADER', 'The WAV header holds two format descriptions that disagree.');
      }
      format = next;
    } else if (chunk.id === 'ds64' && chunk.claimedBytes >= 24) {
      longDataBytes = readLongDataSize(readAt(chunk.offset, 24));
    } else if (chunk.id === 'data' && !data) {
      data = chunk;
      // Nothing can follow data that run past the end; after others a format description may still come.
      if (chunk.offset + chunk.claimedBytes > fileBytes) break;
    }
  }
  if (!format) throw new CaptureError('NO_FMT', 'The WAV holds no format description. Copy or export it again.');
  const { encoding, bytesPerSample } = checkFormat(format);
  if (!data) throw new CaptureError('NO_SAMPLES', 'The WAV holds no samples. Copy or export it again.');
  return assemble({ walker, format, data, longDataBytes, encoding, bytesPerSample, fileBytes });
}

interface Parts {
  walker: ChunkWalker;
  format: Format;
  data: Chunk;
  longDataBytes: number | null;
  encoding: WavHeader['encoding'];
  bytesPerSample: number;
  fileBytes: number;
}

function assemble({ walker, format, data, longDataBytes, encoding, bytesPerSample, fileBytes }: Parts): WavHeader {
  const warnings: WavHeader['warnings'] = [];
  const warn = (code: string, message: string): number => warnings.push({ code, message });
  const present = fileBytes - data.offset;
  const isLong = walker.form === 'RF64' || walker.form === 'BW64';
  let claimed = data.claimedBytes;
  if (isLong && claimed === unpatchedSize) {
    if (longDataBytes === null) {
      throw new CaptureError('INCONSISTENT_HEADER', `The ${walker.form} header lacks its table of 64-bit sizes.`);
    }
    claimed = longDataBytes;
  } else if (
    claimed === unpatchedSize ||
    (claimed === 0 && (walker.riffSize === 0 || walker.riffSize === unpatchedSize))
  ) {
    claimed = present;
    warn('UNFINALISED', 'The recorder never wrote the length into the header; the samples that are there were read.');
  } else if (isLong && longDataBytes === null) {
    throw new CaptureError('INCONSISTENT_HEADER', `The ${walker.form} header lacks its table of 64-bit sizes.`);
  }
  const usable = Math.min(claimed, present);
  const frameBytes = bytesPerSample * format.channelCount;
  const frameCount = Math.floor(usable / frameBytes);
  if (frameCount === 0) throw new CaptureError('NO_SAMPLES', 'The WAV holds no samples. Copy or export it again.');
  if (claimed > present) {
    warn('TRUNCATED', `The file is cut off: ${frameCount} of ${Math.floor(claimed / frameBytes)} frames are there.`);
  } else if (usable % frameBytes !== 0) {
    warn('PARTIAL_FRAME', 'The last frame is incomplete and was left out.');
  }
  if (format.byteRate !== format.sampleRateHz * frameBytes) {
    warn('BYTE_RATE', 'The header states another byte rate than rate, channels and bits give; it was ignored.');
  }
  return {
    sampleRateHz: format.sampleRateHz,
    channelCount: format.channelCount,
    encoding,
    bitsPerSample: bytesPerSample * 8,
    validBits: Math.min(format.validBits, bytesPerSample * 8),
    isBigEndian: walker.isBigEndian,
    dataOffset: data.offset,
    frameCount,
    warnings,
  };
}
