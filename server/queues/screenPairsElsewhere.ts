import type { DataSource } from 'typeorm';
import { lockBatch } from '../repositories/batchRepository.js';
import { findBatchesPairedWith, findBatchesWithDistantPairs } from '../repositories/companionRepository.js';
import { screenPairsAgain } from './screenPairsAgain.js';

/** One batch at a time, so that no two locks are ever held at once. */
async function screenPairsOf(dataSource: DataSource, batchIds: string[]): Promise<number> {
  let sent = 0;
  for (const batchId of batchIds) {
    sent += await dataSource.transaction(async (manager) =>
      screenPairsAgain(manager, await lockBatch(manager, batchId)),
    );
  }
  return sent;
}

/**
 * After these captures have arrived or changed: has the captures of other batches of their projects screened again that are
 * to be compared with them.
 * @returns the number of captures sent
 */
export const screenPairsElsewhere = async (dataSource: DataSource, captureIds: string[]): Promise<number> =>
  screenPairsOf(dataSource, await findBatchesPairedWith(dataSource, captureIds));

/** The same for whatever a process that died in between has left. */
export const screenDuePairs = async (dataSource: DataSource): Promise<number> =>
  screenPairsOf(dataSource, await findBatchesWithDistantPairs(dataSource));
