import type { AcquisitionSheet } from '../schemas/acquisitionSheet.js';
import type { CsvLayout } from '../schemas/csvLayout.js';

/** What the measuring half reads of a sheet; everything else only the judge does. */
const measuredWith = [
  'sampleRateHz',
  'scale',
  'unit',
  'companion',
  'sensorBandHz',
] as const satisfies (keyof AcquisitionSheet)[];

interface Description {
  sheet: AcquisitionSheet;
  csvLayout: CsvLayout | null;
}

/** Whether a changed description makes the stored measurement void, so that the file itself must be read again. */
export function needsNewMeasurement(before: Description, after: Description): boolean {
  return (
    measuredWith.some((name) => before.sheet[name] !== after.sheet[name]) ||
    JSON.stringify(sortKeys(before.csvLayout)) !== JSON.stringify(sortKeys(after.csvLayout))
  );
}

const sortKeys = (layout: CsvLayout | null) =>
  layout && Object.entries(layout).sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0));
