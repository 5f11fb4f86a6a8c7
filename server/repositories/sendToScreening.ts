import type { EntityManager } from 'typeorm';
import { Capture } from '../entities/index.js';

/** Columns that belong to a screening and mean nothing until the next one has ended. */
const nothingKnown = {
  progress: 0,
  faultCount: 0,
  queuedAt: null,
  startedAt: null,
  screenedAt: null,
  failureCode: null,
  failureMessage: null,
  failureLine: null,
  verdict: null,
  foldScore: null,
  clearToHz: null,
  headline: null,
};

/**
 * Puts a capture back to `received`, with other columns changed along, so that the relay brings it to the queue. The raised
 * attempt shuts out a worker that is still busy with the state before. To be called under the batch's lock.
 */
export async function sendToScreening(
  manager: EntityManager,
  captureId: string,
  changes: Partial<
    Pick<
      Capture,
      'acquisition' | 'csvLayout' | 'fileName' | 'format' | 'sizeBytes' | 'sha256' | 'storageKey' | 'duplicateOfId'
    > & { uploadedById: string }
  > = {},
): Promise<void> {
  await manager
    .createQueryBuilder()
    .update(Capture)
    .set({ ...nothingKnown, ...changes, state: 'received', attempt: () => 'attempt + 1' })
    .where({ id: captureId })
    .execute();
}
