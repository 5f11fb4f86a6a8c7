import type { AppDependencies } from '../AppDependencies.js';
import { Batch, Capture } from '../entities/index.js';
import { ConflictError, InvalidInputError, NotFoundError, toAppError } from '../errors/index.js';
import type { ReceivedUpload } from '../middleware/receiveUpload.js';
import type { Actor } from '../policies/Actor.js';
import { refuseEdit } from '../policies/capturePolicy.js';
import { requireProjectReader } from '../policies/requireProjectAccess.js';
import { relayNow } from '../queues/relayNow.js';
import { screenPairsAgain } from '../queues/screenPairsAgain.js';
import { screenPairsElsewhere } from '../queues/screenPairsElsewhere.js';
import { lockBatch } from '../repositories/batchRepository.js';
import { newStorageKey } from '../storage/newStorageKey.js';
import { checkReceivedFile, type RefusedFile, type UploadCandidate } from './checkReceivedFile.js';
import { parseUploadFields } from './parseUploadFields.js';
import { addCaptures, replaceCapture, type Placed, type StoredCandidate } from './placeCaptures.js';

export interface UploadOutcome {
  captures: Capture[];
  refused: RefusedFile[];
}

const completeError = (): ConflictError =>
  new ConflictError('BATCH_COMPLETE', 'The upload of this batch was closed. Put further files into a new batch.');

export class UploadService {
  constructor(private readonly deps: Pick<AppDependencies, 'dataSource' | 'storage' | 'queue' | 'logger' | 'config'>) {}

  /** To be asked before a byte of the files is read. */
  async requireUploadable(actor: Actor, batchId: string): Promise<void> {
    const { manager } = this.deps.dataSource;
    const batch = await manager.findOneBy(Batch, { id: batchId });
    if (!batch) throw new NotFoundError();
    requireProjectReader(actor, batch.projectId);
    const refusal = refuseEdit(actor, { projectId: batch.projectId, batchState: batch.state });
    if (refusal) throw refusal;
    // A closed batch still takes files in the place of failed ones.
    const isReplaceable = batch.completedAt === null || (await manager.existsBy(Capture, { batchId, state: 'failed' }));
    if (!isReplaceable) throw completeError();
  }

  /**
   * Makes captures of received files: bytes into the store first, then rows and audit in one transaction, so that no row
   * is ever without its file. Files that can't become captures are told apart from those that do.
   */
  async accept(actor: Actor, batchId: string, { files, fields }: ReceivedUpload): Promise<UploadOutcome> {
    const said = parseUploadFields(fields);
    if (files.length === 0) throw new InvalidInputError('NO_FILES', 'Send at least one file in the field "files".');
    if (said.replaces !== null && files.length !== 1) {
      throw new InvalidInputError('ONE_FILE_ONLY', 'Exactly one file takes the place of another.');
    }
    const candidates: UploadCandidate[] = [];
    const refused: RefusedFile[] = [];
    for (const file of files) {
      const checked = checkReceivedFile(file, said);
      if ('candidate' in checked) candidates.push(checked.candidate);
      else refused.push(checked.refused);
    }
    if (candidates.length === 0) return { captures: [], refused };
    const placed = await this.store(candidates, (stored) => this.place(actor, batchId, stored, said.replaces));
    await screenPairsElsewhere(
      this.deps.dataSource,
      placed.captures.map(({ id }) => id),
    );
    await relayNow(this.deps);
    return { captures: placed.captures, refused: [...refused, ...placed.refused] };
  }

  private place(actor: Actor, batchId: string, stored: StoredCandidate[], replaces: string | null): Promise<Placed> {
    const { dataSource, config } = this.deps;
    return dataSource.transaction(async (manager) => {
      const batch = await lockBatch(manager, batchId);
      const refusal = refuseEdit(actor, { projectId: batch.projectId, batchState: batch.state });
      if (refusal) throw refusal;
      const [only] = stored;
      if (replaces === null && batch.completedAt !== null) throw completeError();
      const placed =
        replaces !== null && only
          ? await replaceCapture(manager, actor, batch, replaces, only)
          : await addCaptures(manager, actor, batch, stored, config.MAX_FILES_PER_BATCH);
      await screenPairsAgain(manager, batch);
      return placed;
    });
  }

  /** Brings the bytes into the store, lets `place` make rows of them, and takes out again what no row points to. */
  private async store(
    candidates: UploadCandidate[],
    place: (stored: StoredCandidate[]) => Promise<Placed>,
  ): Promise<Placed> {
    const { storage } = this.deps;
    const keys: string[] = [];
    try {
      const stored: StoredCandidate[] = [];
      for (const candidate of candidates) {
        const storageKey = newStorageKey();
        keys.push(storageKey);
        await storage.save(storageKey, candidate.temporaryPath);
        stored.push({ ...candidate, storageKey });
      }
      const placed = await place(stored);
      await this.discard([...keys.filter((key) => !placed.usedKeys.has(key)), ...placed.freedKeys]);
      return placed;
    } catch (error) {
      // Where the connection broke, the rows may have been committed all the same: then the sweep decides, not we.
      if (toAppError(error).kind === 'user') await this.discard(keys);
      throw error;
    }
  }

  private async discard(keys: string[]): Promise<void> {
    for (const key of keys) {
      await this.deps.storage
        .remove(key)
        .catch((error: unknown) => this.deps.logger.warn({ err: error, key }, 'unused file could not be removed'));
    }
  }
}
