import { In, type EntityManager } from 'typeorm';
import { Capture, type Batch } from '../entities/index.js';
import { ConflictError, NotFoundError } from '../errors/index.js';
import type { Actor } from '../policies/Actor.js';
import { reopenBatch } from '../repositories/batchRepository.js';
import { sendToScreening } from '../repositories/sendToScreening.js';
import { addAuditEntry } from './audit.js';
import type { RefusedFile, UploadCandidate } from './checkReceivedFile.js';

/** A candidate whose bytes are in the store already, under this key. */
export interface StoredCandidate extends UploadCandidate {
  storageKey: string;
}

export interface Placed {
  captures: Capture[];
  refused: RefusedFile[];
  /** Keys that a row now points to. */
  usedKeys: Set<string>;
  /** Keys no row points to any more, once this is committed. */
  freedKeys: string[];
}

const nameTaken = (fileName: string): RefusedFile => ({
  fileName,
  code: 'DUPLICATE_NAME',
  message: 'The batch holds another file with this name. Rename this one, or replace the other if it failed.',
});

/** The first capture of the project for each content that was uploaded before. */
async function findFirstWithSameBytes(
  manager: EntityManager,
  projectId: string,
  candidates: UploadCandidate[],
): Promise<Map<string, string>> {
  const rows = await manager.query<{ sha256: string; id: string }[]>(
    `SELECT DISTINCT ON (sha256) sha256, id FROM captures
      WHERE project_id = $1 AND sha256 = ANY($2::bpchar[]) ORDER BY sha256, created_at, id`,
    [projectId, candidates.map(({ sha256 }) => sha256)],
  );
  return new Map(rows.map(({ sha256, id }) => [sha256, id]));
}

/**
 * Adds captures to a batch whose row is locked. The same name with the same bytes is the same upload once more and answers
 * the capture that is there; the same name with other bytes is refused.
 */
export async function addCaptures(
  manager: EntityManager,
  actor: Actor,
  batch: Batch,
  candidates: StoredCandidate[],
  maxFiles: number,
): Promise<Placed> {
  const placed: Placed = { captures: [], refused: [], usedKeys: new Set(), freedKeys: [] };
  const there = await manager.findBy(Capture, {
    batchId: batch.id,
    fileName: In(candidates.map(({ fileName }) => fileName)),
  });
  const byName = new Map(there.map((capture) => [capture.fileName, capture]));
  const firstByBytes = await findFirstWithSameBytes(manager, batch.projectId, candidates);
  let room = maxFiles - (await manager.countBy(Capture, { batchId: batch.id }));
  for (const candidate of candidates) {
    const { fileName, sha256, storageKey } = candidate;
    const same = byName.get(fileName);
    if (same?.sha256 === sha256) {
      placed.captures.push(same);
      continue;
    }
    if (same) {
      placed.refused.push(nameTaken(fileName));
      continue;
    }
    if (room <= 0) {
      const message = `A batch may hold at most ${maxFiles} files. Put this one into another batch.`;
      placed.refused.push({ fileName, code: 'BATCH_FULL', message });
      continue;
    }
    room -= 1;
    const capture = await insertCapture(manager, actor, batch, candidate, firstByBytes.get(sha256) ?? null);
    byName.set(fileName, capture);
    if (!firstByBytes.has(sha256)) firstByBytes.set(sha256, capture.id);
    placed.captures.push(capture);
    placed.usedKeys.add(storageKey);
  }
  return placed;
}

async function insertCapture(
  manager: EntityManager,
  actor: Actor,
  batch: Batch,
  { fileName, format, sizeBytes, sha256, storageKey, acquisition, csvLayout }: StoredCandidate,
  duplicateOfId: string | null,
): Promise<Capture> {
  const columns = { fileName, format, sizeBytes, sha256, storageKey, acquisition, csvLayout, duplicateOfId };
  const { id: batchId, projectId } = batch;
  const capture = await manager.save(
    manager.create(Capture, { ...columns, batchId, projectId, uploadedById: actor.userId }),
  );
  await addAuditEntry(manager, {
    actor,
    projectId,
    entityType: 'capture',
    entityId: capture.id,
    action: 'uploaded',
    text: `uploaded ${fileName}`,
    details: { sha256, sizeBytes, duplicateOfId },
  });
  return capture;
}

/**
 * Gives a failed capture another file, in a batch whose row is locked. The capture keeps its id and its history.
 * @throws NotFoundError, ConflictError NOT_FAILED
 */
export async function replaceCapture(
  manager: EntityManager,
  actor: Actor,
  batch: Batch,
  captureId: string,
  candidate: StoredCandidate,
): Promise<Placed> {
  const capture = await manager.findOne(Capture, {
    where: { id: captureId, batchId: batch.id },
    lock: { mode: 'pessimistic_write' },
  });
  if (!capture) throw new NotFoundError(undefined, 'This batch holds no such capture to replace.');
  const { temporaryPath: _temporaryPath, ...columns } = candidate;
  const { fileName, sha256, sizeBytes, storageKey } = columns;
  const nothing: Placed = { captures: [], refused: [], usedKeys: new Set(), freedKeys: [] };
  if (capture.fileName === fileName && capture.sha256 === sha256) return { ...nothing, captures: [capture] };
  if (capture.state !== 'failed') {
    throw new ConflictError('NOT_FAILED', 'Only the file of a capture that could not be screened can be replaced.');
  }
  const sameName = await manager.findOneBy(Capture, { batchId: batch.id, fileName });
  if (sameName && sameName.id !== captureId) return { ...nothing, refused: [nameTaken(fileName)] };

  const first = (await findFirstWithSameBytes(manager, batch.projectId, [candidate])).get(sha256) ?? null;
  const acquisition = Object.keys(candidate.acquisition).length > 0 ? candidate.acquisition : capture.acquisition;
  await sendToScreening(manager, captureId, {
    ...columns,
    acquisition,
    duplicateOfId: first === captureId ? null : first,
    uploadedById: actor.userId,
  });
  await reopenBatch(manager, batch);
  await addAuditEntry(manager, {
    actor,
    projectId: batch.projectId,
    entityType: 'capture',
    entityId: captureId,
    action: 'replaced',
    text: `replaced the file ${capture.fileName} by ${fileName}`,
    details: { before: { sha256: capture.sha256, failure: capture.failureCode }, after: { sha256, sizeBytes } },
  });
  return {
    captures: [await manager.findOneByOrFail(Capture, { id: captureId })],
    refused: [],
    usedKeys: new Set([storageKey]),
    freedKeys: [capture.storageKey],
  };
}
