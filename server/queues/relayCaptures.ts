import type { DataSource } from 'typeorm';
import type { ScreeningQueue } from './ScreeningQueue.js';

const rowsPerPass = 200;

/** Marks up to `rowsPerPass` received captures as queued under a new attempt; several relays never take the same row. */
async function takeReceived(dataSource: DataSource): Promise<{ captureId: string; attempt: number }[]> {
  const [rows] = (await dataSource.query(
    `UPDATE captures SET state = 'queued', attempt = attempt + 1, queued_at = now(), progress = 0
      WHERE id IN (SELECT id FROM captures WHERE state = 'received'
                    ORDER BY created_at, id FOR UPDATE SKIP LOCKED LIMIT $1)
      RETURNING id, attempt`,
    [rowsPerPass],
  )) as [{ id: string; attempt: number }[], number];
  return rows.map(({ id, attempt }) => ({ captureId: id, attempt }));
}

/**
 * Brings captures in state `received` to the queue. The row changes first: if the process dies in between, or Redis
 * refuses, the reconciler finds a queued row without a job and puts it back.
 * @returns the number of captures queued
 * @throws Error when Redis doesn't answer; rows not taken yet stay as they are
 */
export async function relayCaptures(dataSource: DataSource, queue: ScreeningQueue): Promise<number> {
  await queue.requireReachable();
  let total = 0;
  for (let taken = await takeReceived(dataSource); taken.length > 0; taken = await takeReceived(dataSource)) {
    await queue.add(taken);
    total += taken.length;
    if (taken.length < rowsPerPass) break;
  }
  return total;
}
