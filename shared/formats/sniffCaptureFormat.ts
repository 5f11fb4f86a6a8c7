import { CaptureError } from './CaptureError.js';

const wavForms = ['RIFF', 'RIFX', 'RF64', 'BW64'];

interface Signature {
  name: string;
  bytes: number[];
}
const text = (value: string): number[] => [...value].map((character) => character.charCodeAt(0));
const otherKinds: Signature[] = [
  { name: 'a ZIP archive or spreadsheet', bytes: [0x50, 0x4b, 0x03, 0x04] },
  { name: 'a gzip archive', bytes: [0x1f, 0x8b] },
  { name: 'a FLAC recording', bytes: text('fLaC') },
  { name: 'an Ogg recording', bytes: text('OggS') },
  { name: 'an AIFF recording', bytes: text('FORM') },
  { name: 'an AU recording', bytes: text('.snd') },
  { name: 'an MP3 recording', bytes: text('ID3') },
  { name: 'an MP3 recording', bytes: [0xff, 0xfb] },
  { name: 'an MP3 recording', bytes: [0xff, 0xf3] },
  { name: 'a PDF', bytes: text('%PDF') },
  { name: 'an HDF5 file', bytes: [0x89, 0x48, 0x44, 0x46] },
  { name: 'a picture', bytes: [0x89, 0x50, 0x4e, 0x47] },
];

const startsWith = (bytes: Uint8Array, wanted: number[]): boolean =>
  wanted.every((byte, index) => bytes[index] === byte);
const hasUtf16Mark = (bytes: Uint8Array): boolean => startsWith(bytes, [0xff, 0xfe]) || startsWith(bytes, [0xfe, 0xff]);

function sniffContent(firstBytes: Uint8Array): 'wav' | 'csv' {
  const mark = String.fromCharCode(...firstBytes.subarray(0, 4));
  if (wavForms.includes(mark)) {
    if (firstBytes.length < 12 || String.fromCharCode(...firstBytes.subarray(8, 12)) !== 'WAVE') {
      throw new CaptureError('NOT_WAV', 'The file is of the WAV family but holds no WAV recording.');
    }
    return 'wav';
  }
  if (hasUtf16Mark(firstBytes)) return 'csv';
  const other = otherKinds.find((kind) => startsWith(firstBytes, kind.bytes));
  if (other) {
    throw new CaptureError(
      'BINARY',
      `The file is ${other.name}. Only WAV and CSV can be screened: export it as one of them.`,
    );
  }
  if (/^\s*<(!doctype|html|\?xml)/i.test(new TextDecoder('latin1').decode(firstBytes.subarray(0, 256)))) {
    throw new CaptureError(
      'NOT_CSV',
      'The file is a web page or XML, not a table of numbers. Download the capture itself.',
    );
  }
  if (firstBytes.some((byte) => byte < 9 || (byte > 13 && byte < 32 && byte !== 26))) {
    throw new CaptureError('BINARY', 'The file is neither WAV nor text. Export the capture as WAV or CSV.');
  }
  return 'csv';
}

/**
 * What a file is, by its content. A name that says otherwise is refused too: one of the two is wrong, and guessing which
 * would screen something else than was meant.
 * @throws CaptureError EMPTY_FILE, NOT_WAV, NOT_CSV or BINARY
 */
export function sniffCaptureFormat(firstBytes: Uint8Array, fileName = ''): 'wav' | 'csv' {
  if (firstBytes.length === 0) {
    throw new CaptureError('EMPTY_FILE', 'The file is empty (0 bytes). Copy it from the logger again.');
  }
  const claimsWav = /\.wave?$/i.test(fileName);
  try {
    const format = sniffContent(firstBytes);
    if (format === 'csv' && claimsWav) {
      throw new CaptureError(
        'NOT_WAV',
        'The file is named as a WAV recording but is text. Rename it or upload the recording.',
      );
    }
    if (format === 'wav' && /\.(csv|tsv|txt)$/i.test(fileName)) {
      throw new CaptureError(
        'NOT_CSV',
        'The file is named as a table but is a WAV recording. Rename it to end in .wav.',
      );
    }
    return format;
  } catch (error) {
    if (claimsWav && error instanceof CaptureError) throw new CaptureError('NOT_WAV', error.message);
    throw error;
  }
}
