import type { DataSource } from 'typeorm';
import { AuditEntry, Capture } from '../entities/index.js';

export interface CaptureFailure {
  code: string;
  /** What is wrong and what to do, in words a person can act on. */
  message: string;
  line: number | null;
}

/**
 * Ends a capture as failed, unless a newer attempt or another end has overtaken this one.
 * @returns whether the row was changed
 */
export function failCapture(
  dataSource: DataSource,
  { captureId, attempt }: { captureId: string; attempt: number },
  failure: CaptureFailure,
): Promise<boolean> {
  return dataSource.transaction(async (manager) => {
    const changed = await manager
      .createQueryBuilder()
      .update(Capture)
      .set({
        state: 'failed',
        failureCode: failure.code,
        failureMessage: failure.message,
        failureLine: failure.line,
        progress: 0,
        verdict: null,
        foldScore: null,
        clearToHz: null,
        headline: null,
      })
      .where('id = :captureId AND attempt = :attempt AND state IN (:...open)', {
        captureId,
        attempt,
        open: ['received', 'queued', 'screening'],
      })
      .execute();
    if (changed.affected !== 1) return false;
    const capture = await manager.findOneByOrFail(Capture, { id: captureId });
    await manager.insert(AuditEntry, {
      projectId: capture.projectId,
      entityType: 'capture',
      entityId: captureId,
      action: 'failed',
      text: `could not be screened: ${failure.message}`,
      details: { code: failure.code, attempt },
    });
    return true;
  });
}
