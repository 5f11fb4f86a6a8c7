import { Batch } from '../../server/entities/index.js';
import type { SystemUnderTest } from './systemUnderTest.js';
import { waitUntil } from './waitUntil.js';

/** Resolves when the worker is through with everything that was uploaded. */
export function everyBatchIsScreened(system: SystemUnderTest): Promise<void> {
  return waitUntil(
    'every batch is in review',
    async () => !(await system.dataSource.manager.existsBy(Batch, { state: 'screening' })),
    { limitMs: 150_000, describe: () => Promise.resolve(system.logs()) },
  );
}
