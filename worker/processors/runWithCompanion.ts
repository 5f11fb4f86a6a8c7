import type { Capture } from '../../server/entities/index.js';
import type { PairableRow } from '../../server/repositories/companionRepository.js';
import { StoredFileMissingError } from '../../server/storage/StoredFileMissingError.js';
import type { ScreenTaskFile, ScreenTaskResult } from '../threads/ScreenTask.js';
import type { WorkerContext } from '../WorkerContext.js';
import { fileLabel } from './fileLabel.js';

type Run = (filePath: string, companion: ScreenTaskFile | null) => Promise<ScreenTaskResult>;

function noteOf(error: unknown, { fileName, storageKey }: PairableRow): string {
  const reason =
    error instanceof StoredFileMissingError && error.key === storageKey
      ? 'its stored file is gone. Tell an administrator, or upload it again.'
      : 'screening the two together stopped without a result.';
  return `The companion ${fileName} was not compared: ${reason}`;
}

/**
 * Fetches a capture's file and its companion's and runs a screening with both. When that stops for a reason that may lie with
 * the companion (its file is gone, too much memory or time for two), the capture is screened alone, and the result says so.
 * @throws whatever stops the screening of the capture alone; the signal's reason when aborted
 */
export async function runWithCompanion(
  { storage, logger }: Pick<WorkerContext, 'storage' | 'logger'>,
  capture: Capture,
  companion: PairableRow | null,
  signal: AbortSignal,
  run: Run,
): Promise<ScreenTaskResult> {
  const runAlone = (): Promise<ScreenTaskResult> =>
    storage.withLocalFile(capture.storageKey, (filePath) => run(filePath, null));
  if (!companion) return runAlone();
  try {
    return await storage.withLocalFile(capture.storageKey, (filePath) =>
      storage.withLocalFile(companion.storageKey, (companionPath) =>
        run(filePath, {
          filePath: companionPath,
          fileName: fileLabel(companion.fileName),
          sha256: companion.sha256,
          sizeBytes: companion.sizeBytes,
          acquisition: companion.sheet,
          csvLayout: companion.csvLayout,
        }),
      ),
    );
  } catch (error) {
    if (signal.aborted) throw error;
    logger.warn({ err: error, captureId: capture.id, companionId: companion.id }, 'screened without its companion');
    const result = await runAlone();
    return result.ok ? { ...result, companionNote: noteOf(error, companion) } : result;
  }
}
