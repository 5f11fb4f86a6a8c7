import type { Health } from '../../shared/schemas/system.js';
import type { AppDependencies } from '../AppDependencies.js';

const limitMs = 2_000;

type Part = { ok: boolean; message?: string };

/** A part that does not answer in time counts as away: the answer itself must come. */
async function check(work: () => Promise<unknown>, messageWhenAway: string): Promise<Part> {
  let timer: NodeJS.Timeout | undefined;
  const tooLate = new Promise<never>((_resolve, reject) => {
    timer = setTimeout(() => reject(new Error('timed out')), limitMs);
  });
  try {
    await Promise.race([work(), tooLate]);
    return { ok: true };
  } catch {
    return { ok: false, message: messageWhenAway };
  } finally {
    clearTimeout(timer);
  }
}

/** Whether database, queue and storage answer right now. Says which does not, and nothing of why. */
export async function checkHealth({
  dataSource,
  queue,
  storage,
}: Pick<AppDependencies, 'dataSource' | 'queue' | 'storage'>): Promise<Health> {
  const [database, queuePart, storagePart] = await Promise.all([
    check(() => dataSource.query('select 1'), 'The database does not answer.'),
    check(() => queue.check(), 'The queue (Redis) does not answer.'),
    check(() => storage.check(), 'The storage cannot be written.'),
  ]);
  const parts = { database, queue: queuePart, storage: storagePart };
  const isOk = Object.values(parts).every(({ ok }) => ok);
  return { status: isOk ? 'ok' : 'degraded', parts };
}
