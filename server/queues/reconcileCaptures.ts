import type { DataSource } from 'typeorm';
import { failCapture } from '../repositories/failCapture.js';
import type { ScreeningQueue } from './ScreeningQueue.js';

/** A row this young may just be on its way between row and queue, or between queue and row. */
const graceS = 5;
/** Workers lost on one capture before it is given up. */
const maxFaults = 4;

/** Jobs asked about at once. */
const chunkSize = 100;

interface OpenRow {
  id: string;
  attempt: number;
  state: 'queued' | 'screening';
  faultCount: number;
}

/** Rows that should have a live job and have none. */
async function findLost(dataSource: DataSource, queue: ScreeningQueue): Promise<OpenRow[]> {
  const open = await dataSource.query<OpenRow[]>(
    `SELECT id, attempt, state, fault_count AS "faultCount" FROM captures
      WHERE state IN ('queued', 'screening')
        AND greatest(queued_at, started_at) < now() - make_interval(secs => $1)
      ORDER BY queued_at LIMIT 2000`,
    [graceS],
  );
  const lost: OpenRow[] = [];
  for (let start = 0; start < open.length; start += chunkSize) {
    const chunk = open.slice(start, start + chunkSize);
    const isLive = await Promise.all(chunk.map(({ id, attempt }) => queue.isLive({ captureId: id, attempt })));
    lost.push(...chunk.filter((_row, index) => !isLive[index]));
  }
  return lost;
}

/**
 * Finds captures that should have a live job and have none (lost queue, killed worker, refused add) and puts them back to
 * `received`; one that has cost too many workers is failed, so that a poisonous file can't run for ever.
 * Safe with several processes at once: each change names the attempt it saw.
 * @returns the number of captures put right
 */
export async function reconcileCaptures(dataSource: DataSource, queue: ScreeningQueue): Promise<number> {
  let changed = 0;
  for (const { id, attempt, state, faultCount } of await findLost(dataSource, queue)) {
    const payload = { captureId: id, attempt };
    if (state === 'screening' && faultCount >= maxFaults) {
      const isFailed = await failCapture(dataSource, payload, {
        code: 'WORKER_DIED',
        message:
          'Screening stopped without a result several times. Retry it; if that fails again, send the file to whoever runs this installation.',
        line: null,
      });
      if (isFailed) changed += 1;
      continue;
    }
    const [, affected] = (await dataSource.query(
      `UPDATE captures SET state = 'received', fault_count = fault_count + (state = 'screening')::int, progress = 0
        WHERE id = $1 AND attempt = $2 AND state IN ('queued', 'screening')`,
      [id, attempt],
    )) as [unknown, number];
    changed += affected;
  }
  return changed;
}
