import { closeSync, openSync, readSync } from 'node:fs';
import { basename } from 'node:path';
import { CaptureError } from '../../shared/formats/CaptureError.js';
import { sniffCaptureFormat } from '../../shared/formats/sniffCaptureFormat.js';
import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import type { CsvLayout } from '../../shared/schemas/csvLayout.js';
import { CsvSource } from './CsvSource.js';
import type { SampleSource } from './SampleSource.js';
import { WavSource } from './WavSource.js';

export interface OpenOptions {
  acquisition?: AcquisitionSheet;
  /** Null or absent: recognised from the file's first bytes. */
  csvLayout?: CsvLayout | null;
  maxChannels?: number;
  /** The name it was uploaded under, where the path's own is another. */
  fileName?: string;
}

const sniffedBytes = 4096;

function readFirstBytes(filePath: string): Uint8Array {
  const descriptor = openSync(filePath, 'r');
  try {
    const bytes = new Uint8Array(sniffedBytes);
    return bytes.subarray(0, readSync(descriptor, bytes, 0, sniffedBytes, 0));
  } finally {
    closeSync(descriptor);
  }
}

/**
 * Opens a capture by its content, not its name.
 * @throws CaptureError with a code and a message that says what to do
 */
export function openCapture(
  filePath: string,
  { acquisition = {}, csvLayout = null, maxChannels, fileName = basename(filePath) }: OpenOptions,
): SampleSource {
  const format = sniffCaptureFormat(readFirstBytes(filePath), fileName);
  const source =
    format === 'wav' ? new WavSource(filePath, acquisition) : new CsvSource(filePath, acquisition, csvLayout);
  if (maxChannels !== undefined && source.channelCount > maxChannels) {
    source.close();
    throw new CaptureError(
      'BAD_CHANNELS',
      `The file has ${source.channelCount} channels; up to ${maxChannels} are screened. Split it.`,
    );
  }
  return source;
}
