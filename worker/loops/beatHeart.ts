import { LessThan, type DataSource } from 'typeorm';
import { WorkerHeartbeat } from '../../server/entities/index.js';

const forgottenAfterMs = 24 * 60 * 60_000;

/** Tells the database that this worker lives, and forgets those not seen for a day. */
export async function beatHeart(dataSource: DataSource, workerId: string, startedAt: Date): Promise<void> {
  const repository = dataSource.getRepository(WorkerHeartbeat);
  await repository.upsert({ workerId, startedAt, seenAt: new Date() }, ['workerId']);
  await repository.delete({ seenAt: LessThan(new Date(Date.now() - forgottenAfterMs)) });
}
