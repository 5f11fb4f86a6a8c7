import { CaptureError } from '../../shared/formats/CaptureError.js';
import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import { openCapture } from '../readers/openCapture.js';

/** Reads sampling rates of files, each file once; null where a file has none or can't be read. */
export function createRateReader(sheetOf: (file: string) => AcquisitionSheet): (file: string) => number | null {
  const known = new Map<string, number | null>();
  return (file) => {
    const found = known.get(file);
    if (found !== undefined) return found;
    const rateHz = readRate(file, sheetOf(file));
    known.set(file, rateHz);
    return rateHz;
  };
}

function readRate(file: string, sheet: AcquisitionSheet): number | null {
  if (sheet.sampleRateHz !== undefined) return sheet.sampleRateHz;
  try {
    const source = openCapture(file, { acquisition: sheet, csvLayout: null });
    try {
      return source.sampleRateHz;
    } finally {
      source.close();
    }
  } catch (error) {
    // The file's own line of the results says what is wrong with it.
    if (error instanceof CaptureError || (error instanceof Error && 'code' in error)) return null;
    throw error;
  }
}
