import { CaptureError } from '../../shared/formats/CaptureError.js';
import type { ScreenTaskFile } from './ScreenTask.js';
import { verifyStoredFile } from './verifyStoredFile.js';

/** Why a stored companion can't be used; null where its bytes are those that were received. */
export function refuseCompanion(companion: ScreenTaskFile): string | null {
  try {
    verifyStoredFile(companion.filePath, companion);
    return null;
  } catch (error) {
    if (!(error instanceof CaptureError)) throw error;
    return `The companion ${companion.fileName} can’t be used: ${error.message}`;
  }
}
