import type { ScreeningResult } from '../../server/repositories/saveScreening.js';
import { judgeCapture } from '../../shared/screening/judgeCapture.js';
import type { ScreenedFile } from '../screenFile.js';

/** What a screened file leaves in the database: each channel's record, screen and spectra, and the capture's judgement. */
export function toScreeningResult({ measurements, screens }: ScreenedFile): ScreeningResult {
  return {
    ...judgeCapture(screens),
    channels: screens.flatMap((screen, index) => {
      const measurement = measurements[index];
      return measurement ? [{ screen, record: measurement.record, spectra: measurement.spectra }] : [];
    }),
  };
}
