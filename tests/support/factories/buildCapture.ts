import { createHash, randomUUID } from 'node:crypto';
import type { DataSource } from 'typeorm';
import { Capture, type Batch } from '../../../server/entities/index.js';
import { newStorageKey } from '../../../server/storage/newStorageKey.js';

/** A stored capture as a row only: no file, no results. */
export function buildCapture(
  dataSource: DataSource,
  batch: Pick<Batch, 'id' | 'projectId'>,
  overrides: Partial<Capture> = {},
): Promise<Capture> {
  const { manager } = dataSource;
  const mark = randomUUID();
  return manager.save(
    manager.create(Capture, {
      batchId: batch.id,
      projectId: batch.projectId,
      fileName: `pump-${mark.slice(0, 8)}.wav`,
      format: 'wav',
      sizeBytes: 4096,
      sha256: createHash('sha256').update(mark).digest('hex'),
      storageKey: newStorageKey(),
      ...overrides,
    }),
  );
}
