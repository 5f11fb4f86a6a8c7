import { basename } from 'node:path';
import { engineVersion } from '../shared/constants/engineVersion.js';
import type { AcquisitionSheet } from '../shared/schemas/acquisitionSheet.js';
import type { CsvLayout } from '../shared/schemas/csvLayout.js';
import type { ChannelScreen } from '../shared/schemas/screening.js';
import type { Thresholds } from '../shared/schemas/thresholds.js';
import { judgeChannels } from '../shared/screening/judgeChannels.js';
import { addCompanion, type CompanionFile } from './companion/addCompanion.js';
import type { ChannelMeasurement } from './measure/ChannelMeasurement.js';
import { measureCapture, type MeasureOptions } from './measure/measureCapture.js';
import { openCapture } from './readers/openCapture.js';

export interface ScreenFileOptions extends MeasureOptions {
  sheet: AcquisitionSheet;
  thresholds: Thresholds;
  csvLayout?: CsvLayout | null;
  /** Name shown in results; the path's last part otherwise. */
  fileName?: string;
  /** File of the same event at another rate. */
  companion?: CompanionFile | null;
}

export interface ScreenedFile {
  format: 'wav' | 'csv';
  channelCount: number;
  sampleRateHz: number | null;
  frameCount: number;
  durationS: number | null;
  measurements: ChannelMeasurement[];
  screens: ChannelScreen[];
}

/**
 * Measures and judges one capture file: what both the queue's worker and the command do.
 * @throws CaptureError when the file can't be read as it is (never worth a retry), the signal's reason when aborted
 */
export function screenFile(filePath: string, options: ScreenFileOptions): ScreenedFile {
  const startedMs = performance.now();
  const { sheet, thresholds, csvLayout, companion } = options;
  const file = options.fileName ?? basename(filePath);
  const source = openCapture(filePath, { acquisition: sheet, csvLayout: csvLayout ?? null, fileName: file });
  try {
    const measurements = measureCapture(source, sheet, options);
    if (companion) addCompanion(source, measurements, companion, options);
    const judgements = judgeChannels(
      measurements.map(({ record }) => record),
      thresholds,
      sheet,
    );
    const elapsedMs = Math.round(performance.now() - startedMs);
    return {
      format: source.format,
      channelCount: source.channelCount,
      sampleRateHz: source.sampleRateHz,
      frameCount: source.frameCount,
      durationS: source.sampleRateHz === null ? null : source.frameCount / source.sampleRateHz,
      measurements,
      screens: judgements.map((judgement, channel) => {
        const { record } = measurements[channel] as ChannelMeasurement;
        return {
          schema: 'overfold.screen/1',
          file,
          channel,
          ...(record.channelName === '' ? {} : { channelName: record.channelName }),
          ...(record.unit === '' ? {} : { unit: record.unit }),
          sampleRateHz: record.sampleRateHz,
          samples: record.samples,
          durationS: record.durationS,
          ...judgement,
          engine: { version: engineVersion, elapsedMs },
        };
      }),
    };
  } finally {
    source.close();
  }
}
