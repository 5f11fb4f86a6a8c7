import type { AppDependencies } from '../AppDependencies.js';
import { relayCaptures } from './relayCaptures.js';

/**
 * Brings what has just been committed to the queue without waiting for the worker's next round. That Redis is away is no
 * failure of the request: the rows are there, and the worker's relay takes them later.
 */
export async function relayNow({
  dataSource,
  queue,
  logger,
}: Pick<AppDependencies, 'dataSource' | 'queue' | 'logger'>): Promise<void> {
  try {
    await relayCaptures(dataSource, queue);
  } catch (error) {
    logger.warn({ err: error }, 'captures could not be queued now, the worker will do it');
  }
}
