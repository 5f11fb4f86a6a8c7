import { CaptureError } from '../../shared/formats/CaptureError.js';
import { screenFile } from '../screenFile.js';
import { companionNote } from './companionNote.js';
import { refuseCompanion } from './refuseCompanion.js';
import type { ScreenTask, ScreenTaskResult } from './ScreenTask.js';
import { toScreeningResult } from './toScreeningResult.js';
import { verifyStoredFile } from './verifyStoredFile.js';

const progressStep = 0.02;

/** Entry of a computing thread: one capture from file to judgement. */
export function screenThread(task: ScreenTask): ScreenTaskResult {
  let reported = 0;
  try {
    verifyStoredFile(task.filePath, task);
    const refusal = task.companion && refuseCompanion(task.companion);
    const companion = refusal === null ? task.companion : null;
    const screened = screenFile(task.filePath, {
      fileName: task.fileName,
      sheet: task.acquisition,
      csvLayout: task.csvLayout,
      thresholds: task.thresholds,
      companion: companion && {
        path: companion.filePath,
        name: companion.fileName,
        sheet: companion.acquisition,
        csvLayout: companion.csvLayout,
      },
      onProgress: (share) => {
        if (share - reported < progressStep) return;
        reported = share;
        task.progressPort.postMessage(share);
      },
    });
    const records = screened.measurements.map(({ record }) => record);
    return {
      ok: true,
      result: toScreeningResult(screened),
      companionNote: companion ? companionNote(records) : refusal,
    };
  } catch (error) {
    if (!(error instanceof CaptureError)) throw error;
    return { ok: false, failure: { code: error.code, message: error.message, line: error.line ?? null } };
  } finally {
    task.progressPort.close();
  }
}

export default screenThread;
