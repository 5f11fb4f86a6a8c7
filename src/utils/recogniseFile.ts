import { CaptureError } from '@shared/formats/CaptureError.js';
import { describeWav } from '@shared/formats/describeWav.js';
import { recogniseCsvLayout } from '@shared/formats/recogniseCsvLayout.js';
import { sniffCaptureFormat } from '@shared/formats/sniffCaptureFormat.js';
import type { CsvLayout } from '@shared/schemas/csvLayout.js';

export const sniffedBytes = 64 * 1024;

export type RecognisedFile =
  | { format: 'wav'; sampleRateHz: number; channelCount: number; durationS: number }
  | { format: 'csv'; layout: CsvLayout; channelCount: number }
  /** The header lies further back than was read; the server will look at the whole. */
  | { format: 'wav'; sampleRateHz: null }
  | { format: 'refused'; code: string; message: string };

/** What a file is, from its first bytes, before anything is sent. */
export function recogniseBytes(firstBytes: Uint8Array, file: { name: string; size: number }): RecognisedFile {
  try {
    if (sniffCaptureFormat(firstBytes, file.name) === 'csv') {
      const layout = recogniseCsvLayout(firstBytes);
      return { format: 'csv', layout, channelCount: layout.valueColumns.length };
    }
  } catch (error) {
    if (!(error instanceof CaptureError)) throw error;
    return { format: 'refused', code: error.code, message: error.message };
  }
  try {
    const { sampleRateHz, channelCount, frameCount } = describeWav(firstBytes, file.size);
    return { format: 'wav', sampleRateHz, channelCount, durationS: frameCount / sampleRateHz };
  } catch (error) {
    if (!(error instanceof CaptureError)) throw error;
    // A damaged header is told by the server, which sees the whole file.
    return { format: 'wav', sampleRateHz: null };
  }
}

export async function readFirstBytes(file: Blob): Promise<Uint8Array> {
  return new Uint8Array(await file.slice(0, sniffedBytes).arrayBuffer());
}
