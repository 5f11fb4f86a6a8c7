import { setTimeout as delay } from 'node:timers/promises';
import { Queue } from 'bullmq';
import { Redis, ReplyError } from 'ioredis';
import { screenCaptureJobId, screeningQueueName, type ScreenCapturePayload } from '../../shared/jobs/screenCapture.js';
import type { Logger } from '../logging/createLogger.js';

const keptJobs = 1000;
/** Tries of one job after passing faults; a lost worker is counted apart (maxStalledCount, and the reconciler). */
const triesPerJob = 4;
const firstBackOffMs = 2_000;
/** A Redis that takes connections but doesn't answer must not hold up an upload. */
const commandTimeoutMs = 1_000;
/** A connection just being made is waited for this long. */
const connectWaitMs = 500;
const connectPollMs = 20;

/** States in which BullMQ still intends to run a job. */
const liveStates = new Set(['waiting', 'active', 'delayed', 'prioritized', 'waiting-children']);

/**
 * The producer's side of the queue. It fails at once when Redis is away instead of holding up a request: the rows are
 * the truth, and the relay tries again.
 */
export class ScreeningQueue {
  private readonly connection: Redis;
  private queue: Queue<ScreenCapturePayload> | null = null;
  private readonly warn: (error: Error) => void;

  constructor(
    redisUrl: string,
    logger: Logger,
    private readonly queueName: string = screeningQueueName,
  ) {
    this.warn = (error) => logger.warn({ err: error.message }, 'queue not reachable');
    this.connection = new Redis(redisUrl, {
      maxRetriesPerRequest: 1,
      enableOfflineQueue: false,
      commandTimeout: commandTimeoutMs,
      retryStrategy: (tries) => Math.min(2_000, 100 * tries),
    });
    this.connection.on('error', this.warn);
  }

  /** @throws Error when Redis doesn't take the jobs */
  async add(payloads: ScreenCapturePayload[]): Promise<void> {
    if (payloads.length === 0) return;
    const queue = await this.open();
    await queue.addBulk(
      payloads.map((data) => ({ name: 'screenCapture', data, opts: { jobId: screenCaptureJobId(data) } })),
    );
  }

  /** Whether BullMQ still holds a job that will run, or is running, for this attempt. */
  async isLive(payload: ScreenCapturePayload): Promise<boolean> {
    const queue = await this.open();
    return liveStates.has(await queue.getJobState(screenCaptureJobId(payload)));
  }

  /** @throws Error when Redis doesn't answer, or would throw jobs away when memory runs short */
  async check(): Promise<void> {
    await this.requireReachable();
    const policy = await this.readEvictionPolicy();
    if (policy !== null && policy !== 'noeviction') {
      throw new Error(`Redis must keep every key: set maxmemory-policy noeviction (it is ${policy}).`);
    }
  }

  /** @throws Error when Redis doesn't answer */
  async requireReachable(): Promise<void> {
    const deadlineMs = Date.now() + connectWaitMs;
    const isConnecting = (): boolean => ['wait', 'connecting', 'connect'].includes(this.connection.status);
    while (isConnecting() && Date.now() < deadlineMs) await delay(connectPollMs);
    await this.connection.ping();
  }

  async counts(): Promise<Record<string, number>> {
    const queue = await this.open();
    return queue.getJobCounts('waiting', 'active', 'delayed', 'failed');
  }

  async close(): Promise<void> {
    await this.queue?.close();
    this.connection.disconnect();
  }

  /** Null where the account may not read the settings, as with many hosted ones. */
  private async readEvictionPolicy(): Promise<string | null> {
    try {
      const [, policy] = (await this.connection.config('GET', 'maxmemory-policy')) as string[];
      return policy ?? null;
    } catch (error) {
      if (error instanceof ReplyError) return null;
      throw error;
    }
  }

  /**
   * BullMQ asks Redis about itself once, when its object is made, and an object whose question failed never works again.
   * So it is made only on a connection that answers, and thrown away when the question fails all the same.
   */
  private async open(): Promise<Queue<ScreenCapturePayload>> {
    if (this.connection.status !== 'ready') await this.requireReachable();
    const queue = (this.queue ??= this.createQueue());
    try {
      await queue.waitUntilReady();
    } catch (error) {
      if (this.queue === queue) this.queue = null;
      throw error;
    }
    return queue;
  }

  private createQueue(): Queue<ScreenCapturePayload> {
    const queue = new Queue<ScreenCapturePayload>(this.queueName, {
      connection: this.connection,
      skipWaitingForReady: true,
      defaultJobOptions: {
        attempts: triesPerJob,
        backoff: { type: 'exponential', delay: firstBackOffMs },
        removeOnComplete: { count: keptJobs },
        removeOnFail: { count: keptJobs },
      },
    });
    queue.on('error', this.warn);
    return queue;
  }
}
