import { CaptureError } from '../../shared/formats/CaptureError.js';
import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import type { CsvLayout } from '../../shared/schemas/csvLayout.js';
import type { ChannelMeasurement } from '../measure/ChannelMeasurement.js';
import { measureCapture, type MeasureOptions } from '../measure/measureCapture.js';
import { openCapture } from '../readers/openCapture.js';
import type { SampleSource } from '../readers/SampleSource.js';
import { measureCompanion, pairedChannel } from './measureCompanion.js';
import { readExcerpt } from './readExcerpt.js';

/** File of the same event at another rate. */
export interface CompanionFile {
  path: string;
  name: string;
  sheet: AcquisitionSheet;
  /** As corrected by a person; recognised otherwise. */
  csvLayout?: CsvLayout | null;
}

/** Compares each channel with the companion's and puts what was found into its record; one that can't be used is noted, not fatal. */
export function addCompanion(
  source: SampleSource,
  measurements: ChannelMeasurement[],
  companion: CompanionFile,
  options: MeasureOptions & { sheet: AcquisitionSheet },
): void {
  const { signal, sheet } = options;
  const abort = signal === undefined ? {} : { signal };
  const note = (reason: string): void => {
    const message = `The companion ${companion.name} can't be used: ${reason}`;
    for (const { record } of measurements) record.warnings.push({ code: 'COMPANION_MISSING', message });
  };
  const rateHz = source.sampleRateHz;
  if (rateHz === null || source.timeStamps?.irregular === true) return;
  let other: SampleSource | null = null;
  try {
    other = openCapture(companion.path, {
      acquisition: companion.sheet,
      csvLayout: companion.csvLayout ?? null,
      fileName: companion.name,
    });
    const otherRateHz = other.sampleRateHz;
    if (otherRateHz === null) return note('its sampling rate is unknown. State it in its acquisition sheet.');
    if (other.timeStamps?.irregular === true) return note('its time stamps are irregular.');
    if (Math.abs(otherRateHz / rateHz - 1) < 1e-6) {
      return note(`it has the same sampling rate, ${otherRateHz} Hz. A companion shows folding only at another rate.`);
    }
    const others = measureCapture(other, companion.sheet, abort);
    const theirs = readExcerpt(other, otherRateHz, signal);
    const ours = readExcerpt(source, rateHz, signal);
    const records = others.map(({ record }) => record);
    measurements.forEach(({ record, spectra }, channel) => {
      signal?.throwIfAborted();
      const paired = pairedChannel(record, records, theirs);
      const samples = ours.channels[channel];
      const otherSamples = theirs.channels[paired];
      const otherMeasured = others[paired];
      if (samples === undefined || otherSamples === undefined || otherMeasured === undefined) return;
      record.companion = measureCompanion(
        companion.name,
        { record, spectra, samples, rateHz },
        { ...otherMeasured, samples: otherSamples, rateHz: otherRateHz },
        sheet,
      );
    });
  } catch (error) {
    if (error instanceof CaptureError) return note(error.message);
    if (error instanceof Error && 'code' in error && error.code === 'ENOENT') return note('the file was not found.');
    throw error;
  } finally {
    other?.close();
  }
}
