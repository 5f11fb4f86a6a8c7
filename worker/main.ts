import { hostname } from 'node:os';
import { parseConfig } from '../server/config/config.js';
import { createDataSource } from '../server/createDataSource.js';
import { WorkerHeartbeat } from '../server/entities/index.js';
import { createLogger } from '../server/logging/createLogger.js';
import { finishDueBatches } from '../server/queues/finishBatch.js';
import { reconcileCaptures } from '../server/queues/reconcileCaptures.js';
import { relayCaptures } from '../server/queues/relayCaptures.js';
import { screenDuePairs } from '../server/queues/screenPairsElsewhere.js';
import { ScreeningQueue } from '../server/queues/ScreeningQueue.js';
import { createStorage } from '../server/storage/createStorage.js';
import { sweepStore } from '../server/storage/sweepStore.js';
import { beatHeart } from './loops/beatHeart.js';
import { startLoop } from './loops/startLoop.js';
import { createMailTransport } from './mail/createMailTransport.js';
import { sendDueMail } from './mail/sendDueMail.js';
import { startConsumer } from './startConsumer.js';
import { ScreeningPool } from './threads/ScreeningPool.js';
import type { WorkerContext } from './WorkerContext.js';

/** How soon a received capture reaches the queue when the server's own nudge was lost. */
const relayIntervalMs = 1_000;
const heartbeatMs = 5_000;
const sweepIntervalMs = 60 * 60_000;
const longestGraceMs = 60_000;

/** Starts one worker process: the queue's consumer and the background tasks that keep rows, jobs and mails in step. */
async function main(): Promise<void> {
  const config = parseConfig(process.env);
  const logger = createLogger(config, 'worker');
  const dataSource = await createDataSource(config.DATABASE_URL, {
    poolSize: config.WORKER_CONCURRENCY + 6,
  }).initialize();
  const storage = createStorage(config);
  const screeningPool = new ScreeningPool(config.WORKER_CONCURRENCY);
  const context: WorkerContext = { config, dataSource, logger, storage, screeningPool };
  const queue = new ScreeningQueue(config.REDIS_URL, logger);
  const transport = createMailTransport(config.SMTP_URL);
  const consumer = startConsumer(context);
  const startedAt = new Date();
  const workerId = `${hostname()}-${process.pid}-${startedAt.getTime()}`;

  const loops = [
    startLoop('heartbeat', heartbeatMs, logger, () => beatHeart(dataSource, workerId, startedAt)),
    startLoop('relay', relayIntervalMs, logger, () => relayCaptures(dataSource, queue)),
    startLoop('reconcile', config.RECONCILE_INTERVAL_MS, logger, async () => {
      await reconcileCaptures(dataSource, queue);
      await finishDueBatches(dataSource, config);
    }),
    startLoop('sweep', sweepIntervalMs, logger, () => sweepStore(dataSource, storage)),
    startLoop('pairs', sweepIntervalMs, logger, () => screenDuePairs(dataSource)),
    startLoop('mail', config.MAIL_INTERVAL_MS, logger, () =>
      sendDueMail({ dataSource, transport, from: config.MAIL_FROM, logger }),
    ),
  ];
  logger.info({ workerId, concurrency: config.WORKER_CONCURRENCY }, 'worker started');

  const stop = async (signal: string): Promise<void> => {
    logger.info({ signal }, 'worker stopping');
    setTimeout(() => process.exit(1), longestGraceMs).unref();
    await consumer.close();
    await Promise.all(loops.map((loop) => loop.stop()));
    await dataSource.getRepository(WorkerHeartbeat).delete({ workerId });
    await screeningPool.close();
    await queue.close();
    transport.close();
    await dataSource.destroy();
    process.exit(0);
  };
  for (const signal of ['SIGTERM', 'SIGINT'] as const) process.once(signal, () => void stop(signal));
}

main().catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? (error.stack ?? error.message) : String(error)}\n`);
  process.exit(1);
});
