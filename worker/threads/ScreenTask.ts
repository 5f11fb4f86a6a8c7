import type { MessagePort } from 'node:worker_threads';
import type { ScreeningResult } from '../../server/repositories/saveScreening.js';
import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import type { CsvLayout } from '../../shared/schemas/csvLayout.js';
import type { Thresholds } from '../../shared/schemas/thresholds.js';

/** A stored file, what it must be, and how it is to be read. */
export interface ScreenTaskFile {
  filePath: string;
  fileName: string;
  sha256: string;
  sizeBytes: number;
  acquisition: AcquisitionSheet;
  csvLayout: CsvLayout | null;
}

/** What the main thread hands to a computing thread: plain data and a port for progress (0..1). */
export interface ScreenTask extends ScreenTaskFile {
  /** The file of the same event at another rate. */
  companion: ScreenTaskFile | null;
  thresholds: Thresholds;
  progressPort: MessagePort;
}

/** A bad file is an answer, not an exception: class identity does not survive the way between threads. */
export type ScreenTaskResult =
  | {
      ok: true;
      result: ScreeningResult;
      /** Why the companion given was not compared; null where it was, or where none was given. */
      companionNote: string | null;
    }
  | { ok: false; failure: { code: string; message: string; line: number | null } };
