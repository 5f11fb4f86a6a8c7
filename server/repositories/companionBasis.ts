import { createHash } from 'node:crypto';
import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import type { CsvLayout } from '../../shared/schemas/csvLayout.js';

interface ComparedCapture {
  id: string;
  sha256: string;
  sheet: AcquisitionSheet;
  csvLayout: CsvLayout | null;
}

/**
 * Names everything of a companion that a comparison reads: its bytes and how they are to be understood. While it stays the
 * same, comparing once more would give the same result.
 */
export function companionBasis({ id, sha256, sheet, csvLayout }: ComparedCapture): string {
  const { sampleRateHz = null, scale = null, unit = null, sensorBandHz = null } = sheet;
  const layout = csvLayout && Object.entries(csvLayout).sort(([a], [b]) => (a < b ? -1 : 1));
  return createHash('sha256')
    .update(JSON.stringify([id, sha256, sampleRateHz, scale, unit, sensorBandHz, layout]))
    .digest('hex');
}
