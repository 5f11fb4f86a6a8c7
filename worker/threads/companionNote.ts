import type { MeasurementRecord } from '../../shared/screening/MeasurementRecord.js';

/**
 * Why a companion that was opened was not compared with any channel of a capture; null where it was.
 * @param records of the capture's channels
 */
export function companionNote(records: readonly MeasurementRecord[]): string | null {
  if (records.some(({ companion }) => companion !== null)) return null;
  const warnings = records.flatMap((record) => record.warnings);
  return (
    warnings.find(({ code }) => code === 'COMPANION_MISSING')?.message ??
    'This capture can’t be compared with its companion: that needs a known sampling rate and regular time stamps.'
  );
}
