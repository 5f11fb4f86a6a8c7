import type { EntityManager } from 'typeorm';
import { AuditEntry, Capture, type Batch } from '../entities/index.js';
import { reopenBatch } from '../repositories/batchRepository.js';
import { companionBasis } from '../repositories/companionBasis.js';
import { findCompanions, type ChosenCompanion } from '../repositories/companionRepository.js';
import { failedCompanionNote } from '../repositories/failedCompanionNote.js';
import { sendToScreening } from '../repositories/sendToScreening.js';

/** What a screening of this capture would now rest on; null where it would be screened without a companion. */
function wantedBasis({ companion }: ChosenCompanion): string | null {
  return companion === null || companion.state === 'failed' ? null : companionBasis(companion);
}

/** Whether the stored results were made with another companion, or with none, than they would be now. */
function isOutdated(chosen: ChosenCompanion): boolean {
  const { capture, companion } = chosen;
  // What was compared stays compared when the companion's own screening fails afterwards.
  if (companion?.state === 'failed' && companion.id === capture.companionId) return false;
  return wantedBasis(chosen) !== capture.companionBasis;
}

async function sendAgain(manager: EntityManager, batch: Batch, { capture, companion }: ChosenCompanion): Promise<void> {
  await sendToScreening(manager, capture.id);
  await reopenBatch(manager, batch);
  await manager.insert(AuditEntry, {
    projectId: batch.projectId,
    entityType: 'capture',
    entityId: capture.id,
    action: 'companionChanged',
    text:
      companion === null
        ? 'is screened again without the companion it was compared with'
        : `is screened again, to be compared with ${companion.fileName}`,
    details: { before: capture.companionId, after: companion?.id ?? null } as object,
  });
}

/** Keeps the reason up to date where nothing was compared before and nothing is now. */
async function noteReason(manager: EntityManager, { capture, companion, note }: ChosenCompanion): Promise<void> {
  if (capture.companionBasis !== null) return;
  const companionId = companion?.id ?? null;
  const companionNote = companion ? failedCompanionNote(companion) : note;
  if (companionId === capture.companionId && companionNote === capture.companionNote) return;
  await manager.update(Capture, { id: capture.id }, { companionId, companionNote });
}

/**
 * Sends the screened captures of a batch to screening once more whose companion has arrived, was named or has changed since.
 * To be called under the batch's lock by whatever may change a companion, and before the batch ends. A capture being screened
 * is looked at when it has been; one that waits finds its companion by itself. It ends, since a companion does not depend on
 * the outcome of a comparison.
 * @returns the number of captures sent
 */
export async function screenPairsAgain(manager: EntityManager, batch: Batch): Promise<number> {
  if (batch.state === 'released' || batch.state === 'withdrawn') return 0;
  let sent = 0;
  for (const chosen of await findCompanions(manager, batch)) {
    if (chosen.capture.state !== 'screened') continue;
    if (isOutdated(chosen)) {
      await sendAgain(manager, batch, chosen);
      sent += 1;
    } else await noteReason(manager, chosen);
  }
  return sent;
}
