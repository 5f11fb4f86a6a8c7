import { CaptureError } from '../../shared/formats/CaptureError.js';
import { sniffCaptureFormat } from '../../shared/formats/sniffCaptureFormat.js';
import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import type { CaptureFormat } from '../../shared/schemas/capture.js';
import type { CsvLayout } from '../../shared/schemas/csvLayout.js';
import { cleanFileName } from '../../shared/utils/cleanFileName.js';
import type { ReceivedFile } from '../middleware/receiveUpload.js';
import type { UploadFields } from './parseUploadFields.js';

/** A received file that may become a capture. */
export interface UploadCandidate {
  fileName: string;
  format: CaptureFormat;
  sizeBytes: number;
  sha256: string;
  temporaryPath: string;
  acquisition: AcquisitionSheet;
  csvLayout: CsvLayout | null;
}

export interface RefusedFile {
  fileName: string;
  code: string;
  message: string;
}

const shownNameLength = 200;

/** What was said of a file under any of the names a client may know it by. Own keys only: names are anybody's text. */
function saidOf<T>(byName: Record<string, T>, names: string[]): T | undefined {
  const name = names.find((candidate) => Object.hasOwn(byName, candidate));
  return name === undefined ? undefined : byName[name];
}

/** Name and content of one received file: a candidate, or why it is refused. The other files are not affected. */
export function checkReceivedFile(
  file: ReceivedFile,
  { acquisition, csvLayout }: UploadFields,
): { candidate: UploadCandidate } | { refused: RefusedFile } {
  const fileName = cleanFileName(file.rawName);
  if (fileName === null) {
    return {
      refused: {
        fileName: file.rawName.slice(0, shownNameLength),
        code: 'BAD_FILE_NAME',
        message: 'The name is empty or too long (255 characters a part, 1024 in all). Rename the file.',
      },
    };
  }
  const names = [file.rawName, fileName, fileName.slice(fileName.lastIndexOf('/') + 1)];
  try {
    const format = sniffCaptureFormat(file.firstBytes, fileName);
    return {
      candidate: {
        fileName,
        format,
        sizeBytes: file.sizeBytes,
        sha256: file.sha256,
        temporaryPath: file.temporaryPath,
        acquisition: saidOf(acquisition, names) ?? {},
        csvLayout: (format === 'csv' && saidOf(csvLayout, names)) || null,
      },
    };
  } catch (error) {
    if (!(error instanceof CaptureError)) throw error;
    return { refused: { fileName, code: error.code, message: error.message } };
  }
}
