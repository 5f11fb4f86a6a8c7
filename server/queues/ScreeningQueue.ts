import { Queue } from 'bullmq';
import { Redis } from 'ioredis';
import { screenCaptureJobId, screeningQueueName, type ScreenCapturePayload } from '../../shared/jobs/screenCapture.js';
import type { Logger } from '../logging/createLogger.js';

const keptJobs = 1000;
/** Tries of one job after passing faults; a lost worker is counted apart (maxStalledCount, and the reconciler). */
const triesPerJob = 4;
const firstBackOffMs = 2_000;
/** A Redis that takes connections but doesn't answer must not hold up an upload. */
const commandTimeoutMs = 2_000;

/** States in which BullMQ still intends to run a job. */
const liveStates = new Set(['waiting', 'active', 'delayed', 'prioritized', 'waiting-children']);

/**
 * The producer's side of the queue. It fails at once when Redis is away instead of holding up a request: the rows are
 * the truth, and the relay tries again.
 */
export class ScreeningQueue {
  private readonly connection: Redis;
  private readonly queue: Queue<ScreenCapturePayload>;

  constructor(redisUrl: string, logger: Logger, queueName: string = screeningQueueName) {
    this.connection = new Redis(redisUrl, {
      maxRetriesPerRequest: 1,
      enableOfflineQueue: false,
      commandTimeout: commandTimeoutMs,
      retryStrategy: (tries) => Math.min(2_000, 100 * tries),
    });
    const warn = (error: Error): void => logger.warn({ err: error.message }, 'queue not reachable');
    this.connection.on('error', warn);
    this.queue = new Queue(queueName, {
      connection: this.connection,
      skipWaitingForReady: true,
      defaultJobOptions: {
        attempts: triesPerJob,
        backoff: { type: 'exponential', delay: firstBackOffMs },
        removeOnComplete: { count: keptJobs },
        removeOnFail: { count: keptJobs },
      },
    });
    this.queue.on('error', warn);
  }

  /** @throws Error when Redis doesn't take the jobs */
  async add(payloads: ScreenCapturePayload[]): Promise<void> {
    if (payloads.length === 0) return;
    await this.queue.addBulk(
      payloads.map((data) => ({ name: 'screenCapture', data, opts: { jobId: screenCaptureJobId(data) } })),
    );
  }

  /** Whether BullMQ still holds a job that will run, or is running, for this attempt. */
  async isLive(payload: ScreenCapturePayload): Promise<boolean> {
    return liveStates.has(await this.queue.getJobState(screenCaptureJobId(payload)));
  }

  /** @throws Error when Redis doesn't answer, or would throw jobs away when memory runs short */
  async check(): Promise<void> {
    await this.connection.ping();
    const policy = (await this.connection.config('GET', 'maxmemory-policy')) as string[];
    if (policy[1] !== undefined && policy[1] !== 'noeviction') {
      throw new Error(`Redis must keep every key: set maxmemory-policy noeviction (it is ${policy[1]}).`);
    }
  }

  counts(): Promise<Record<string, number>> {
    return this.queue.getJobCounts('waiting', 'active', 'delayed', 'failed');
  }

  async close(): Promise<void> {
    await this.queue.close();
    this.connection.disconnect();
  }
}
